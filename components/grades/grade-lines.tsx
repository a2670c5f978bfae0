import type { HalfMarks } from '@/lib/core/marks'
import { percent, readMark } from '@/lib/core/marks'
import { faultOfMark, type ScaleLine } from './scale-in-work'
import styles from './grades.module.css'

type GradeLinesProps = Readonly<{
  lines: readonly ScaleLine[]
  maximum: HalfMarks
  /** How many students have each grade, by its line's key. */
  students: ReadonlyMap<number, number>
  below: number
  onChange: (key: number, change: Partial<ScaleLine>) => void
  onDrop: (key: number) => void
}>

function Students({ n, most }: { n: number; most: number }) {
  return <td className={styles.who}><span className={styles.bar} aria-hidden style={{ width: `${(n / Math.max(1, most)) * 6}rem` }} />{n}</td>
}

/** One line a grade: its name, the lowest mark that still belongs to it, and how many have it. */
export function GradeLines({ lines, maximum, students, below, onChange, onDrop }: GradeLinesProps) {
  const most = Math.max(below, ...students.values())
  return (
    <table className={`tbl ${styles.scale}`}>
      <thead><tr><th scope="col">Grade</th><th scope="col">From</th><th scope="col">Percent</th><th scope="col">Students</th><th scope="col"><span className="vh">Take out</span></th></tr></thead>
      <tbody>
        {lines.map(({ key, grade, lowest }, k) => {
          const fault = faultOfMark(lowest, maximum)
          const mark = readMark(lowest)
          return (
            <tr key={key}>
              <td className={styles.grade}><input aria-label={`Name of grade ${k + 1}`} value={grade} maxLength={20} aria-invalid={grade.trim() === '' || undefined} onChange={(event) => onChange(key, { grade: event.target.value })} /></td>
              <td className={styles.lowest}>
                <input aria-label={`Lowest mark of ${grade || `grade ${k + 1}`}`} inputMode="decimal" value={lowest} aria-invalid={fault !== null || undefined} onChange={(event) => onChange(key, { lowest: event.target.value })} />
                {fault && <span className={styles.fault} role="alert">{fault}</span>}
              </td>
              <td>{mark !== null && maximum > 0 ? `${percent(mark, maximum)} %` : '–'}</td>
              <Students n={students.get(key) ?? 0} most={most} />
              <td className="text-right"><button type="button" className="btn plain" onClick={() => onDrop(key)} aria-label={`Take out grade ${grade}`}>Take out</button></td>
            </tr>
          )
        })}
        {below > 0 && <tr><td className="soft">no grade</td><td className="soft">below</td><td /><Students n={below} most={most} /><td /></tr>}
      </tbody>
    </table>
  )
}
