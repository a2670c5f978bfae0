'use client'
import { useEffect, useRef } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import type { SortScript, SortingTable } from '@/lib/core/sorting'
import { NameBox } from './name-boxes'
import { fullName, suggestedFor, whySuggested } from './sorting-words'
import style from './sorting.module.css'

type NamesProps = Readonly<{
  table: SortingTable
  /** Scripts whose name has to be looked at, one by one. */
  unsure: readonly SortScript[]
  /** The script whose name is in hand. */
  inHand: string | null
  /** Whether the keyboard's place is with these names (no loose sheet is left). */
  lead: boolean
  busy: boolean
  onYes: (script: SortScript) => void
  onOther: (script: SortScript) => void
  onLook: (leafId: string, script: SortScript) => void
}>

/** Name boxes as written against the list: Y or Enter takes the suggestion, "other" looks someone else up. Never given by itself. */
export function NamesToConfirm({ table, unsure, inHand, lead, busy, onYes, onOther, onLook }: NamesProps) {
  const row = useRef<HTMLTableRowElement>(null)
  useEffect(() => {
    if (!lead) return
    row.current?.querySelector<HTMLButtonElement>('button[data-yes]')?.focus({ preventScroll: true })
    row.current?.scrollIntoView({ block: 'nearest' })
  }, [lead, inHand])
  if (unsure.length === 0) return null
  return (
    <section aria-label="Names to confirm">
      <h2>Names to confirm <small>{unsure.length} to look at one by one</small></h2>
      <table className={style.names}>
        <thead className="vh"><tr><th>As written</th><th>On the list</th><th>Is it right?</th></tr></thead>
        <tbody>
          {unsure.map((script) => {
            const hand = script.id === inHand
            return (
              <tr key={script.id} ref={hand ? row : undefined} className={hand && lead ? style.inHand : undefined}>
                <td className={style.crop}><NameBox script={script} table={table} onLook={(leafId) => onLook(leafId, script)} /></td>
                <Suggestion {...{ script, table, busy }} first={hand} onYes={() => onYes(script)} onOther={() => onOther(script)} />
              </tr>
            )
          })}
        </tbody>
      </table>
    </section>
  )
}

type SuggestionProps = Readonly<{ script: SortScript; table: SortingTable; busy: boolean; first: boolean; onYes: () => void; onOther: () => void }>

function Suggestion({ script, table, busy, first, onYes, onOther }: SuggestionProps) {
  const student = suggestedFor(script, table)
  if (!student) return <><td><span className="soft">nobody suggested{script.numberRead && `; number read as ${script.numberRead}`}</span></td><td className={style.go}><button type="button" className="btn" data-yes disabled={busy} onClick={onOther}>Say whose</button></td></>
  const name = fullName(student)
  return (
    <>
      <td><b>{name}</b> {student.candidateNumber}<span className={style.why}>{whySuggested(script, student)}</span></td>
      <td className={style.go}>
        <button type="button" className={`btn ${first ? 'lead' : ''}`} data-yes disabled={busy} onClick={onYes} aria-label={`Yes, ${name} ${student.candidateNumber}`}>Yes {first && <KeyCap>Y</KeyCap>}</button>{' '}
        <button type="button" className="btn plain" disabled={busy} onClick={onOther} aria-label={`Not ${name}: other`}>other</button>
      </td>
    </>
  )
}
