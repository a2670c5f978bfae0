import type { Metadata } from 'next'
import Link from 'next/link'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { ClassHead } from '@/components/classes/class-head'
import { ClassStudents } from '@/components/classes/class-students'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'
import { readClass } from '@/lib/tasks/read-class'
import { giveAccountsTo, rename, setTeachers, takeOut } from '../actions'

export const metadata: Metadata = { title: 'Class' }

export default async function ClassPage({ params }: { params: Promise<{ classId: string }> }) {
  const { classId } = await params
  const actor = await actorOrSignIn()
  const view = await pageOf(readClass(actor, classId))
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'Classes', href: '/classes' }, { label: view.name }]}><PersonEnd /></TopBar>
      <main className="page">
        <ClassHead name={view.name} teachers={view.teachers} choices={view.choices} rename={rename.bind(null, classId)} setTeachers={setTeachers.bind(null, classId)} />
        {view.students.length === 0 ? (
          <div className="slip mt-6">
            <p className="mb-3">Nobody is in this class yet. Save the class list as CSV from the school’s records, and bring it in here.</p>
            <Link className="btn lead" href={`/classes/${classId}/roster`}>Bring in a class list</Link>
          </div>
        ) : <ClassStudents classId={classId} className={view.name} students={view.students} address={env.url} school={env.schoolName} giveAccounts={giveAccountsTo.bind(null, classId)} takeOut={takeOut.bind(null, classId)} />}
      </main>
    </>
  )
}
