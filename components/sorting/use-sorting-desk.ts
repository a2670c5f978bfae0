'use client'
import { useReducer, useState } from 'react'
import type { SortScript, SortingTable } from '@/lib/core/sorting'
import type { SortingAct } from '@/lib/core/sorting-act'
import type { Choice } from './choose-student'
import { looseOrder, nameLeaf, nextView, openNames, pageInHand, startView, turned } from './sorting-view'
import { suggestedFor } from './sorting-words'
import { useKeys, useSingleKeys } from './use-keys'
import { useSorting } from './use-sorting'

/** What lies on the sorting table, what is in hand, and everything a person can do with it, by pointer or by key. */
export function useSortingDesk(start: SortingTable) {
  const { table, busy, savedAt, refused, act, forgive } = useSorting(start)
  const [view, send] = useReducer(nextView, startView)
  const [keysOn, setKeysOn] = useSingleKeys()
  const [nameHeld, setNameHeld] = useState<string | null>(null)
  const [pageMissing, setPageMissing] = useState<string | null>(null)

  const leaf = looseOrder(table.loose, view.later)[0] ?? null
  const page = leaf && pageInHand(leaf, view, table.pages.length)
  const names = openNames(table)
  const open = [...names.unsure, ...names.certain]
  const named = open.find(({ id }) => id === nameHeld) ?? open[0] ?? null
  const looked = view.looking && (table.scripts.find(({ id }) => id === view.looking!.scriptId) ?? null)

  const perform = (wanted: SortingAct) => {
    if (busy) return
    forgive()
    void act(wanted).then((done) => { if (done) send({ type: 'settled' }) })
  }
  const placeAt = (target: Choice['target'], instead = false) => {
    if (!leaf) return
    if (view.asking === 'extra') return perform({ act: 'extra', leafId: leaf.id, target })
    if (page === null) return setPageMissing(leaf.id)
    perform({ act: 'place', leafId: leaf.id, target, paperPage: page, instead })
  }
  /** A place that is offered because its page looks the same is offered for the new scan to replace it. */
  const placeNth = (k: number) => {
    const place = leaf?.places[k]
    if (place) placeAt(place.target, place.reason === 'looks_same')
  }
  const yes = (script: SortScript | null) => {
    const student = script && suggestedFor(script, table)
    if (!script || !student) return script ? send({ type: 'ask', for: { nameOf: script.id } }) : undefined
    setNameHeld(open[open.indexOf(script) + 1]?.id ?? null)
    perform({ act: 'name', scriptId: script.id, classSetId: student.classSetId, studentId: student.studentId })
  }
  const allCertain = () => {
    const certain = names.certain.flatMap(({ id, classSetId, suggestedStudentId }) => (suggestedStudentId ? { scriptId: id, classSetId, studentId: suggestedStudentId } : []))
    if (certain.length > 0) perform({ act: 'certain_names', names: certain })
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
  const turn = (by: 90 | -90) => { if (leaf) perform({ act: 'turn', leafId: leaf.id, turn: turned(leaf.turn, by) }) }
  const aside = () => { if (leaf) perform({ act: 'lay', leafId: leaf.id, to: 'set_aside' }) }
  const later = () => { if (leaf) { forgive(); send({ type: 'later', leafId: leaf.id }) } }
  const undo = () => { if (table.lastAct) perform({ act: 'undo' }) }
  const leave = () => (view.looking ? send({ type: 'look', at: null }) : refused ? forgive() : send({ type: 'ask', for: 'nothing' }))

  const keys: Record<string, () => unknown> = {
    z: undo, y: () => yes(named), c: allCertain, Escape: leave,
    '+': () => send({ type: 'zoom', by: 1 }), '=': () => send({ type: 'zoom', by: 1 }), '-': () => send({ type: 'zoom', by: -1 }),
    ...(leaf && !view.looking ? {
      '1': () => placeNth(0), '2': () => placeNth(1), '3': () => placeNth(2), '/': () => send({ type: 'ask', for: 'place' }), e: () => send({ type: 'ask', for: 'extra' }),
      d: aside, l: later, '[': () => turn(-90), ']': () => turn(90),
    } : {}),
  }
  useKeys(keysOn, (key) => { keys[key]?.(); return key in keys })

  return {
    table, busy, savedAt, refused, forgive, view, send, keysOn, setKeysOn, leaf, page, names, named, looked, namedLeaf: named && nameLeaf(named, table.namePage),
    /** Placing was asked for while nobody knew the page. */
    unpaged: leaf !== null && page === null && pageMissing === leaf.id,
    perform, placeAt, placeNth, yes, allCertain, chosen, look, turn, aside, later, undo,
  }
}

export type SortingDesk = ReturnType<typeof useSortingDesk>
