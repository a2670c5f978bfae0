import Link from 'next/link'
import type { DeskState } from './desk-state'
import { saySays } from './say-desk'
import styles from './desk.module.css'

/** What the desk says at the foot of the strip in hand: a refusal, a flag and its answer, that the page was scanned again, or that the run is finished and where to go on. */
export function FootLine({ state }: { state: DeskState }) {
  const { says, run, strips, hand } = state
  const strip = strips[hand]
  const bar = strip?.bar === 'begun-by-other' ? 'Another marker has begun this answer. Go on with the next one.' : null
  const finished = says !== null && 'words' in says && says.words === 'run-finished'
  return (
    <>
      {strip?.flag && <p className={styles.foot}><b>Flag</b> {strip.flag.note}{strip.flag.answer && <> <b>Answer</b> {strip.flag.answer}</>}</p>}
      {strip?.rescanned && <p className={styles.foot}>This page was scanned again after it was marked. What was marked stays where it was: look whether it still fits.</p>}
      {bar && <p className={styles.foot}>{bar}</p>}
      {says && !finished && <p className={`${styles.foot} ${'code' in says ? 'alarm' : ''}`}>{saySays(says)}</p>}
      {finished && (
        <p className={styles.foot}>
          {saySays(says)}{' '}
          {run.round === 'first' && run.next && <Link href={`/papers/${run.paperId}/mark/${run.next.id}`} className="btn lead">Go on with {run.next.label}</Link>}
          {run.round === 'first' && <Link href={`/papers/${run.paperId}`} className="btn">To the mark book</Link>}
          {run.round === 'agreed' && strip && <Link href={`/papers/${run.paperId}/second-mark/${strip.responseId}`} className="btn lead">Back to the two marks</Link>}
          {run.round === 'second' && <Link href={`/papers/${run.paperId}/second-mark`} className="btn lead">Back to the sample</Link>}
        </p>
      )}
    </>
  )
}
