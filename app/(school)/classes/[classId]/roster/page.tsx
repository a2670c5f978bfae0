import type { Metadata } from 'next'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { RosterImport } from '@/components/classes/roster-import'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'
import { readClass } from '@/lib/tasks/read-class'
import { bringIn, check } from './actions'

export const metadata: Metadata = { title: 'Class list' }

export default async function RosterPage({ params }: { params: Promise<{ classId: string }> }) {
  const { classId } = await params
  const { name } = await pageOf(readClass(await actorOrSignIn(), classId))
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'Classes', href: '/classes' }, { label: name, href: `/classes/${classId}` }, { label: 'Class list' }]}><PersonEnd /></TopBar>
      <main className="page">
        <h1>Bring in the list of {name}</h1>
        <RosterImport back={`/classes/${classId}`} check={check.bind(null, classId)} bringIn={bringIn.bind(null, classId)} />
      </main>
    </>
  )
}
