'use client'
import { Field, SelectField } from '@/components/ui/field'

export type ClassDate = Readonly<{ classId: string; satOn: string }>
type ClassDatesProps = Readonly<{ classes: readonly Readonly<{ id: string; name: string; students: number }>[]; sets: readonly ClassDate[]; onChange: (sets: readonly ClassDate[]) => void; today: string }>

/** Which classes sit the paper, and when: one line a class. */
export function ClassDates({ classes, sets, onChange, today }: ClassDatesProps) {
  const rows = sets.length > 0 ? sets : [{ classId: '', satOn: today }]
  const put = (k: number, change: Partial<ClassDate>) => onChange(rows.map((row, j) => (j === k ? { ...row, ...change } : row)))
  return (
    <fieldset className="grid gap-2">
      <legend className="mb-3"><h2>Who sits it</h2></legend>
      {classes.length === 0 && <p className="soft">You have no class yet. Make one under Classes; the paper can be set meanwhile.</p>}
      {classes.length > 0 && rows.map((row, k) => (
        <div key={k} className="flex flex-wrap items-end gap-4">
          <SelectField label={rows.length > 1 ? `Class ${k + 1}` : 'Class'} value={row.classId} onChange={(event) => put(k, { classId: event.target.value })} className="w-56">
            <option value="">not yet</option>
            {classes.map(({ id, name, students }) => <option key={id} value={id}>{name}, {students} {students === 1 ? 'student' : 'students'}</option>)}
          </SelectField>
          <Field label="Date" type="date" value={row.satOn} required onChange={(event) => put(k, { satOn: event.target.value })} className="w-44" />
          {rows.length > 1 && <button type="button" className="btn plain" onClick={() => onChange(rows.filter((_, j) => j !== k))}>Take out</button>}
        </div>
      ))}
      {classes.length > rows.length && <p><button type="button" className="btn" onClick={() => onChange([...rows, { classId: '', satOn: rows.at(-1)!.satOn }])}>Another class</button></p>}
    </fieldset>
  )
}
