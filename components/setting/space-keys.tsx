'use client'
import type { DrawnBox } from './boxes-on-page'
import type { Hand } from './set-state'
import css from './set.module.css'

type SpaceKeysProps = Readonly<{ boxes: readonly DrawnBox[]; inHand: string | null; scale: number; onTake: (hand: Hand) => void }>

export const spaceKeyId = (key: string) => `space-${key}`

/** Each box as something the keyboard and a screen reader can reach, with its tag; the pen goes through to the canvas below. */
export function SpaceKeys({ boxes, inHand, scale, onTake }: SpaceKeysProps) {
  return (
    <>
      <p id="space-help" className="vh">Arrow keys move it; with shift they make it larger or smaller. Enter goes to its scheme. Delete takes it away. Q draws a new answer space, C copies this one to the next question.</p>
      {boxes.map((box) => (
        <button
          key={box.key} id={spaceKeyId(box.key)} type="button" aria-label={box.name} aria-describedby="space-help" aria-pressed={box.key === inHand}
          className={`${css.space} ${box.dashed ? css.id : ''} ${box.key === inHand ? css.inHand : ''}`}
          style={{ left: box.rect.x * scale, top: box.rect.y * scale, width: box.rect.w * scale, height: box.rect.h * scale }}
          onFocus={() => onTake(box.hand)}
        >
          <b aria-hidden>{box.tag}</b>
        </button>
      ))}
    </>
  )
}
