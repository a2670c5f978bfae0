'use client'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import Link from 'next/link'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { ask, RefusedError } from '@/components/ui/ask'
import { openLines, type HandBackView } from '@/lib/core/hand-back'
import type { Outcome } from '@/lib/core/outcome'
import { Building } from './building'
import { CheckList } from './check-list'
import { ClassSetChoice } from './class-set-choice'
import { HandBackAct } from './hand-back-act'
import { ReleaseHistory } from './release-history'
import { StudentTable } from './student-table'

export type HandBackActs = Readonly<{
  handBack: (classSetId: string, how?: { scriptIds?: readonly string[]; dueAt?: number }) => Promise<Outcome<string>>
  withdrawOne: (scriptId: string) => Promise<Outcome<void>>
  callOff: (classSetId: string) => Promise<Outcome<void>>
  withdraw: (classSetId: string) => Promise<Outcome<void>>
  signOff: (form: { classSetId: string; check: string; subjects: readonly string[]; reason: string }) => Promise<Outcome<void>>
  takeBackSign: (form: { classSetId: string; check: string; subject: string }) => Promise<Outcome<void>>
}>

const whileBuilding = 700
// Who has read it, and what was mended elsewhere, shows up without a reload.
const otherwise = 15_000

/** The check as a list that empties, one act, and then what was handed back. */
export function HandBackScreen({ first, acts }: { first: HandBackView; acts: HandBackActs }) {
  const [classSetId, setClassSetId] = useState(first.classSetId)
  const { data, error, refetch } = useQuery({
    queryKey: ['hand-back', first.paperId, classSetId],
    queryFn: () => ask<HandBackView>(`/api/papers/${first.paperId}/hand-back${classSetId === null ? '' : `?classSet=${classSetId}`}`),
    initialData: classSetId === first.classSetId ? first : undefined, placeholderData: keepPreviousData,
    refetchInterval: ({ state }) => (state.data?.building ? whileBuilding : otherwise),
  })
  const view = data ?? first
  const again = async () => { await refetch() }
  const scripts = view.students.filter(({ scriptNumber }) => scriptNumber !== null).length
  const set = view.classSets.find(({ id }) => id === view.classSetId)
  return (
    <main className="page !max-w-[64rem]">
      <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-2">
        <h1>{titleOf(view)}</h1>
        {view.classSets.length > 1 && <ClassSetChoice classSets={view.classSets} value={view.classSetId} onChange={setClassSetId} />}
      </div>
      {error && <Alarm code={error instanceof RefusedError ? error.code : 'failed'} />}
      {view.building ? <Building release={view.building} classSetId={view.classSetId} callOff={acts.callOff} again={again} /> : scripts === 0 ? <NothingHere paperId={view.paperId} hasClass={set !== undefined} /> : (
        <>
          <HandBackAct view={view} className={set?.className ?? ''} acts={acts} again={again} />
          <CheckList view={view} acts={acts} again={again} />
          <StudentTable view={view} acts={acts} again={again} />
        </>
      )}
      <ReleaseHistory view={view} acts={acts} again={again} />
    </main>
  )
}

function titleOf({ building, students, checks, ready, releases }: HandBackView): string {
  if (building) return building.dueAt !== null && building.built === 0 ? 'To be handed back' : 'Building the scripts'
  const returned = students.filter((one) => one.returned !== null).length
  if (returned > 0) return ready.scripts > 0 ? 'Handed back, and changed since' : `${returned} of ${students.filter(({ scriptNumber }) => scriptNumber !== null).length} scripts handed back`
  if (releases[0]?.state === 'withdrawn') return 'Taken back'
  const open = openLines(checks).length
  if (open > 0) return open === 1 ? 'One thing to see to first' : `${open} things to see to first`
  return ready.scripts > 0 ? 'Ready to hand back' : 'Hand back'
}

function NothingHere({ paperId, hasClass }: { paperId: string; hasClass: boolean }) {
  return (
    <div className="slip mt-6">
      <h2>{hasClass ? 'No script to hand back yet' : 'No class sits this paper yet'}</h2>
      <p className="mb-3">{hasClass ? 'Scan the sheaf, confirm the names and mark. What is ready can then be handed back from here.' : 'Name its class first. Then its scripts have somewhere to go.'}</p>
      <Link className="btn lead" href={`/papers/${paperId}/${hasClass ? 'scan' : 'set'}`}>{hasClass ? 'Choose the sheaf' : 'Add a class'}</Link>
    </div>
  )
}
