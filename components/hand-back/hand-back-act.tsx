'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field } from '@/components/ui/field'
import { Dialog } from '@/components/ui/dialog'
import { useOutcome } from '@/components/ui/use-outcome'
import { counted } from '@/components/paper/stage-words'
import { openLines, type HandBackView } from '@/lib/core/hand-back'
import { actWords, keptBackWords } from './hand-back-words'
import type { HandBackActs } from './hand-back-screen'
import styles from './hand-back.module.css'

type HandBackActProps = Readonly<{ view: HandBackView; className: string; acts: HandBackActs; again: () => Promise<void> }>

/** The one act of this page, and beside it what still stands in its way. */
export function HandBackAct({ view, className, acts, again }: HandBackActProps) {
  const [asking, setAsking] = useState(false)
  const { busy, trouble, run } = useOutcome()
  const { ready, classSetId } = view
  const open = openLines(view.checks).length
  const [day, setDay] = useState('')
  const dueAt = day === '' ? undefined : new Date(day).getTime()
  const go = () => void run(acts.handBack(classSetId!, dueAt === undefined ? {} : { dueAt }), async () => { await again(); setAsking(false) })
  if (ready.scripts === 0 && open === 0 && view.students.some(({ returned }) => returned)) return <p className={`${styles.act} soft`}>Students read their scripts under “My scripts”. A mark that changes can be handed back again from here.</p>
  const can = open === 0 && ready.scripts > 0
  return (
    <div className={styles.act}>
      <button type="button" className="btn lead" disabled={!can} onClick={() => setAsking(true)}>{ready.scripts === 0 ? 'Hand back' : actWords(ready.scripts)}</button>
      <p className="soft">{open > 0 ? `See to ${open === 1 ? 'the open line' : `the ${open} open lines`} below first: ${open === 1 ? 'mend it, or sign it' : 'mend each, or sign it'} by your name.` : ready.scripts === 0 ? 'Every script is kept back.' : sayReady(view)}</p>
      <Dialog title={`${actWords(ready.scripts)}?`} open={asking} onClose={() => setAsking(false)} role="alertdialog">
        <WhatHappens view={view} className={className} />
        <Field label="On a later day instead" type="datetime-local" value={day} onChange={(event) => setDay(event.target.value)} className="mt-4 w-64" />
        {trouble && <Alarm {...trouble} />}
        <div className="mt-4 flex gap-3">
          <button type="button" className="btn lead" disabled={busy} onClick={go}>{busy ? 'One moment' : actWords(ready.scripts)}</button>
          <button type="button" className="btn" onClick={() => setAsking(false)}>Not yet</button>
        </div>
      </Dialog>
    </div>
  )
}

function sayReady({ ready }: HandBackView): string {
  if (ready.changed === 0) return 'Nothing stands in the way.'
  return `${counted(ready.changed, 'script has', 'scripts have')} changed since and will go out as the next revision.`
}

function WhatHappens({ view: { ready, students, solutionsReleased }, className }: { view: HandBackView; className: string }) {
  const stay = students.filter(({ keptBack, scriptNumber }) => keptBack !== null && keptBack !== 'absent' && scriptNumber !== null)
  return (
    <>
      <ul className="mt-2 ml-5 list-disc leading-6">
        <li>{ready.scripts === 1 ? 'One student' : `${ready.scripts} students`} of {className} can read and download their own pages with every mark, the total and the grade.</li>
        <li>{ready.mails === 0 ? 'Nobody here has an e-mail address: tell them in class.' : `${counted(ready.mails, 'mail goes', 'mails go')} out, with the first name and no mark in it.`}</li>
        <li>{solutionsReleased ? 'The model solutions go with them.' : 'The model solutions stay with you.'}</li>
        <li>Marks can still change. What changes goes out again as a new revision; all of it can be taken back.</li>
      </ul>
      {stay.length > 0 && (
        <>
          <p className="mt-3 font-medium">These stay here:</p>
          <ul className="ml-5 list-disc leading-6">{stay.map(({ key, name, keptBack }) => <li key={key}>{name}: {keptBackWords[keptBack!]}</li>)}</ul>
        </>
      )}
    </>
  )
}
