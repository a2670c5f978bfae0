'use client'
import Link from 'next/link'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import type { SampleView } from '@/lib/core/second-marking'
import { counted } from '@/components/paper/stage-words'
import { AdjustmentsSection } from './adjustments-section'
import { FiguresPanel } from './figures-panel'
import { OutsideList } from './outside-list'
import { QuestionTable } from './question-table'
import { SampledScripts } from './sampled-scripts'
import { sayInstant } from '@/lib/core/say-day'
import { sayCaution, sayMean } from '@/lib/core/say-difference'
import styles from './second-marking.module.css'

type Act = (raw: unknown) => Promise<Outcome<unknown>>
type SampleSectionProps = Readonly<{ paperId: string; sample: SampleView; owner: boolean; acts: Readonly<{ addScript: Act; close: Act; undo: Act }> }>

/** What the marks of a sample say so far, n always beside them. */
function FiguresLine({ sample: { figures } }: { sample: SampleView }) {
  if (figures.n === 0) return <p className="dense soft mt-2">No second mark is settled yet, so there is nothing to compare.</p>
  const caution = sayCaution(figures)
  return (
    <p className="dense mt-2">
      Blind second marks only, n = {counted(figures.n, 'answer', 'answers')}: {figures.exact} the same, {figures.within} inside the tolerance, mean first minus second {sayMean(figures.meanDifference)} marks.
      {caution && <b className="font-semibold"> {caution}</b>}
    </p>
  )
}

/** One sample: how far it is, where marks differ, and what is still to be decided. */
export function SampleSection({ paperId, sample, owner, acts }: SampleSectionProps) {
  const { busy, trouble, run } = useOutcome()
  const { scripts, undecided, closedAt, moderator, className } = sample
  const read = scripts.filter(({ read: done, answers }) => done === answers).length
  return (
    <section className={styles.sample} aria-labelledby={`sample-${sample.id}`}>
      <h2 id={`sample-${sample.id}`} className="cap">{className}, {sample.mine ? 'your sample' : `second-marked by ${moderator}`}<small>{read} of {scripts.length} read{undecided > 0 ? `, ${undecided} to decide` : ''}</small></h2>
      <FiguresLine sample={sample} />
      <div className={styles.columns}>
        <div><QuestionTable paperId={paperId} sample={sample} /><OutsideList paperId={paperId} sample={sample} /></div>
        <SampledScripts sample={sample} addScript={acts.addScript} />
      </div>
      <FiguresPanel sample={sample} />
      <AdjustmentsSection paperId={paperId} sample={sample} owner={owner} undo={acts.undo} />
      {owner && <p className="mt-3"><Link className="btn plain" href={`/papers/${paperId}/second-mark/record/${sample.id}`}>Moderation record of {className}</Link></p>}
      <p className="small soft mt-3">Drawn on {sayInstant(sample.drawnAt)}: {sample.size} asked, usual {sample.defaultSize}; the seed {sample.seed.slice(0, 8)} draws it again.</p>
      {closedAt !== null && <p className="dense mt-2">Closed on {sayInstant(closedAt)}. Where nothing else was decided the first marks stand.</p>}
      {owner && closedAt === null && (
        <div className={styles.row}>
          <button className="btn" disabled={busy || undecided > 0 || sample.figures.n === 0} onClick={() => void run(acts.close(sample.id), () => undefined)}>Close the second marking</button>
          <span className="line">{undecided > 0 ? `${counted(undecided, 'answer is', 'answers are')} still to be decided.` : 'Inside the tolerance the first marks stand.'}</span>
        </div>
      )}
      {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
    </section>
  )
}
