'use client'
import { errorSentence } from '@/components/ui/error-sentence'

export default function ErrorScreen({ reset }: { reset: () => void }) {
  return <main className="page" role="alert"><h1>Something went wrong</h1><p className="my-3">{errorSentence('failed')}</p><button className="btn lead" onClick={reset}>Try again</button></main>
}
