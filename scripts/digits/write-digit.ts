import type { GreyPicture } from '@/lib/core/grey-picture'
import type { CentreLines } from './centre-lines'
import type { Dice } from './dice'

/** The picture a digit is written on: as a box of a scan at 200 dpi, with some room round it. */
export const boxSide = 76
/** The box's own edges on it. */
export const boxFrame = { left: 6, top: 6, right: boxSide - 7, bottom: boxSide - 7 } as const

type Hand = Readonly<{ turn: number; slant: number; wide: number; high: number; pen: number; bend: number }>

/** A hand of one's own: size, slant and pen as students have them (digits of 3 to 6.5 mm, pens of 0.3 to 0.8 mm; now and then a felt pen). */
function anyHand(dice: Dice): Hand {
  const high = dice.real(22, 50)
  return { turn: dice.bell(0.12), slant: dice.bell(0.18), wide: high * dice.real(0.8, 1.22), high, pen: dice.chance(0.12) ? dice.real(5, 8) : dice.real(1.8, 5.2), bend: dice.real(0, 0.06) }
}

/** Writes pen paths (of one or more strokes) by a random hand onto a scan's box and photographs it badly. Ink: 0 none, 255 full. */
export function writeDigit(lines: CentreLines, dice: Dice): GreyPicture {
  const hand = anyHand(dice)
  const ink = new Float32Array(boxSide * boxSide)
  const path = placed(lines, hand, dice)
  for (let k = 0; k < path.length; k += 2) dot(ink, path[k]!, path[k + 1]!, hand.pen / 2)
  if (dice.chance(0.25)) leaveLine(ink, dice)
  return scanned(ink, dice)
}

/** Turns, slants, stretches, bends and shifts a path into the box. */
function placed(lines: CentreLines, { turn, slant, wide, high, bend }: Hand, dice: Dice): Float32Array {
  let [left, right, top, bottom] = [99, 0, 99, 0]
  for (let k = 0; k < lines.length; k += 2) {
    left = Math.min(left, lines[k]!)
    right = Math.max(right, lines[k]!)
    top = Math.min(top, lines[k + 1]!)
    bottom = Math.max(bottom, lines[k + 1]!)
  }
  const size = Math.max(right - left, bottom - top, 4)
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)]
  const waves = Array.from({ length: 4 }, () => ({ along: dice.real(3, 9), phase: dice.real(0, 6.3), by: dice.bell(bend) }))
  const atX = boxSide / 2 + dice.bell(4)
  const atY = boxSide / 2 + dice.bell(4)
  const out = new Float32Array(lines.length)
  for (let k = 0; k < lines.length; k += 2) {
    const u0 = (lines[k]! - (left + right) / 2) / size
    const v0 = (lines[k + 1]! - (top + bottom) / 2) / size
    const u = u0 + waves[0]!.by * Math.sin(waves[0]!.along * v0 + waves[0]!.phase) + waves[1]!.by * Math.sin(waves[1]!.along * u0 + waves[1]!.phase) - slant * v0
    const v = v0 + waves[2]!.by * Math.sin(waves[2]!.along * u0 + waves[2]!.phase) + waves[3]!.by * Math.sin(waves[3]!.along * v0 + waves[3]!.phase)
    out[k] = atX + wide * (cos * u - sin * v)
    out[k + 1] = atY + high * (sin * u + cos * v)
  }
  return out
}

function dot(ink: Float32Array, cx: number, cy: number, radius: number): void {
  const reach = Math.ceil(radius + 1)
  for (let y = Math.floor(cy) - reach; y <= cy + reach; y++)
    for (let x = Math.floor(cx) - reach; x <= cx + reach; x++) {
      if (x < 0 || y < 0 || x >= boxSide || y >= boxSide) continue
      const v = radius + 0.5 - Math.sqrt((x + 0.5 - cx) ** 2 + (y + 0.5 - cy) ** 2)
      const at = y * boxSide + x
      if (v > ink[at]!) ink[at] = Math.min(1, v)
    }
}

/** A bit of the box's printed line that taking the print away left behind. */
function leaveLine(ink: Float32Array, dice: Dice): void {
  const edge = dice.chance(0.5) ? dice.whole(9) : boxSide - 1 - dice.whole(9)
  const [from, length] = [dice.whole(60), 4 + dice.whole(20)]
  const upright = dice.chance(0.5)
  for (let k = from; k < Math.min(boxSide, from + length); k++) ink[upright ? k * boxSide + edge : edge * boxSide + k] = dice.real(0.3, 1)
}

/** Pencil's grain, blur, noise, and black on white only now and then. */
function scanned(ink: Float32Array, dice: Dice): GreyPicture {
  const strength = dice.real(110, 250)
  const grain = dice.chance(0.35) ? dice.real(0.2, 0.6) : 0.05
  const grained = ink.map((v) => v * (1 - grain * dice.real(0, 1)))
  const soft = dice.chance(0.7) ? blurred(grained, dice.real(0.05, 0.3)) : grained
  const noise = dice.real(0, 14)
  const level = dice.chance(0.3) ? dice.real(0.3, 0.6) : 0
  const data = Uint8Array.from(soft, (v) => {
    if (level > 0) return v + dice.bell(0.06) > level ? 255 : 0
    return Math.max(0, Math.min(255, v * strength + dice.bell(noise) - 8))
  })
  return { width: boxSide, height: boxSide, data }
}

function blurred(ink: Float32Array, by: number): Float32Array {
  let from = ink
  for (const step of [1, boxSide]) {
    const last = from
    from = last.map((v, k) => v * (1 - 2 * by) + by * ((last[k - step] ?? 0) + (last[k + step] ?? 0)))
  }
  return from
}
