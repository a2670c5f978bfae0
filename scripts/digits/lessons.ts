import type { GreyPicture } from '@/lib/core/grey-picture'
import { none } from '@/lib/placing/digit-net'
import { findStrokes } from '@/lib/placing/find-strokes'
import { normalDigit } from '@/lib/placing/normal-digit'
import { centreLines, type CentreLines } from './centre-lines'
import type { Dice } from './dice'
import type { Lesson } from './learn'
import type { Sample } from './samples'
import { noDigit, withHabits } from './vary-strokes'
import { boxFrame, writeDigit } from './write-digit'

export type Known = Readonly<Sample & { lines: CentreLines }>

export function withLines(samples: readonly Sample[]): Known[] {
  return samples.map((sample) => ({ ...sample, lines: centreLines(sample.ink) }))
}

/** A box as a scan shows it, made ready the way the product makes it ready; null when it came out empty. */
export function seen(box: GreyPicture): Float32Array | null {
  const strokes = findStrokes(box, boxFrame)
  return strokes && normalDigit(box, strokes)
}

/** One more thing to learn: mostly a digit in a hand of its own, now and then the sample as it is, now and then no digit at all. */
export function nextLesson(samples: readonly Known[], dice: Dice): Lesson {
  const { digit, ink, lines } = samples[dice.whole(samples.length)]!
  if (dice.chance(0.12)) return { ink: Float32Array.from(ink, (v) => v / 255), is: digit }
  const isNone = dice.chance(0.08)
  const path = isNone ? noDigit(lines, samples[dice.whole(samples.length)]!.lines, dice) : withHabits(digit, lines, dice)
  const picture = seen(writeDigit(path, dice))
  return picture ? { ink: picture, is: isNone ? none : digit } : nextLesson(samples, dice)
}
