import type { Metadata } from 'next'
import Link from 'next/link'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { pageOf } from '@/app/_door/page-of'
import { AddPersonButton } from '@/components/people/add-person-button'
import { PeopleTable } from '@/components/people/people-table'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'
import { listPeople } from '@/lib/tasks/list-people'
import { add, change, disable, enable, send } from './actions'

export const metadata: Metadata = { title: 'People' }

export default async function PeoplePage({ searchParams }: { searchParams: Promise<{ who?: string }> }) {
  const who = (await searchParams).who === 'students' ? 'students' : 'staff'
  const actor = await actorOrSignIn()
  const people = await pageOf(listPeople(actor, who))
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'People' }]}><PersonEnd /></TopBar>
      <main className="page">
        <div className="flex items-end gap-4"><h1>People</h1><div className="ml-auto"><AddPersonButton add={add} /></div></div>
        <nav className="tabs mt-2 mb-4" aria-label="Whose accounts">
          <Link href="/people" aria-current={who === 'staff' ? 'page' : undefined}>Staff</Link>
          <Link href="/people?who=students" aria-current={who === 'students' ? 'page' : undefined}>Students with an account</Link>
        </nav>
        {people.length === 0
          ? <p className="slip">No student has an account yet. Open a class to give its students theirs.</p>
          : <PeopleTable people={people} self={actor.userId} acts={{ change, disable, enable, send }} />}
      </main>
    </>
  )
}
