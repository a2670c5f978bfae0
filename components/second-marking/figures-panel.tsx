'use client'
import { useState } from 'react'
import { SelectField } from '@/components/ui/field'
import type { FigureRow } from '@/lib/core/moderation-figures'
import { sayMark } from '@/lib/core/marks'
import type { SampleView } from '@/lib/core/second-marking'
import { DifferencePlot } from './difference-plot'
import { FiguresInFull } from './figures-in-full'
import { FiguresTable } from './figures-table'
import { HeatTable } from './heat-table'
import type { Plotted } from './place-plot'
import { sayCaution, sayDifference } from '@/lib/core/say-difference'
import styles from './figures.module.css'

/** The pairs behind a row of figures, largest difference first. */
function pairsOf({ questions, moderation }: SampleView, key: string): Plotted[] {
  if (key === 'totals') return sorted(moderation.comparedTotals.map(({ scriptId, scriptNumber, first, second }) => ({ key: scriptId, says: `Script ${scriptNumber}`, first, second, inside: true })))
  const own = questions.flatMap(({ label, compared }) => compared.map((answer) => ({ label, ...answer })))
    .filter(({ questionId, markerId }) => key === 'answers' || questionId === key || markerId === key)
  return sorted(own.map(({ responseId, label, scriptNumber, first, second, within }) => ({ key: responseId, says: `${label}, script ${scriptNumber}`, first, second, inside: within })))
}

function sorted(pairs: readonly Plotted[]): Plotted[] {
  return pairs.toSorted((a, b) => Math.abs(b.first - b.second) - Math.abs(a.first - a.second))
}

/** The figures of a sample: by question, marker and paper, each marker in each question, and the differences behind any row. */
export function FiguresPanel({ sample }: { sample: SampleView }) {
  const { moderation } = sample
  const rows: readonly FigureRow[] = [moderation.totals, moderation.answers, ...moderation.questions, ...moderation.markers].filter(({ figures }) => figures.n > 0)
  const [chosen, setChosen] = useState('')
  const row = rows.find(({ key }) => key === chosen) ?? rows[0]
  if (!row) return null
  const pairs = pairsOf(sample, row.key)
  const named = (one: FigureRow) => (moderation.questions.includes(one) ? `Question ${one.label}` : one.label)
  const caution = sayCaution(row.figures)
  return (
    <section className={styles.panel} aria-labelledby={`figures-${sample.id}`}>
      <h3 id={`figures-${sample.id}`}>What the marks show</h3>
      <p className="small soft">Blind second marks only; a second mark given in sight of the first would agree more often and is not counted here.</p>
      <FiguresTable moderation={moderation} />
      <h4>Each marker in each question</h4>
      <HeatTable moderation={moderation} />
      <div className={styles.over}>
        <h4>Differences</h4>
        <SelectField label="Of" value={row.key} onChange={(event) => setChosen(event.target.value)}>
          {rows.map((one) => <option key={one.key} value={one.key}>{named(one)}, n = {one.figures.n}</option>)}
        </SelectField>
      </div>
      {caution && <p className="dense mt-2"><b className="font-semibold">{caution}</b></p>}
      <div className={styles.beside}>
        <figure>
          <DifferencePlot name={named(row)} pairs={pairs} figures={row.figures} maximum={row.maximum} tolerance={row.tolerance} />
          <figcaption className="small soft">{row.tolerance === null ? 'Each ring is one pair.' : <>Rings lie inside the tolerance of {sayMark(row.tolerance)} (the band), crosses outside.</>} A number: that many fall together. Full line: mean; broken lines: limits of agreement, mean ± 1.96 SD.</figcaption>
        </figure>
        <div className={styles.lists}>
          <div className={styles.tall} tabIndex={0} role="group" aria-label={`The pairs of ${named(row)}`}>
            <table className="tbl">
              <thead><tr><th scope="col">{row.key === 'totals' ? 'Script' : 'Answer'}</th><th scope="col">First</th><th scope="col">Second</th><th scope="col">Difference</th></tr></thead>
              <tbody>
                {pairs.map(({ key, says, first, second, inside }) => (
                  <tr key={key}><th scope="row">{says}</th><td>{sayMark(first)}</td><td>{sayMark(second)}</td><td>{sayDifference(first - second)}{!inside && <small> outside</small>}</td></tr>
                ))}
              </tbody>
            </table>
          </div>
          <FiguresInFull row={row} />
        </div>
      </div>
    </section>
  )
}
