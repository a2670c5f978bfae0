'use client'
import { useEffect, useMemo, useReducer, useState, type ReactNode } from 'react'
import { PaperFrame } from '@/components/paper/paper-frame'
import { ask } from '@/components/ui/ask'
import type { PaperStages } from '@/lib/core/paper-stages'
import type { SettingView } from '@/lib/core/setting-view'
import { keyOfHand } from './boxes-on-page'
import { freshIds, PageDesk } from './page-desk'
import { BoxSheet, PaperSheet } from './paper-sheet'
import { SaveState } from './save-state'
import { SchemeSheet, type SetActs } from './scheme-sheet'
import { placeNew } from './setting-edits'
import { openSet, questionInHand, setPaper } from './set-state'
import { SetTrouble } from './set-trouble'
import { spaceKeyId } from './space-keys'
import { useSaving } from './use-saving'
import { useSetKeys } from './use-set-keys'
import css from './set.module.css'

const zooms = [0.5, 0.67, 0.8, 1, 1.25, 1.5, 2, 3]

type SetScreenProps = Readonly<{ opened: SettingView; stages: PaperStages; acts: SetActs; end: ReactNode }>

/** The page large, its answer spaces on it, and beside it the mark scheme of the space in hand. Saves as one goes. */
export function SetScreen({ opened, stages, acts, end }: SetScreenProps) {
  const [state, send] = useReducer(setPaper, opened, openSet)
  const [zoom, setZoom] = useState(1)
  const { view, setting, hand } = state
  const question = questionInHand(state)
  const key = keyOfHand(hand)
  useSaving(state, send)

  // The keyboard follows the box in hand, unless someone is writing.
  useEffect(() => {
    const active = document.activeElement
    if (key && (!active || active === document.body || active.closest('[data-page-desk]'))) document.getElementById(spaceKeyId(key))?.focus({ preventScroll: true })
  }, [key, state.page])

  const onZoom = (by: 1 | -1 | 0) => setZoom((now) => (by === 0 ? 1 : (zooms[zooms.indexOf(now) + by] ?? now)))
  const page = view.pages.find((each) => each.page === state.page)
  const keys = useMemo(() => ({
    newSpace: () => page && send({ type: 'drew', placed: placeNew(setting, page), ids: freshIds() }),
    copy: () => send({ type: 'copied', ids: freshIds() }),
    undo: () => send({ type: 'undid' }),
    redo: () => send({ type: 'redid' }),
    drop: () => (hand?.kind === 'space' && view.stamped.includes(hand.questionId) ? undefined : send({ type: 'dropped' })),
    leave: () => send({ type: 'took', hand: null }),
    scheme: () => document.querySelector<HTMLElement>('[data-scheme] textarea, [data-scheme] input, [data-scheme] button')?.focus(),
    nudge: (dx: number, dy: number, size: boolean) => send({ type: 'nudged', dx, dy, size }),
    zoom: onZoom,
  }), [setting, page, hand, view.stamped])
  useSetKeys(keys)

  const reload = async () => send({ type: 'opened', view: await ask<SettingView>(`/api/papers/${view.paperId}/setting`) })
  const counting = setting.questions.filter(({ id }) => view.withdrawnQuestions[id]?.as !== 'out')
  const counts = { ...stages.counts, questions: counting.length, marks: counting.reduce((sum, each) => sum + each.maximum, 0) }
  return (
    <PaperFrame stages={{ ...stages, counts }} now="Set" end={<><SaveState state={state} />{end}</>}>
      <main className={css.set}>
        <h1 className="vh">Set {view.title}</h1>
        {page
          ? <PageDesk state={state} send={send} zoom={zoom} onZoom={onZoom} onNewSpace={() => send({ type: 'chose', tool: 'space' })} />
          : <NoBlank paperId={view.paperId} />}
        <section className={css.scheme} data-scheme aria-label="Mark scheme" onKeyDown={(event) => event.key === 'Escape' && key && document.getElementById(spaceKeyId(key))?.focus()}>
          <SetTrouble state={state} send={send} />
          {question && <SchemeSheet key={question.id} state={state} question={question} send={send} acts={acts} reload={reload} />}
          {!question && hand && <BoxSheet state={state} send={send} />}
          {!question && !hand && <PaperSheet state={state} send={send} />}
        </section>
      </main>
    </PaperFrame>
  )
}

function NoBlank({ paperId }: { paperId: string }) {
  return (
    <section className={css.desk} aria-label="Blank paper">
      <div className="slip mx-auto mt-16">
        <h2>There is no blank paper yet</h2>
        <p className="mt-2 mb-4">Answer spaces are drawn on the pages of the test as it was printed: a PDF of up to 40 pages, A4, Letter or A3.</p>
        <a className="btn lead" href={`/papers/${paperId}/details#blank`}>Choose the blank paper</a>
      </div>
    </section>
  )
}
