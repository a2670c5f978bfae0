import type { Metadata } from 'next'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { RunTable } from '@/components/desk/run-table'
import { PaperFrame } from '@/components/paper/paper-frame'
import { listRuns } from '@/lib/tasks/list-runs'
import { readStages } from '@/lib/tasks/read-stages'

export const metadata: Metadata = { title: 'Mark' }

export default async function MarkPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const actor = await actorOrSignIn()
  const runs = await pageOf(listRuns(actor, paperId))
  const stages = await pageOf(readStages(actor, paperId))
  return (
    <PaperFrame stages={stages} now="Mark" end={<PersonEnd />}>
      <main className="page"><RunTable paperId={paperId} runs={runs} /></main>
    </PaperFrame>
  )
}
