import type { Metadata } from 'next'
import { PaperPage } from '@/app/_door/paper-page'
import { pageOf } from '@/app/_door/page-of'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { SecondMarkScreen } from '@/components/second-marking/second-mark-screen'
import { readSecondMarking } from '@/lib/tasks/read-second-marking'
import { addScript, close, draw, undo } from './actions'

export const metadata: Metadata = { title: 'Second-mark' }

export default async function SecondMarkPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const marking = await pageOf(readSecondMarking(await actorOrSignIn(), paperId))
  return <PaperPage paperId={paperId} now="Second-mark"><SecondMarkScreen marking={marking} acts={{ draw, addScript, close, undo }} /></PaperPage>
}
