import Link from 'next/link'
import { errorSentence } from '@/components/ui/error-sentence'
import { CoverLabel } from './cover-label'

/** A link or code that opens nothing any more. */
export function LinkOver({ school }: { school: string }) {
  return (
    <CoverLabel school={school}>
      <p role="alert">{errorSentence('link_used')}</p>
      <div className="mt-5 flex items-center"><Link className="btn lead" href="/new-password">Ask for a new link</Link><Link className="soft dense ml-auto" href="/sign-in">Sign in</Link></div>
    </CoverLabel>
  )
}
