import { PaperPage } from '@/app/_door/paper-page'
import { pageOf } from '@/app/_door/page-of'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { MarkBookScreen } from '@/components/mark-book/mark-book-screen'
import { readMarkBook } from '@/lib/tasks/read-mark-book'

export const metadata = { title: 'Mark book' }

export default async function MarkBookPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const book = await pageOf(readMarkBook(await actorOrSignIn(), paperId))
  return <PaperPage paperId={paperId} now="Mark"><MarkBookScreen first={book} /></PaperPage>
}
