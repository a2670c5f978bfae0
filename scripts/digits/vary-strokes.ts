import type { CentreLines } from './centre-lines'
import type { Dice } from './dice'

type Point = readonly [number, number]

/** Ways of writing that the data set hardly has: a bar through the seven, a flag and a foot on the one, a bar through nought. */
export function withHabits(digit: number, lines: CentreLines, dice: Dice): CentreLines {
  const { left, right, top, bottom } = extent(lines)
  const [w, h] = [right - left, bottom - top]
  if (digit === 7 && dice.chance(0.22)) {
    const x = left + w * dice.real(0.4, 0.65)
    const y = top + h * dice.real(0.42, 0.58)
    const reach = Math.max(w, 6) * dice.real(0.22, 0.36)
    return joined(lines, stroke([[x - reach, y + dice.bell(0.6)], [x + reach, y + dice.bell(0.6)]]))
  }
  if (digit === 1 && dice.chance(0.45) && w < 0.45 * h) {
    const head = topmost(lines)
    const back = h * dice.real(0.15, 0.42)
    const flag = stroke([head, [head[0] - back, head[1] + back * dice.real(0.6, 1.3)]])
    if (dice.chance(0.7)) return joined(lines, flag)
    const foot = h * dice.real(0.15, 0.3)
    const base = lowest(lines)
    return joined(dice.chance(0.7) ? joined(lines, flag) : lines, stroke([[base[0] - foot, base[1]], [base[0] + foot, base[1]]]))
  }
  if (digit === 0 && dice.chance(0.06)) return joined(lines, stroke([[right - w * 0.2, top + h * 0.15], [left + w * 0.2, bottom - h * 0.15]]))
  return lines
}

/** What is no digit: crossed out, written over, cut in half, two side by side, or scribbled. */
export function noDigit(one: CentreLines, other: CentreLines, dice: Dice): CentreLines {
  const kind = dice.whole(5)
  const { left, right, top, bottom } = extent(one)
  if (kind === 0) {
    const turns = 3 + dice.whole(5)
    return joined(one, stroke(Array.from({ length: turns }, (_, k) => [left - 2 + ((right - left + 4) * k) / (turns - 1), (k % 2 ? top : bottom) + dice.bell(2)] as const)))
  }
  if (kind === 1) return joined(one, moved(other, dice.bell(1.5), dice.bell(1.5)))
  if (kind === 2) {
    const upright = dice.chance(0.5)
    const cut = upright ? (left + right) / 2 : (top + bottom) / 2
    return filtered(one, (x, y) => (upright ? x : y) < cut)
  }
  if (kind === 3) return joined(one, moved(other, (right - left) * dice.real(0.8, 1.1) + 2, dice.bell(1)))
  const bends = 4 + dice.whole(5)
  return stroke(Array.from({ length: bends }, () => [dice.real(4, 24), dice.real(4, 24)] as const))
}

function extent(lines: CentreLines) {
  const xs = lines.filter((_, k) => k % 2 === 0)
  const ys = lines.filter((_, k) => k % 2 === 1)
  return { left: Math.min(...xs), right: Math.max(...xs), top: Math.min(...ys), bottom: Math.max(...ys) }
}
function topmost(lines: CentreLines): Point {
  return farthest(lines, -1)
}
function lowest(lines: CentreLines): Point {
  return farthest(lines, 1)
}
function farthest(lines: CentreLines, way: 1 | -1): Point {
  let best = 0
  for (let k = 2; k < lines.length; k += 2) if (way * lines[k + 1]! > way * lines[best + 1]!) best = k
  return [lines[best]!, lines[best + 1]!]
}
function stroke(through: readonly Point[]): CentreLines {
  const out: number[] = []
  for (let k = 1; k < through.length; k++) {
    const [[x0, y0], [x1, y1]] = [through[k - 1]!, through[k]!]
    const steps = Math.max(2, Math.ceil(Math.hypot(x1 - x0, y1 - y0) * 3))
    for (let i = 0; i <= steps; i++) out.push(x0 + ((x1 - x0) * i) / steps, y0 + ((y1 - y0) * i) / steps)
  }
  return Float32Array.from(out)
}
function joined(a: CentreLines, b: CentreLines): CentreLines {
  const out = new Float32Array(a.length + b.length)
  out.set(a)
  out.set(b, a.length)
  return out
}
function moved(lines: CentreLines, x: number, y: number): CentreLines {
  return lines.map((v, k) => v + (k % 2 ? y : x))
}
function filtered(lines: CentreLines, keep: (x: number, y: number) => boolean): CentreLines {
  const out: number[] = []
  for (let k = 0; k < lines.length; k += 2) if (keep(lines[k]!, lines[k + 1]!)) out.push(lines[k]!, lines[k + 1]!)
  return out.length >= 12 ? Float32Array.from(out) : lines
}
