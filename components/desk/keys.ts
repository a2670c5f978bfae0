import type { StampKind } from '@/lib/core/stamp'

/** Everything a key can do at the desk. Which key does it is data, so that it can be changed. */
export type Command =
  | Readonly<{ do: 'point'; index: number; part: boolean }>
  | Readonly<{ do: 'stamp'; kind: StampKind }>
  | Readonly<{ do: 'code'; code: string }>
  | Readonly<{ do: 'nudge'; dx: number; dy: number }>
  | Readonly<{ do: 'nought' | 'nothing-written' | 'note' | 'await-code' | 'undo' | 'redo' | 'up' | 'down' | 'first' | 'last' | 'settle' | 'whole-page' | 'scheme' | 'take-back' | 'let-go' }>

/** Mark points lie under the resting hands, in the order of the scheme. */
export const pointKeys = ['a', 's', 'd', 'f', 'j', 'k', 'l'] as const
export const stampKeys: Readonly<Record<string, StampKind>> = { t: 'tick', h: 'half', x: 'cross', o: 'ring', c: 'caret', u: 'underline', w: 'wavy', e: 'seen' }
/** After the stroke: the first letter of a code. */
export const codeKeys: Readonly<Record<string, string>> = { f: 'ft', i: 'isw', b: 'BOD', o: 'oe', s: 'SC', e: 'ecf' }
const commandKeys: Readonly<Record<string, Extract<Command, { do: string }>['do']>> = {
  '0': 'nought', r: 'nothing-written', n: 'note', '/': 'await-code', p: 'whole-page', m: 'scheme', Enter: 'settle', ArrowUp: 'up', ArrowDown: 'down', Home: 'first', End: 'last', Escape: 'let-go', Delete: 'take-back', Backspace: 'take-back',
}
const arrows: Readonly<Record<string, readonly [number, number]>> = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] }

type Pressed = Readonly<{ key: string; shiftKey: boolean; ctrlKey: boolean; metaKey: boolean; altKey: boolean }>
type Standing = Readonly<{ codeAwaited: boolean; stampSelected: boolean }>

/** What a key does as the desk stands; null when it means nothing here. Keys with Ctrl, Alt or Command belong to the browser. */
export function commandOf({ key, shiftKey, ctrlKey, metaKey, altKey }: Pressed, { codeAwaited, stampSelected }: Standing): Command | null {
  if (ctrlKey || metaKey || altKey) return null
  const letter = key.length === 1 ? key.toLowerCase() : key
  if (codeAwaited && codeKeys[letter]) return { do: 'code', code: codeKeys[letter] }
  const arrow = arrows[key]
  if (stampSelected && arrow) return { do: 'nudge', dx: arrow[0] * (shiftKey ? 10 : 2), dy: arrow[1] * (shiftKey ? 10 : 2) }
  if (letter === 'z') return { do: shiftKey ? 'redo' : 'undo' }
  const index = (pointKeys as readonly string[]).indexOf(letter)
  if (index >= 0) return { do: 'point', index, part: shiftKey }
  const kind = stampKeys[letter]
  if (kind) return { do: 'stamp', kind }
  const simple = commandKeys[letter]
  return simple ? ({ do: simple } as Command) : null
}
