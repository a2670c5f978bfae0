'use client'
import { Check } from 'lucide-react'
import type { ReactNode } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { TopBar } from '@/components/ui/top-bar'
import type { SortingTable } from '@/lib/core/sorting'
import { ChooseStudent, choicesOf } from './choose-student'
import { SheetInHand } from './sheet-in-hand'
import { leftToSort, sayAct } from './sorting-words'
import { useSortingDesk, type SortingDesk } from './use-sorting-desk'
import { WhatToDo } from './what-to-do'
import style from './sorting.module.css'

const atTime = (at: number) => new Date(at).toTimeString().slice(0, 8)

/** Loose sheets large, with what is known of them and their likeliest places, one key each; and the names still to be confirmed. */
export function SortingBoard({ start, person }: { start: SortingTable; person: ReactNode }) {
  const desk = useSortingDesk(start)
  const { table, busy, savedAt } = desk
  return (
    <>
      <TopBar where={[...(table.classes.length > 0 ? [{ label: table.classes.join(', ') }] : []), { label: table.title, href: `/papers/${table.paperId}` }, { label: 'sorting table' }]}>
        <span role="status">{busy ? 'Saving' : savedAt ? <span className="line"><Check className="ic" aria-hidden /> Saved {atTime(savedAt)}</span> : ''}</span>
        <span>{leftToSort(table)}</span>
        {person}
      </TopBar>
      <div className={style.table}>
        <main>
          <SheetInHand desk={desk} />
          <WhatToDo desk={desk} />
        </main>
        <Hints desk={desk} />
      </div>
      <AskStudent desk={desk} />
    </>
  )
}

function Hints({ desk: { table, busy, undo, send, keysOn, setKeysOn } }: { desk: SortingDesk }) {
  return (
    <footer className={style.hints}>
      <span>Nothing is placed until you press a key.</span>
      <button type="button" disabled={busy || !table.lastAct} onClick={undo}><KeyCap>Z</KeyCap> {sayAct(table.lastAct)}</button>
      <span><button type="button" aria-label="larger" onClick={() => send({ type: 'zoom', by: 1 })}><KeyCap>+</KeyCap></button> <button type="button" aria-label="smaller" onClick={() => send({ type: 'zoom', by: -1 })}><KeyCap>−</KeyCap></button> larger, smaller</span>
      <label className="chk"><input type="checkbox" checked={keysOn} onChange={(event) => setKeysOn(event.target.checked)} /> single keys</label>
      <span className={style.last}>Every placing is written to the audit log</span>
    </footer>
  )
}

function AskStudent({ desk: { table, view, page, chosen, send } }: { desk: SortingDesk }) {
  const { asking } = view
  const name = typeof asking === 'object'
  if (!name && asking !== 'place' && asking !== 'extra') return null
  const title = name ? 'Whose script is it?' : asking === 'extra' ? 'Extra page of whose script?' : `Whose page ${page ?? ''} is it?`
  return <ChooseStudent title={title} choices={choicesOf(table, name)} onChosen={chosen} onClose={() => send({ type: 'ask', for: 'nothing' })} />
}
