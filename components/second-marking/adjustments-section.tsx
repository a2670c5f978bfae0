'use client'
import Link from 'next/link'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import { counted } from '@/components/paper/stage-words'
import type { MarkerAdjustment } from '@/lib/core/adjusting'
import type { Outcome } from '@/lib/core/outcome'
import type { SampleView } from '@/lib/core/second-marking'
import { sayInstant } from '@/lib/core/say-day'
import { sayNoAdjustment, sayRests, sayShift, sayShifted } from '@/lib/core/say-pattern'

type AdjustmentsSectionProps = Readonly<{ paperId: string; sample: SampleView; owner: boolean; undo: (raw: unknown) => Promise<Outcome<unknown>> }>

/** What the marks of each marker in each question call for: an adjustment where they lean one way steadily, with what was decided. */
export function AdjustmentsSection({ paperId, sample, owner, undo }: AdjustmentsSectionProps) {
  const { patterns, adjustments, closedAt, id } = sample
  const { busy, trouble, run } = useOutcome()
  const holds = (markerId: string, questionId: string) => adjustments.some((one) => one.undone === null && one.markerId === markerId && one.questionId === questionId)
  const outside = patterns.filter(({ pattern }) => pattern.why !== 'all_inside' && pattern.why !== 'unread')
  if (outside.length === 0 && adjustments.length === 0) return null
  return (
    <>
      <h3 className="mt-6">Markers outside the tolerance</h3>
      <table className="tbl">
        <thead><tr><th scope="col">Question</th><th scope="col">First marker</th><th scope="col">Rests on</th><th scope="col">What it calls for</th><th scope="col"><span className="vh">Go on</span></th></tr></thead>
        <tbody>
          {outside.map((one) => (
            <tr key={`${one.questionId} ${one.markerId}`}>
              <th scope="row"><b className="book font-medium text-[length:var(--t-2)]">{one.label}</b></th>
              <td className="whitespace-nowrap">{one.marker}</td><td>{sayRests(one)}</td>
              <td>{one.pattern.shift === null ? `No adjustment: ${sayNoAdjustment[one.pattern.why]}.` : holds(one.markerId, one.questionId) ? 'Adjusted, see below.' : `One-sided and steady: ${sayShift(one.pattern.shift)} would mend it.`}</td>
              <td className="text-right whitespace-nowrap">
                {owner && closedAt === null && one.pattern.shift !== null && !holds(one.markerId, one.questionId) && <Link className="btn" href={`/papers/${paperId}/second-mark/adjust/${id}/${one.questionId}/${one.markerId}`} aria-label={`See the effect of an adjustment for ${one.marker} in ${one.label}`}>See the effect</Link>}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {adjustments.length > 0 && (
        <ul className="dense mt-3">
          {adjustments.map((one) => <Decided key={one.id} adjustment={one} owner={owner} busy={busy} onUndo={() => void run(undo(one.id), () => undefined)} />)}
        </ul>
      )}
      {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
    </>
  )
}

type DecidedProps = Readonly<{ adjustment: MarkerAdjustment; owner: boolean; busy: boolean; onUndo: () => void }>

function Decided({ adjustment, owner, busy, onUndo }: DecidedProps) {
  const { label, marker, halves, answers, pairs, mean, by, at, undone } = adjustment
  return (
    <li className="mt-1">
      {undone && <b className="font-semibold">Taken back. </b>}
      {marker} in {label}, {counted(answers, 'answer', 'answers')}: {sayShifted(halves)}, decided by {by} on {sayInstant(at)} ({sayRests({ n: pairs, mean, few: false })}).
      {undone ? ` Undone by ${undone.by} on ${sayInstant(undone.at)}.` : owner && <button type="button" className="btn ml-3" disabled={busy} onClick={onUndo} aria-label={`Undo the adjustment for ${marker} in ${label}`}>Undo</button>}
    </li>
  )
}
