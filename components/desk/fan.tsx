'use client'
import { useEffect, useLayoutEffect, useRef, type ReactNode } from 'react'
import type { DeskState } from './desk-state'
import { RestingStrip } from './resting-strip'
import { widthOfSpace } from './space-picture'
import { sharpSrc, type Sizes } from './use-sizes'
import styles from './desk.module.css'

/** Strips on either side of the one in hand that are there at all: a run of hundreds stays light. */
const neighbours = 4
/** Pictures fetched ahead beyond those. */
const ahead = 6

type FanProps = Readonly<{ state: DeskState; sizes: Sizes; onTake: (index: number) => void; children: ReactNode }>

/** The run as if the papers were fanned out; `children` is the strip in hand. */
export function Fan({ state, sizes, onTake, children }: FanProps) {
  const { strips, hand, run } = state
  const fan = useRef<HTMLElement>(null)
  useLayoutEffect(() => {
    const inHand = fan.current?.querySelector<HTMLElement>('[aria-current="true"]')
    if (!fan.current || !inHand) return
    const spare = fan.current.clientHeight - inHand.offsetHeight
    fan.current.scrollTop = inHand.offsetTop - (spare > 0 ? spare * 0.45 : 8)
  }, [hand, sizes])
  useEffect(() => {
    for (let k = hand - neighbours - 1; k <= hand + neighbours + ahead; k++) for (const picture of strips[k]?.pictures ?? []) {
      if (picture.src) new Image().src = sharpSrc(picture.src, widthOfSpace(picture, strips[k]!, sizes), picture.rect.w, sizes.density)
    }
    // The pictures of a strip stay the same while it is stamped.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [hand, sizes])
  const from = Math.max(0, hand - neighbours)
  return (
    <main className={styles.fan} ref={fan} tabIndex={-1}>
      <ol className={styles.run} start={from + 1} aria-label={`Run of question ${run.question.label}`}>
        {strips.slice(from, hand).map((strip, k) => <RestingStrip key={strip.responseId} strip={strip} index={from + k} run={run} sizes={sizes} below={false} onTake={onTake} />)}
        {children}
        {strips.slice(hand + 1, hand + 1 + neighbours).map((strip, k) => <RestingStrip key={strip.responseId} strip={strip} index={hand + 1 + k} run={run} sizes={sizes} below onTake={onTake} />)}
      </ol>
    </main>
  )
}
