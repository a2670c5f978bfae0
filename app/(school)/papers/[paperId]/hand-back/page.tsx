import { pageOf } from '@/app/_door/page-of'
import { PaperPage } from '@/app/_door/paper-page'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { HandBackScreen } from '@/components/hand-back/hand-back-screen'
import { readHandBack } from '@/lib/tasks/read-hand-back'
import { callOff, handBack, signOff, takeBackSign, withdraw, withdrawOne } from './actions'

export const metadata = { title: 'Hand back' }

/** What has to be in order first, the one act of handing back, and what was handed back. */
export default async function HandBackPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const first = await pageOf(readHandBack(await actorOrSignIn(), paperId))
  return <PaperPage paperId={paperId} now="Hand back"><HandBackScreen first={first} acts={{ handBack, withdraw, withdrawOne, callOff, signOff, takeBackSign }} /></PaperPage>
}
