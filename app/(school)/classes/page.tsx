import type { Metadata } from 'next'
import Link from 'next/link'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { AddClassButton } from '@/components/classes/add-class-button'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'
import { listClasses } from '@/lib/tasks/list-classes'
import { add } from './actions'

export const metadata: Metadata = { title: 'Classes' }

export default async function ClassesPage() {
  const actor = await actorOrSignIn()
  const classes = await pageOf(listClasses(actor))
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'Classes' }]}><PersonEnd /></TopBar>
      <main className="page">
        <div className="mb-4 flex items-end gap-4"><h1>{actor.roles.includes('admin') ? 'Classes' : 'Your classes'}</h1><div className="ml-auto"><AddClassButton add={add} /></div></div>
        {classes.length === 0 ? <p className="slip">No class yet. Add one, then bring in its list of students.</p> : (
          <table className="tbl">
            <thead><tr><th>Class</th><th>Teachers</th><th className="num">Students</th></tr></thead>
            <tbody>
              {classes.map((one) => (
                <tr key={one.classId}>
                  <td><Link className="inline-block font-semibold leading-6" href={`/classes/${one.classId}`}>{one.name}</Link></td>
                  <td>{one.teachers.length > 0 ? one.teachers.join(', ') : <span className="soft">nobody yet</span>}</td>
                  <td className="num">{one.students}</td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
      </main>
    </>
  )
}
