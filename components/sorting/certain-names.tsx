'use client'
import { useEffect, useRef } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import type { SortScript, SortingTable } from '@/lib/core/sorting'
import { NameBox } from './name-boxes'
import { fullName, suggestedFor } from './sorting-words'
import style from './sorting.module.css'

type CertainNamesProps = Readonly<{
  table: SortingTable
  certain: readonly SortScript[]
  /** Whether the keyboard's place is here: no loose sheet and no unsure name is left. */
  lead: boolean
  busy: boolean
  onAll: () => void
  onOther: (script: SortScript) => void
  onLook: (leafId: string, script: SortScript) => void
}>

/** Names that the numbers in the boxes say with certainty, each under what was written: looked over at a glance, confirmed together, taken back together. */
export function CertainNames({ table, certain, lead, busy, onAll, onOther, onLook }: CertainNamesProps) {
  const all = useRef<HTMLButtonElement>(null)
  const count = certain.length
  useEffect(() => {
    if (lead && count > 0) all.current?.focus({ preventScroll: true })
  }, [lead, count])
  if (count === 0) return null
  return (
    <section aria-label="Certain names">
      <h2>Certain names <small>the number in the boxes is on the list; look them over</small></h2>
      <div className={style.confirmAll}>
        <button ref={all} type="button" className={`btn ${lead ? 'lead' : ''}`} disabled={busy} onClick={onAll}>{count === 1 ? 'Confirm 1 certain name' : `Confirm ${count} certain names`} <KeyCap>C</KeyCap></button>
        <span className="soft dense">Z takes them back together</span>
      </div>
      <ul className={style.certain}>
        {certain.map((script) => {
          const student = suggestedFor(script, table)!
          return (
            <li key={script.id}>
              <NameBox script={script} table={table} onLook={(leafId) => onLook(leafId, script)} />
              <span className={style.said}><b>{fullName(student)}</b> {student.candidateNumber}{student.sameName && <span className="soft"> namesake on the list</span>}
                <button type="button" className={style.act} disabled={busy} onClick={() => onOther(script)} aria-label={`Not ${fullName(student)}: other`}>other</button></span>
            </li>
          )
        })}
      </ul>
    </section>
  )
}
