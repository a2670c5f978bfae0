import type { Metadata } from 'next'
import { PaperPage } from '@/app/_door/paper-page'
import { pageOf } from '@/app/_door/page-of'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { GradesScreen } from '@/components/grades/grades-screen'
import { readGrades } from '@/lib/tasks/read-grades'
import { save } from './actions'

export const metadata: Metadata = { title: 'Grade scale' }

export default async function GradesPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const grades = await pageOf(readGrades(await actorOrSignIn(), paperId))
  return <PaperPage paperId={paperId}><GradesScreen grades={grades} save={save} /></PaperPage>
}
