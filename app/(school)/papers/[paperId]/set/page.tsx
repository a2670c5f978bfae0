import type { Metadata } from 'next'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { SetScreen } from '@/components/setting/set-screen'
import { readSetting } from '@/lib/tasks/read-setting'
import { readStages } from '@/lib/tasks/read-stages'
import { putPointBack, putQuestionBack, takePointOut, takeQuestionOut } from './actions'

export const metadata: Metadata = { title: 'Set' }

export default async function SetPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const actor = await actorOrSignIn()
  const opened = await pageOf(readSetting(actor, paperId))
  const stages = await pageOf(readStages(actor, paperId))
  return <SetScreen opened={opened} stages={stages} acts={{ takeQuestionOut, putQuestionBack, takePointOut, putPointBack }} end={<PersonEnd />} />
}
