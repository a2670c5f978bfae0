'use client'
import { Check as CheckIcon } from 'lucide-react'
import Link from 'next/link'
import { useState } from 'react'
import { useOutcome } from '@/components/ui/use-outcome'
import { Alarm } from '@/components/ui/alarm'
import { sayTime } from '@/components/ui/say-time'
import type { Check, CheckLine, HandBackView } from '@/lib/core/hand-back'
import { checkWords } from './hand-back-words'
import type { HandBackActs } from './hand-back-screen'
import { SignDialog } from './sign-dialog'
import styles from './hand-back.module.css'

type CheckListProps = Readonly<{ view: HandBackView; acts: HandBackActs; again: () => Promise<void> }>
export type Signing = Readonly<{ check: Check; lines: readonly CheckLine[] }>

/** Every check in turn: what it found, each line with the place that mends it; what is clear stands below in one short list. */
export function CheckList({ view, acts, again }: CheckListProps) {
  const [signing, setSigning] = useState<Signing | null>(null)
  const { trouble, run } = useOutcome()
  const found = view.checks.filter(({ lines }) => lines.length > 0)
  const clear = view.checks.filter(({ lines }) => lines.length === 0)
  const takeBack = (check: Check, line: CheckLine) => void run(acts.takeBackSign({ classSetId: view.classSetId!, check: check.key, subject: line.subject }), again)
  return (
    <section aria-label="Clerical check" className="mb-10">
      <h2>Clerical check</h2>
      {trouble && <Alarm {...trouble} />}
      {found.length > 0 && <div className={styles.checks}>{found.map((check) => <CheckRow key={check.key} check={check} onSign={(lines) => setSigning({ check, lines })} onTakeBack={(line) => takeBack(check, line)} />)}</div>}
      <ul className={styles.clear}>
        {clear.map(({ key }) => <li key={key}><CheckIcon className="ic" aria-hidden />{checkWords[key].clear}</li>)}
      </ul>
      {signing && <SignDialog signing={signing} classSetId={view.classSetId!} signOff={acts.signOff} onClose={() => setSigning(null)} onDone={async () => { await again(); setSigning(null) }} />}
    </section>
  )
}

// A long list is mended where its lines are made; here the first ones say what it is about.
const shown = 8

function CheckRow({ check, onSign, onTakeBack }: { check: Check; onSign: (lines: readonly CheckLine[]) => void; onTakeBack: (line: CheckLine) => void }) {
  const { key, lines, closing } = check
  const open = lines.filter(({ signed }) => !signed)
  const verb = closing === 'sign' ? 'Sign' : 'Keep back'
  const inOrder = [...open.slice(0, shown), ...lines.filter(({ signed }) => signed)]
  return (
    <section className={styles.check} aria-label={checkWords[key].found(lines.length)}>
      <div>
        <h3>{checkWords[key].found(open.length || lines.length)}</h3>
        {open.length === 0 && <p className="dense soft">{closing === 'sign' ? 'signed' : 'kept back'}</p>}
        {open.length > 1 && <button type="button" className="btn plain dense -ml-1" onClick={() => onSign(open)}>{verb} all {open.length}</button>}
      </div>
      <ul className={styles.lines}>
        {inOrder.map((line) => (
          <li key={line.subject}>
            <span>{line.says}</span>
            {line.signed ? (
              <>
                <span className={styles.signed}>{closing === 'sign' ? 'signed' : 'kept back'} by {line.signed.by}, {sayTime(line.signed.at)}: “{line.signed.reason}”</span>
                <button type="button" className="btn plain dense" onClick={() => onTakeBack(line)}>Take back</button>
              </>
            ) : (
              <>
                <Link href={line.href}>{checkWords[key].step}</Link>
                <button type="button" className="btn plain dense" onClick={() => onSign([line])}>{verb}</button>
              </>
            )}
          </li>
        ))}
        {open.length > shown && <li className="soft">and {open.length - shown} more</li>}
      </ul>
    </section>
  )
}
