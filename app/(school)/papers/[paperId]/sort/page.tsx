import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { SortingBoard } from '@/components/sorting/sorting-board'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'

export const metadata = { title: 'Sorting table' }

/** Loose sheets and the names still to be confirmed. */
export default async function SortPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const start = await pageOf(readSortingTable(await actorOrSignIn(), paperId))
  return <SortingBoard start={start} person={<PersonEnd />} />
}
