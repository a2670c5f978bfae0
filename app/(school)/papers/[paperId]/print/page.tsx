import type { Metadata } from 'next'
import { pageOf } from '@/app/_door/page-of'
import { PaperPage } from '@/app/_door/paper-page'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { PrintScreen } from '@/components/printing/print-screen'
import { readPrintPage } from '@/lib/tasks/read-print-page'
import { saveSpots, suggestSpots } from './actions'

export const metadata: Metadata = { title: 'Print with codes' }

/** For those who print the papers from here: where the code of each page goes, and the pack for the printer. */
export default async function PrintPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const view = await pageOf(readPrintPage(await actorOrSignIn(), paperId))
  return (
    <PaperPage paperId={paperId} now="Set">
      <PrintScreen key={view.blank} view={view} acts={{ saveSpots, suggestSpots }} />
    </PaperPage>
  )
}
