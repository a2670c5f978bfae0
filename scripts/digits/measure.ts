import { digitLogits, makeScratch, none, type DigitNet } from '@/lib/placing/digit-net'
import { makeDice } from './dice'
import { softmax } from './learn'
import { seen, type Known } from './lessons'
import { noDigit } from './vary-strokes'
import { writeDigit } from './write-digit'

const turns = 4

/** How well a network reads samples it never saw: as they are, and written with pens into boxes; and how true its shares are. */
export function measure(net: DigitNet, samples: readonly Known[]): string[] {
  const scratch = makeScratch()
  const dice = makeDice(77)
  const read = (ink: Float32Array) => softmax(digitLogits(net, ink, scratch))
  const plain = samples.filter(({ ink, digit }) => bestOf(read(Float32Array.from(ink, (v) => v / 255))) === digit).length
  const written = samples.flatMap(({ lines, digit }) =>
    Array.from({ length: turns }, () => seen(writeDigit(lines, dice))).flatMap((ink) => (ink ? [{ digit, shares: read(ink) }] : [])))
  const right = (of: typeof written) => of.filter(({ digit, shares }) => bestOf(shares) === digit).length
  const say = (from: number, to: number) => {
    const of = written.filter(({ shares }) => Math.max(...shares) >= from && Math.max(...shares) < to)
    return `  share ${from} to ${Math.min(1, to)}: ${right(of)} of ${of.length} right`
  }
  const others = samples.flatMap(({ lines }, k) => seen(writeDigit(noDigit(lines, samples[(k * 7 + 3) % samples.length]!.lines, dice), dice)) ?? [])
  const refused = others.filter((ink) => { const shares = read(ink); return bestOf(shares) === none || Math.max(...shares) < 0.9 }).length
  return [
    `held-out samples as they are: ${plain} of ${samples.length} right`,
    `held-out samples written into boxes with pens: ${right(written)} of ${written.length} right`,
    ...[[0, 0.5], [0.5, 0.7], [0.7, 0.9], [0.9, 0.95], [0.95, 2]].map(([from, to]) => say(from!, to!)),
    `what is no digit: ${refused} of ${others.length} left unread`,
  ]
}

function bestOf(shares: Float32Array): number {
  return shares.reduce((best, v, k) => (v > shares[best]! ? k : best), 0)
}
