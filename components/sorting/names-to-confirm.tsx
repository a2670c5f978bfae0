'use client'
import { useEffect, useRef } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import type { SortScript, SortStudent, SortingTable } from '@/lib/core/sorting'
import { NameBoxes } from './name-boxes'
import { nameLeaf } from './sorting-view'
import { fullName } from './sorting-words'
import style from './sorting.module.css'

type NamesProps = Readonly<{
  table: SortingTable
  open: readonly SortScript[]
  /** The script whose name is in hand. */
  inHand: string | null
  /** Whether the keyboard's place is with the names (no loose sheet is left). */
  lead: boolean
  busy: boolean
  onYes: (script: SortScript, student: SortStudent) => void
  onOther: (script: SortScript) => void
  onLook: (leafId: string, script: SortScript) => void
}>

/** Name boxes as written against the list: Y or Enter takes the suggestion, "other" looks someone else up. Never given by itself. */
export function NamesToConfirm({ table, open, inHand, lead, busy, onYes, onOther, onLook }: NamesProps) {
  const row = useRef<HTMLTableRowElement>(null)
  useEffect(() => {
    if (!lead) return
    row.current?.querySelector<HTMLButtonElement>('button[data-yes]')?.focus({ preventScroll: true })
    row.current?.scrollIntoView({ block: 'nearest' })
  }, [lead, inHand])
  if (open.length === 0) return null
  return (
    <section aria-label="Names to confirm">
      <h2>Names to confirm <small>{open.length} of {table.scripts.length}; suggested by the order of the list, so look at each</small></h2>
      <table className={style.names}>
        <thead className="vh"><tr><th>As written</th><th>On the list</th><th>Is it right?</th></tr></thead>
        <tbody>
          {open.map((script) => {
            const hand = script.id === inHand
            return (
              <tr key={script.id} ref={hand ? row : undefined} className={hand && lead ? style.inHand : undefined}>
                <td className={style.crop}><NameBox script={script} table={table} onLook={(leafId) => onLook(leafId, script)} /></td>
                <Suggestion {...{ script, table, busy }} first={hand} onYes={(student) => onYes(script, student)} onOther={() => onOther(script)} />
              </tr>
            )
          })}
        </tbody>
      </table>
    </section>
  )
}

export function suggestedFor(script: SortScript, table: SortingTable): SortStudent | undefined {
  return table.students.find(({ studentId, classSetId }) => studentId === script.suggestedStudentId && classSetId === script.classSetId)
}

function NameBox({ script, table, onLook }: { script: SortScript; table: SortingTable; onLook: (leafId: string) => void }) {
  const leaf = nameLeaf(script, table.namePage)
  if (!leaf) return <span className="soft">no page is left in it</span>
  return (
    <button type="button" className={style.look} onClick={() => onLook(leaf.leafId)} aria-label={`Look at script ${script.number}`}>
      {leaf.hasBox ? <NameBoxes leafId={leaf.leafId} boxes={table.nameBoxes} of={`script ${script.number}`} /> : <span className="soft underline">script {script.number} has no page with the name: look at what there is</span>}
    </button>
  )
}

type SuggestionProps = Readonly<{ script: SortScript; table: SortingTable; busy: boolean; first: boolean; onYes: (student: SortStudent) => void; onOther: () => void }>

function Suggestion({ script, table, busy, first, onYes, onOther }: SuggestionProps) {
  const student = suggestedFor(script, table)
  if (!student) return <><td><span className="soft">nobody suggested</span></td><td className={style.go}><button type="button" className="btn" data-yes disabled={busy} onClick={onOther}>Say whose</button></td></>
  const name = fullName(student)
  return (
    <>
      <td><b>{name}</b> {student.candidateNumber}<span className={style.why}>{student.sameName ? 'a namesake is on the list: read the number' : 'next on the list'}</span></td>
      <td className={style.go}>
        <button type="button" className={`btn ${first ? 'lead' : ''}`} data-yes disabled={busy} onClick={() => onYes(student)} aria-label={`Yes, ${name} ${student.candidateNumber}`}>Yes {first && <KeyCap>Y</KeyCap>}</button>{' '}
        <button type="button" className="btn plain" disabled={busy} onClick={onOther} aria-label={`Not ${name}: other`}>other</button>
      </td>
    </>
  )
}
