import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { PaperPage } from '@/app/_door/paper-page'
import { pageOf } from '@/app/_door/page-of'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { RecordScreen } from '@/components/second-marking/record-screen'
import { readModerationRecord } from '@/lib/tasks/read-moderation-record'

export const metadata: Metadata = { title: 'Moderation record' }

type Props = { params: Promise<{ paperId: string; sampleId: string }> }

export default async function RecordPage({ params }: Props) {
  const { paperId, sampleId } = await params
  const { record, paperId: its } = await pageOf(readModerationRecord(await actorOrSignIn(), sampleId))
  if (its !== paperId) notFound()
  return <PaperPage paperId={paperId} now="Second-mark"><RecordScreen paperId={paperId} sampleId={sampleId} record={record} /></PaperPage>
}
