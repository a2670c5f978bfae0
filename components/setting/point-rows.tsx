'use client'
import { useState, type Dispatch } from 'react'
import { newId } from '@/lib/core/ids'
import { halves, sayMark } from '@/lib/core/marks'
import type { SettingPoint, SettingQuestion } from '@/lib/core/setting'
import type { SettingView } from '@/lib/core/setting-view'
import type { SetEvent } from './set-state'
import { WorthInput } from './worth-input'
import css from './set.module.css'

type PointRowsProps = Readonly<{ question: SettingQuestion; view: SettingView; step: 1 | 2; send: Dispatch<SetEvent>; onWithdraw: (point: SettingPoint) => void; onBringBack: (point: SettingPoint) => void }>

/** What earns marks, written like a printed mark scheme; the row being written shows its kind and what it depends on. */
export function PointRows({ question, view, step, send, onWithdraw, onBringBack }: PointRowsProps) {
  const [open, setOpen] = useState<string | null>(null)
  const { points } = question
  const put = (next: readonly SettingPoint[], key: string | null = null) => send({ type: 'pointed', points: next, key })
  const patch = (id: string, change: Partial<SettingPoint>) => put(points.map((point) => (point.id === id ? { ...point, ...change } : point)), `point ${id} ${Object.keys(change).join()}`)
  function add(label: string) {
    const point: SettingPoint = { id: newId(), label, worth: halves(step), kind: null, dependsOn: null, note: '' }
    put([...points, point])
    setOpen(point.id)
    requestAnimationFrame(() => document.getElementById(`point-${point.id}`)?.focus())
  }
  return (
    <table className={css.points}>
      <thead><tr><th scope="col"><span className="vh">number</span></th><th scope="col">what earns it</th><th scope="col">worth</th></tr></thead>
      <tbody>
        {points.map((point, k) => (
          <PointRow key={point.id} {...{ point, points, step, patch, onBringBack }} number={k + 1} open={open === point.id} onOpen={() => setOpen(point.id)} withdrawn={view.withdrawnPoints.includes(point.id)}
            onGo={() => (view.stamped.includes(point.id) ? onWithdraw(point) : put(points.filter(({ id }) => id !== point.id)))} stamped={view.stamped.includes(point.id)} />
        ))}
        <tr>
          <td />
          <td colSpan={2}><button type="button" className={css.more} onClick={() => add('')}>one more mark point</button></td>
        </tr>
      </tbody>
      <tfoot>
        <tr>
          <td />
          <td>Most that can be given</td>
          <td>{points.length > 0 ? sayMark(question.maximum) : <WorthInput label="Most that can be given" worth={question.maximum} onWorth={(maximum) => send({ type: 'wrote', patch: { maximum } })} />}</td>
        </tr>
      </tfoot>
    </table>
  )
}

type PointRowProps = Readonly<{
  point: SettingPoint; points: readonly SettingPoint[]; number: number; open: boolean; step: 1 | 2; withdrawn: boolean; stamped: boolean
  patch: (id: string, change: Partial<SettingPoint>) => void; onOpen: () => void; onGo: () => void; onBringBack: (point: SettingPoint) => void
}>

function PointRow({ point, points, number, open, withdrawn, stamped, patch, onOpen, onGo, onBringBack }: PointRowProps) {
  const name = `mark point ${number}`
  return (
    <tr className={`${open ? css.edit : ''} ${withdrawn ? css.withdrawn : ''}`} onFocus={onOpen}>
      <td>{number}</td>
      <td>
        <textarea id={`point-${point.id}`} rows={1} aria-label={name} value={point.label} placeholder="what earns it" onChange={(event) => patch(point.id, { label: event.target.value })} />
        {(open || point.note) && <textarea className={css.note} rows={1} aria-label={`note to ${name}`} value={point.note} placeholder="note: what else is right, what is not" onChange={(event) => patch(point.id, { note: event.target.value })} />}
        {!open && (point.kind || point.dependsOn) && <p className={css.note}>{[point.kind, point.dependsOn && `depends on ${points.findIndex(({ id }) => id === point.dependsOn) + 1}`].filter(Boolean).join(', ')}</p>}
        {withdrawn && <p className={css.note}>withdrawn <button type="button" className="btn plain" onClick={() => onBringBack(point)}>Bring it back</button></p>}
        {open && !withdrawn && <PointDetails {...{ point, points, patch, name, onGo, stamped }} />}
      </td>
      <td><WorthInput label={`worth of ${name}`} worth={point.worth} onWorth={(worth) => patch(point.id, { worth })} /></td>
    </tr>
  )
}

function PointDetails({ point, points, patch, name, onGo, stamped }: Pick<PointRowProps, 'point' | 'points' | 'patch' | 'onGo' | 'stamped'> & { name: string }) {
  const others = points.filter(({ id, dependsOn }) => id !== point.id && dependsOn !== point.id)
  return (
    <div className={css.details}>
      <label>kind <select value={point.kind ?? ''} aria-label={`kind of ${name}`} onChange={(event) => patch(point.id, { kind: (event.target.value || null) as SettingPoint['kind'] })}>
        <option value="">any</option><option value="M">M, method</option><option value="A">A, accuracy</option><option value="B">B, independent</option>
      </select></label>
      {others.length > 0 && (
        <label>depends on <select value={point.dependsOn ?? ''} aria-label={`what ${name} depends on`} onChange={(event) => patch(point.id, { dependsOn: event.target.value || null })}>
          <option value="">nothing</option>
          {others.map((other) => <option key={other.id} value={other.id}>point {points.indexOf(other) + 1}</option>)}
        </select></label>
      )}
      <button type="button" className="btn plain" onClick={onGo}>{stamped ? 'Withdraw' : 'Take out'}</button>
    </div>
  )
}
