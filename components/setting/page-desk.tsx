'use client'
import dynamic from 'next/dynamic'
import { Undo2 } from 'lucide-react'
import { useLayoutEffect, useRef, useState, type Dispatch } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { newId } from '@/lib/core/ids'
import { boxesOnPage, keyOfHand } from './boxes-on-page'
import { SpaceKeys } from './space-keys'
import type { SetEvent, SetState, Tool } from './set-state'
import css from './set.module.css'
import { useGesture } from './use-gesture'
import { usePagePicture } from './use-page-picture'

const PageCanvas = dynamic(() => import('./page-canvas').then((module) => module.PageCanvas), { ssr: false })

export const freshIds = () => ({ question: newId(), space: newId(), point: newId() })
/** As wide as a page is drawn when it fits, in pixels. */
const widest = 760
const noLines = { xs: [], ys: [] }

type PageDeskProps = Readonly<{ state: SetState; send: Dispatch<SetEvent>; zoom: number; onZoom: (by: 1 | -1 | 0) => void; onNewSpace: () => void }>

/** The page itself, large, with its answer spaces drawn on it. */
export function PageDesk({ state, send, zoom, onZoom, onNewSpace }: PageDeskProps) {
  const { view, setting, hand, tool } = state
  const page = view.pages.find((each) => each.page === state.page)!
  const desk = useRef<HTMLDivElement>(null)
  const scale = (useFit(desk) * zoom) / page.width
  const picture = usePagePicture(view.blank && `/api/papers/${view.paperId}/pages/${page.page}?v=${view.blank}`, page)
  const loaded = picture && picture !== 'failed' ? picture : null
  const boxes = boxesOnPage(setting, page.page, view.withdrawnQuestions)
  const gesture = useGesture({
    page, scale, boxes, hand, tool, print: loaded?.lines ?? noLines,
    onTake: (next) => send({ type: 'took', hand: next }),
    onDraw: (rect) => send({ type: 'drew', placed: { page: page.page, rect }, ids: freshIds() }),
    onPlace: (rect) => send({ type: 'placed', rect }),
  })
  const draft = gesture.at && gesture.rect ? { key: gesture.at, rect: gesture.rect } : null
  const moved = boxes.map((box) => (draft?.key === box.key ? { ...box, rect: draft.rect } : box))
  return (
    <section className={css.desk} data-page-desk ref={desk} aria-label={`Blank paper, page ${page.page} of ${view.pages.length}`}>
      <div className={css.tools} style={{ width: Math.max(page.width * scale, 420) }}>
        <PageTabs state={state} send={send} />
        <Tools state={state} send={send} onNewSpace={onNewSpace} />
        <div className={css.zoom} role="group" aria-label="Size of the page">
          <button type="button" className="btn" onClick={() => onZoom(-1)} aria-label="Smaller">−</button>
          <button type="button" className="btn" onClick={() => onZoom(0)}>{zoom === 1 ? 'Fits' : `${Math.round(zoom * 100)} %`}</button>
          <button type="button" className="btn" onClick={() => onZoom(1)} aria-label="Larger">+</button>
        </div>
      </div>
      {tool && <p className={css.armed} style={{ width: page.width * scale }}><span className="swipe">{armedWords[tool]}</span> <button type="button" className="btn plain" onClick={() => send({ type: 'chose', tool: null })}>Not now</button></p>}
      <div
        className={css.sheet} style={{ width: page.width * scale, height: page.height * scale, cursor: tool ? 'crosshair' : 'default', touchAction: tool || hand ? 'none' : 'auto' }}
        {...gesture.handlers}
      >
        <PageCanvas page={page} scale={scale} image={loaded?.image ?? null} boxes={boxes} inHand={keyOfHand(hand)} draft={draft} />
        {view.blank && !picture && <p className={css.waiting}>The page is being drawn</p>}
        {picture === 'failed' && <p className={css.waiting}>This page could not be drawn. Its spaces are all here; load the page again to try once more.</p>}
        <SpaceKeys boxes={moved} inHand={keyOfHand(hand)} scale={scale} onTake={(next) => keyOfHand(next) !== keyOfHand(hand) && send({ type: 'took', hand: next })} />
      </div>
    </section>
  )
}

const armedWords: Record<Tool, string> = {
  space: 'Drag over the page where the answer goes',
  more: 'Drag where this question goes on; another page will do',
  name: 'Drag over where the name is written',
  number: 'Drag over all boxes of the candidate number at once',
}

function PageTabs({ state: { view, page }, send }: Pick<PageDeskProps, 'state' | 'send'>) {
  if (view.pages.length > 12) {
    return (
      <label className={css.pageChoice}>Page <select value={page} onChange={(event) => send({ type: 'turned', page: Number(event.target.value) })}>
        {view.pages.map((each) => <option key={each.page}>{each.page}</option>)}
      </select> of {view.pages.length}</label>
    )
  }
  return (
    <div className={`tabs ${css.pages}`} role="group" aria-label="Pages">
      {view.pages.map((each) => (
        <button key={each.page} type="button" aria-current={each.page === page ? 'page' : undefined} onClick={() => send({ type: 'turned', page: each.page })}>{view.pages.length > 4 ? each.page : `Page ${each.page}`}</button>
      ))}
    </div>
  )
}

function Tools({ state, send, onNewSpace }: Pick<PageDeskProps, 'state' | 'send' | 'onNewSpace'>) {
  const arm = (tool: Tool) => ({ 'aria-pressed': state.tool === tool, onClick: () => send({ type: 'chose', tool }) })
  const has = (kind: 'name' | 'number') => state.setting.boxes.some((box) => box.kind === kind)
  return (
    <div className={css.draw} role="group" aria-label="Draw">
      <button type="button" className="btn" onClick={onNewSpace}><KeyCap>Q</KeyCap> New answer space</button>
      {!has('name') && <button type="button" className="btn" {...arm('name')}>Name box</button>}
      {!has('number') && <button type="button" className="btn" {...arm('number')}>Number boxes</button>}
      <button type="button" className="btn" disabled={state.past.length === 0} onClick={() => send({ type: 'undid' })}><Undo2 className="ic" aria-hidden /> Undo</button>
    </div>
  )
}

/** The width in pixels a page is drawn at to fit its desk. */
function useFit(desk: React.RefObject<HTMLDivElement | null>): number {
  const [width, setWidth] = useState(widest)
  useLayoutEffect(() => {
    const element = desk.current
    if (!element) return
    const measure = () => setWidth(Math.min(widest, Math.max(280, element.clientWidth - 2 * parseFloat(getComputedStyle(element).paddingLeft))))
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(element)
    return () => observer.disconnect()
  }, [desk])
  return width
}
