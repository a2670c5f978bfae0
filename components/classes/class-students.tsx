'use client'
import Link from 'next/link'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import { AccountsDialog, type Given } from './accounts-dialog'
import { accountGroups } from './account-groups'
import { SlipList, type Slip } from './slip-list'
import { StudentRows, type StudentRow } from './student-rows'

type ClassStudentsProps = Readonly<{
  classId: string; className: string; students: readonly StudentRow[]; address: string; school: string
  giveAccounts: (raw: unknown) => Promise<Outcome<Given>>; takeOut: (studentId: string) => Promise<Outcome<void>>
}>

/** The students of a class as its list, with what each needs to sign in. */
export function ClassStudents({ classId, className, students, address, school, giveAccounts, takeOut }: ClassStudentsProps) {
  const { busy, trouble, run } = useOutcome()
  const [giving, setGiving] = useState<readonly StudentRow[] | null>(null)
  const [slips, setSlips] = useState<readonly Slip[]>([])
  const [said, setSaid] = useState('')

  function given({ mailed, slips: made }: Given) {
    setGiving(null)
    setSlips(made)
    setSaid(mailed > 0 ? `${mailed} ${mailed === 1 ? 'link is' : 'links are'} on the way by e-mail.` : made.length === 0 ? 'Nothing was given: these accounts are disabled.' : '')
  }
  if (slips.length > 0) {
    return <>{said && <p role="status" className="line mt-4">{said}</p>}<SlipList classId={classId} slips={slips} school={school} className={className} address={address} onDone={() => setSlips([])} /></>
  }
  return (
    <>
      <div className="mt-6 mb-2 flex flex-wrap items-center gap-3">
        <h2 className="mr-auto">{students.length} {students.length === 1 ? 'student' : 'students'}</h2>
        <Link className="btn" href={`/classes/${classId}/roster`}>Bring in a class list</Link>
        <button className="btn lead" onClick={() => setGiving(students)}>Give accounts</button>
      </div>
      <div className="mb-2" aria-live="polite">{trouble ? <Alarm code={trouble.code} detail={trouble.detail} /> : <p className="line">{said}</p>}</div>
      <StudentRows students={students} busy={busy} onGive={(student) => setGiving([student])} onTakeOut={(student) => void run(takeOut(student.studentId), () => setSaid(`${student.givenName} ${student.familyName} is no longer in ${className}. To put them back, bring in a list with ${student.candidateNumber}.`))} />
      {giving && <AccountsDialog groups={accountGroups(giving)} give={giveAccounts} onGiven={given} onClose={() => setGiving(null)} />}
    </>
  )
}
