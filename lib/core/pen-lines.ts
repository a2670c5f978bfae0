import { line, type Ink, type LineInk, type Step } from './ink'
import type { PaperPoint } from './paper-space'

/** A line drawn by hand: bowed up a little, ending a little higher than it began. `w` points long, left end at `at`. */
export function bowedLine(at: PaperPoint, w: number): LineInk {
  return line([['M', at.x, at.y], bend(at, { x: at.x + w / 2, y: at.y - 1.6 }, { x: at.x + w, y: at.y - 0.4 })])
}

/** A wavy line of whole half waves, 3.5 points each, as near `w` as they come. */
export function wavyLine(at: PaperPoint, w: number): LineInk {
  const path: Step[] = [['M', at.x, at.y]]
  for (let k = 0; k < Math.max(2, Math.round(w / 3.5)); k++) {
    const from = { x: at.x + 3.5 * k, y: at.y }
    path.push(bend(from, { x: from.x + 1.75, y: at.y + (k % 2 === 0 ? -2.6 : 2.6) }, { x: from.x + 3.5, y: at.y }))
  }
  return line(path)
}

/** A pen line through x, y, x, y ...: bends with its corners as handles, so that a quick hand looks no rougher than it was. */
export function penLine(path: readonly number[]): Ink[] {
  const points = Array.from({ length: Math.floor(path.length / 2) }, (_, k) => ({ x: path[2 * k]!, y: path[2 * k + 1]! }))
  const first = points[0]
  const last = points.at(-1)
  if (!first || !last) return []
  const steps: Step[] = [['M', first.x, first.y]]
  let from: PaperPoint = first
  for (let k = 1; k < points.length - 1; k++) {
    const handle = points[k]!
    const next = points[k + 1]!
    const to = { x: (handle.x + next.x) / 2, y: (handle.y + next.y) / 2 }
    steps.push(bend(from, handle, to))
    from = to
  }
  // A single touch is a line of no length: its round ends make a dot.
  return [line([...steps, ['L', last.x, last.y]])]
}

/** A quadratic bend with one handle, as the cubic that is the same curve. */
function bend(from: PaperPoint, handle: PaperPoint, to: PaperPoint): Step {
  const toward = (a: number, b: number): number => a + (2 / 3) * (b - a)
  return ['C', toward(from.x, handle.x), toward(from.y, handle.y), toward(to.x, handle.x), toward(to.y, handle.y), to.x, to.y]
}
