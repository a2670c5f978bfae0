import type { Metadata } from 'next'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { Desk } from '@/components/desk/desk'
import { openRun } from '@/lib/tasks/open-run'

export const metadata: Metadata = { title: 'Marking desk' }

type Props = { params: Promise<{ paperId: string; questionId: string }>; searchParams: Promise<{ round?: string; response?: string }> }

export default async function DeskPage({ params, searchParams }: Props) {
  const { round, response } = await searchParams
  const actor = await actorOrSignIn()
  const run = await pageOf(openRun(actor, { ...(await params), round: round === 'second' || round === 'agreed' ? round : 'first' }))
  return <Desk key={`${run.question.id} ${run.round}`} run={run} responseId={response ?? null} end={<PersonEnd />} />
}
