'use client'
import { Check } from 'lucide-react'
import { useReducer, useState, type ReactNode } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { TopBar } from '@/components/ui/top-bar'
import type { SortScript, SortingTable } from '@/lib/core/sorting'
import type { SortingAct } from '@/lib/core/sorting-act'
import { AllScripts } from './all-scripts'
import { ChooseStudent, choicesOf, type Choice } from './choose-student'
import { Finished } from './finished'
import { KeptLeaves } from './kept-leaves'
import { LooseSide } from './loose-side'
import { NamesToConfirm, suggestedFor } from './names-to-confirm'
import { PlacedSide } from './placed-side'
import { looseOrder, nameLeaf, nextView, openNames, pageInHand, startView, turned, zooms } from './sorting-view'
import { leftToSort, sayAct } from './sorting-words'
import { Trouble } from './trouble'
import { useKeys, useSingleKeys } from './use-keys'
import { useSorting } from './use-sorting'
import { WhatIsKnown } from './what-is-known'
import { WhereItBelongs } from './where-it-belongs'
import { WithoutScript } from './without-script'
import style from './sorting.module.css'

const atTime = (at: number) => new Date(at).toTimeString().slice(0, 8)

/** Loose sheets large, with what is known of them and their likeliest places, one key each; and the names still to be confirmed. */
export function SortingBoard({ start, person }: { start: SortingTable; person: ReactNode }) {
  const { table, busy, savedAt, refused, act, forgive } = useSorting(start)
  const [view, send] = useReducer(nextView, startView)
  const [keysOn, setKeysOn] = useSingleKeys()
  const [nameHeld, setNameHeld] = useState<string | null>(null)
  const [pageMissing, setPageMissing] = useState<string | null>(null)

  const order = looseOrder(table.loose, view.later)
  const leaf = order[0] ?? null
  const page = leaf && pageInHand(leaf, view, table.pages.length)
  const open = openNames(table)
  const named = open.find(({ id }) => id === nameHeld) ?? open[0] ?? null
  const looked = view.looking && (table.scripts.find(({ id }) => id === view.looking!.scriptId) ?? null)
  const namedLeaf = named && nameLeaf(named, table.namePage)

  const perform = (wanted: SortingAct) => {
    if (busy) return
    forgive()
    void act(wanted).then((done) => { if (done) send({ type: 'settled' }) })
  }
  const placeAt = (target: Choice['target']) => {
    if (!leaf) return
    if (view.asking === 'extra') return perform({ act: 'extra', leafId: leaf.id, target })
    if (page === null) return setPageMissing(leaf.id)
    perform({ act: 'place', leafId: leaf.id, target, paperPage: page })
  }
  const yes = (script: SortScript | null) => {
    const student = script && suggestedFor(script, table)
    if (!script || !student) return script ? send({ type: 'ask', for: { nameOf: script.id } }) : undefined
    setNameHeld(open[open.indexOf(script) + 1]?.id ?? null)
    perform({ act: 'name', scriptId: script.id, classSetId: student.classSetId, studentId: student.studentId })
  }
  const chosen = (choice: Choice) => {
    const { asking } = view
    if (typeof asking === 'object' && choice.student) perform({ act: 'name', scriptId: asking.nameOf, ...choice.student })
    else placeAt(choice.target)
    if (asking !== 'nothing') send({ type: 'ask', for: 'nothing' })
  }
  const look = (leafId: string, script: SortScript) => {
    if (script.studentId === null) setNameHeld(script.id)
    send({ type: 'look', at: { leafId, scriptId: script.id } })
  }
  const turn = (by: 90 | -90) => leaf && perform({ act: 'turn', leafId: leaf.id, turn: turned(leaf.turn, by) })

  const keys: Record<string, () => unknown> = {
    z: () => table.lastAct && perform({ act: 'undo' }),
    '+': () => send({ type: 'zoom', by: 1 }), '=': () => send({ type: 'zoom', by: 1 }), '-': () => send({ type: 'zoom', by: -1 }),
    y: () => yes(named),
    Escape: () => (view.looking ? send({ type: 'look', at: null }) : refused ? forgive() : send({ type: 'ask', for: 'nothing' })),
    ...(leaf && !view.looking ? {
      '1': () => leaf.places[0] && placeAt(leaf.places[0].target), '2': () => leaf.places[1] && placeAt(leaf.places[1].target), '3': () => leaf.places[2] && placeAt(leaf.places[2].target),
      '/': () => send({ type: 'ask', for: 'place' }), e: () => send({ type: 'ask', for: 'extra' }), d: () => perform({ act: 'lay', leafId: leaf.id, to: 'set_aside' }),
      l: () => { forgive(); send({ type: 'later', leafId: leaf.id }) }, '[': () => turn(-90), ']': () => turn(90),
    } : {}),
  }
  useKeys(keysOn, (key) => { keys[key]?.(); return key in keys })

  const unpaged = leaf && page === null && pageMissing === leaf.id && <p role="alert" className="alarm dense mt-2">Which page of the paper is it? Choose it above first, or make it an extra page.</p>
  const trouble = unpaged || refused && <Trouble error={refused.error} act={refused.act} busy={busy} onAct={perform} onClose={forgive} onCorners={() => send({ type: 'ask', for: 'corners' })} />
  const asksStudent = view.asking === 'place' || view.asking === 'extra' || typeof view.asking === 'object'
  const failedPlace = refused?.act.act === 'place' && view.asking === 'corners' ? refused.act : null
  const zoom = zooms[view.zoom]!

  return (
    <>
      <TopBar where={[...(table.classes.length > 0 ? [{ label: table.classes.join(', ') }] : []), { label: table.title, href: `/papers/${table.paperId}` }, { label: 'sorting table' }]}>
        <span role="status">{busy ? 'Saving' : savedAt ? <span className="line"><Check className="ic" aria-hidden /> Saved {atTime(savedAt)}</span> : ''}</span>
        <span>{leftToSort(table)}</span>
        {person}
      </TopBar>
      <div className={style.table}>
        <main>
          {looked && view.looking ? (
            <PlacedSide leafId={view.looking.leafId} script={looked} table={table} zoom={zoom} inHand={false} busy={busy} onOut={() => perform({ act: 'lay', leafId: view.looking!.leafId, to: 'loose' })} onBack={() => send({ type: 'look', at: null })} />
          ) : leaf ? (
            <LooseSide leaf={leaf} page={page} zoom={zoom} cornersOf={failedPlace} busy={busy} onTurn={turn} onCorners={perform} onCancel={() => { forgive(); send({ type: 'ask', for: 'nothing' }) }} />
          ) : named && namedLeaf ? (
            <PlacedSide leafId={namedLeaf.leafId} script={named} table={table} zoom={zoom} inHand busy={busy} onOut={() => perform({ act: 'lay', leafId: namedLeaf.leafId, to: 'loose' })} onBack={null} />
          ) : <Finished table={table} />}
          <div className={style.sayings} tabIndex={-1}>
            {leaf && !looked && (
              <>
                <WhatIsKnown leaf={leaf} table={table} page={page} onPage={(to) => send({ type: 'page', leafId: leaf.id, page: to })} />
                <WhereItBelongs leaf={leaf} table={table} page={page} busy={busy} trouble={trouble} onPlace={({ target }) => placeAt(target)} onOther={() => send({ type: 'ask', for: 'place' })} onExtra={() => send({ type: 'ask', for: 'extra' })}
                  onAside={() => perform({ act: 'lay', leafId: leaf.id, to: 'set_aside' })} onLater={() => { forgive(); send({ type: 'later', leafId: leaf.id }) }} />
              </>
            )}
            {(!leaf || looked) && trouble}
            <NamesToConfirm table={table} open={open} inHand={named?.id ?? null} lead={!leaf && !looked} busy={busy} onYes={yes} onOther={(script) => send({ type: 'ask', for: { nameOf: script.id } })} onLook={look} />
            <WithoutScript table={table} busy={busy} onAttendance={({ classSetId, studentId }, attendance) => perform({ act: 'attendance', classSetId, studentId, attendance })} />
            <AllScripts table={table} busy={busy} onLook={look} onOther={(script) => send({ type: 'ask', for: { nameOf: script.id } })} onUnname={({ id }) => perform({ act: 'unname', scriptId: id })} />
            <KeptLeaves title="Set aside" says="kept, not part of this test" leaves={table.setAside} busy={busy} onBack={({ id }) => perform({ act: 'lay', leafId: id, to: 'loose' })} />
            <KeptLeaves title="Empty backs" says="kept, not shown while marking" leaves={table.blank} busy={busy} onBack={({ id }) => perform({ act: 'lay', leafId: id, to: 'loose' })} />
          </div>
        </main>
        <footer className={style.hints}>
          <span>Nothing is placed until you press a key.</span>
          <button type="button" disabled={busy || !table.lastAct} onClick={() => perform({ act: 'undo' })}><KeyCap>Z</KeyCap> {sayAct(table.lastAct)}</button>
          <span><button type="button" aria-label="larger" onClick={() => send({ type: 'zoom', by: 1 })}><KeyCap>+</KeyCap></button> <button type="button" aria-label="smaller" onClick={() => send({ type: 'zoom', by: -1 })}><KeyCap>−</KeyCap></button> larger, smaller</span>
          <label className="chk"><input type="checkbox" checked={keysOn} onChange={(event) => setKeysOn(event.target.checked)} /> single keys</label>
          <span className={style.last}>Every placing is written to the audit log</span>
        </footer>
      </div>
      {asksStudent && (
        <ChooseStudent title={typeof view.asking === 'object' ? 'Whose script is it?' : view.asking === 'extra' ? 'Extra page of whose script?' : `Whose page ${page ?? ''} is it?`}
          choices={choicesOf(table, typeof view.asking === 'object')} onChosen={chosen} onClose={() => send({ type: 'ask', for: 'nothing' })} />
      )}
    </>
  )
}
