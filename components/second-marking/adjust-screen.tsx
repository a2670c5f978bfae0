'use client'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import { counted } from '@/components/paper/stage-words'
import type { AdjustmentPlan, EffectLine } from '@/lib/core/adjusting'
import { sayMark } from '@/lib/core/marks'
import type { Outcome } from '@/lib/core/outcome'
import { EffectTable } from './effect-table'
import { sayRests, sayShift } from '@/lib/core/say-pattern'
import styles from './second-marking.module.css'

type AdjustScreenProps = Readonly<{ plan: AdjustmentPlan; decider: string; adjust: (raw: unknown) => Promise<Outcome<unknown>> }>

const changes = ({ total }: EffectLine) => total.before !== total.after

/** One adjustment before it is decided: what it rests on, its effect on every student, and the act. */
export function AdjustScreen({ plan, decider, adjust }: AdjustScreenProps) {
  const { paperId, sampleId, className, maximum, graded, pattern, lines, key } = plan
  const { marker, markerId, label, questionId } = pattern
  const router = useRouter()
  const { busy, trouble, run } = useOutcome()
  const shift = pattern.pattern.shift ?? 0
  const [changed, grades] = [lines.filter(changes).length, lines.filter(({ grade }) => grade.before !== grade.after).length]
  const back = `/papers/${paperId}/second-mark`
  return (
    <main className="page">
      <h1>One adjustment: {marker} in {label}</h1>
      <p className="mt-2">{className}. {sayRests(pattern)}, first minus second: steadily to one side of the second marks. Offered: <b className="font-semibold">{sayShift(shift)}</b> every mark of {marker} in {label}, between 0 and {sayMark(maximum)}.</p>
      <p className="mt-2"><b className="font-semibold">This adjustment changes {counted(changed, 'student', 'students')}{graded ? `, ${counted(grades, 'grade', 'grades')} among them` : ''}.</b> The stamps and the marks they add up to stay as they are; the adjustment stands beside them, is printed as a line of its own on each returned script, and can be undone. Answers decided on by name keep what was decided.</p>
      {pattern.few && <p className="mt-2"><b className="font-semibold">n = {pattern.n}: few scripts. Look at the answers themselves, or have the question marked again by someone else, before you decide.</b></p>}
      <EffectTable lines={lines} graded={graded} label={label} />
      <div className={styles.row}>
        <button type="button" className="btn lead" disabled={busy} onClick={() => void run(adjust({ sampleId, questionId, markerId, key }), () => router.push(back))}>Decide: {sayShift(shift)}</button>
        <Link className="btn" href={back}>Leave the marks as they are</Link>
        <span className="line">Decided by {decider}, with today’s date.</span>
      </div>
      {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
    </main>
  )
}
