'use client'
import { useState } from 'react'
import { counted } from '@/components/paper/stage-words'
import { Alarm } from '@/components/ui/alarm'
import { SelectField } from '@/components/ui/field'
import { useOutcome } from '@/components/ui/use-outcome'
import { gradeOf } from '@/lib/core/grade-of'
import type { GradesPage } from '@/lib/core/grades-page'
import { sayMark } from '@/lib/core/marks'
import type { Outcome } from '@/lib/core/outcome'
import type { OddHalf } from '@/lib/core/paper'
import { scaleSuggestions } from '@/lib/core/scale-suggestions'
import { GradeLines } from './grade-lines'
import styles from './grades.module.css'
import { faultOfMark, openScale, scaleOf, type ScaleInWork, type ScaleLine } from './scale-in-work'

type GradesScreenProps = Readonly<{ grades: GradesPage; save: (paperId: unknown, raw: unknown) => Promise<Outcome<void>> }>

/** How many totals fall on each line of the scale as typed; by the line's key, -1 for none. */
function countLines({ oddHalf, lines }: ScaleInWork, { totals }: GradesPage): Map<number, number> {
  const byKey = scaleOf({ oddHalf, lines: lines.map((line) => ({ ...line, grade: String(line.key) })), nextKey: 0 })
  const counts = new Map<number, number>()
  for (const total of totals) {
    const key = Number(gradeOf(byKey, total) ?? -1)
    counts.set(key, (counts.get(key) ?? 0) + 1)
  }
  return counts
}

/** The paper's grade scale: boundaries that belong to their grade, the rule for an odd half, and what it gives these students. */
export function GradesScreen({ grades, save }: GradesScreenProps) {
  const { paperId, maximum, totals, notWhole } = grades
  const [scale, setScale] = useState(() => openScale(grades.scale))
  const [saved, setSaved] = useState(false)
  const { busy, trouble, run } = useOutcome()
  const counts = countLines(scale, grades)
  const faulty = scale.lines.some(({ grade, lowest }) => grade.trim() === '' || faultOfMark(lowest, maximum) !== null)
  function put(next: ScaleInWork) {
    setScale(next)
    setSaved(false)
  }
  const change = (key: number, to: Partial<ScaleLine>) => put({ ...scale, lines: scale.lines.map((line) => (line.key === key ? { ...line, ...to } : line)) })
  return (
    <main className="page">
      <h1>Grade scale</h1>
      <p className="soft max-w-[44rem]">A grade goes to every total from its mark on, that mark included. The school decides the scale; marks never change with it.</p>
      <div className={styles.columns}>
        <section aria-label="The scale">
          <GradeLines lines={scale.lines} maximum={maximum} students={counts} below={counts.get(-1) ?? 0} onChange={change} onDrop={(key) => put({ ...scale, lines: scale.lines.filter((line) => line.key !== key) })} />
          {scale.lines.length === 0 && <p className="dense soft mt-2">No grade yet. Start from a suggestion, or add a grade.</p>}
          <div className={styles.row}>
            <button type="button" className="btn" onClick={() => put({ ...scale, lines: [...scale.lines, { key: scale.nextKey, grade: '', lowest: '' }], nextKey: scale.nextKey + 1 })}>Add a grade</button>
          </div>
          <div className={styles.row}>
            <SelectField label="An odd half before comparing" value={scale.oddHalf} onChange={(event) => put({ ...scale, oddHalf: event.target.value as OddHalf })} say="Only for finding the grade: the total itself stays as it is.">
              <option value="kept">stays a half</option>
              <option value="up">goes up to the whole mark</option>
              <option value="down">goes down to the whole mark</option>
            </SelectField>
          </div>
          <div className={styles.row}>
            <button className="btn lead" disabled={busy || faulty} onClick={() => void run(save(paperId, scaleOf(scale)), () => setSaved(true))}>Save the scale</button>
            <span className="line" role="status">{faulty ? 'Mend the lines above first.' : saved ? 'Saved.' : ''}</span>
          </div>
          {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
        </section>
        <section aria-label="Start from">
          <p className="dense">{counted(totals.length, 'whole script', 'whole scripts')} of {sayMark(maximum)} marks counted{notWhole > 0 ? `; ${notWhole} not fully marked yet and without a grade` : ''}.</p>
          <h2 className="mt-6">Start from</h2>
          <ul className={styles.suggestions}>
            {scaleSuggestions.map(({ name, says, scale: make }) => (
              <li key={name}><div><b className="font-semibold">{name}</b><p className="dense soft">{says}</p></div><button type="button" className="btn" disabled={maximum === 0} onClick={() => put(openScale(make(maximum)))} aria-label={`Start from ${name}`}>Use it</button></li>
            ))}
          </ul>
          <p className="small soft mt-2">Examples only. Your school’s own assessment policy decides.</p>
        </section>
      </div>
    </main>
  )
}
