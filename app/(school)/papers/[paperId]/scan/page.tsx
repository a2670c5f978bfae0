import { pageOf } from '@/app/_door/page-of'
import { PaperPage } from '@/app/_door/paper-page'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { ScanBoard } from '@/components/scan/scan-board'
import { readSheaves } from '@/lib/tasks/read-sheaves'

export const metadata = { title: 'Scan' }

/** Where the copier's file is dropped, and how far its reading has come. */
export default async function ScanPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const start = await pageOf(readSheaves(await actorOrSignIn(), paperId))
  return <PaperPage paperId={paperId} now="Scan"><ScanBoard paperId={paperId} start={start} /></PaperPage>
}
