/** Random numbers that are the same every time: a small counter-based generator (mulberry32). */
export type Dice = Readonly<{ real: (from: number, to: number) => number; whole: (below: number) => number; chance: (share: number) => boolean; bell: (spread: number) => number }>

export function makeDice(seed: number): Dice {
  let state = seed >>> 0
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
  return {
    real: (from, to) => from + (to - from) * next(),
    whole: (below) => Math.floor(next() * below),
    chance: (share) => next() < share,
    bell: (spread) => (next() + next() + next() + next() - 2) * 1.73 * spread,
  }
}
