import { describe, expect, it } from 'vitest'
import { explainSequence, type Together } from './explain-sequence'
import type { Seen } from './script-cost'
import { settledBlocks } from './settled-blocks'

const certain = 4.4

/** A row of numbers from 0 to 1, the same for a seed. */
function dice(seed: number): () => number {
  let state = seed * 2654435761 + 1
  return () => ((state = (state * 1103515245 + 12345) % 2147483648) / 2147483648)
}

type Sheaf = Readonly<{ pages: Seen[]; hands: number[] }>

/** A sheaf as copiers make them, with faults more often than in life: pages lost, doubled, not told, swapped or turned. `hands` says who wrote. */
function faultySheaf(seed: number, pages: number): Sheaf {
  const roll = dice(seed)
  const often = roll() * 0.3
  const sheaf: Sheaf = { pages: [], hands: [] }
  for (let script = 0; script < 12; script++) {
    let own: Seen[] = Array.from({ length: pages }, (_, k) => k + 1)
    if (roll() < often) own = own.filter(() => roll() > 0.3)
    if (roll() < often) own = own.map((page) => (roll() < 0.2 ? null : page))
    if (roll() < often) own.reverse()
    if (roll() < often && own.length > 1) own.splice(0, 2, own[1]!, own[0]!)
    if (roll() < often) own.splice(Math.floor(roll() * own.length), 0, Math.ceil(roll() * pages))
    sheaf.pages.push(...own)
    sheaf.hands.push(...own.map(() => script))
  }
  return roll() < 0.2 ? { pages: sheaf.pages.reverse(), hands: sheaf.hands.reverse() } : sheaf
}

/** As pens speak: of a few kinds, so that neighbours often look alike. */
const byPens = ({ hands }: Sheaf): Together => (one, other) => ((hands[one]! * 5) % 4 === (hands[other]! * 5) % 4 ? -0.5 : 2.5)

const parts = (blocks: readonly { kind: string; leaves: readonly number[] }[], sequence: readonly Seen[]) =>
  blocks.filter(({ kind }) => kind !== 'stray').map(({ kind, leaves }) => `${kind} ${leaves.filter((at) => sequence[at] !== null).join()}`)

describe('blocks that no later leaf can take apart', () => {
  it.each([1, 2, 3, 4])('are found just so in the whole sheaf, at every length of its beginning (papers of %i pages)', (pages) => {
    let settled = 0
    for (let seed = 1; seed <= 120 / pages; seed++) {
      const sheaf = faultySheaf(seed, pages)
      const whole = new Set(parts(explainSequence(sheaf.pages, { pages, together: byPens(sheaf) }), sheaf.pages))
      for (let known = 2; known <= sheaf.pages.length; known += 5) {
        for (const part of parts(settledBlocks(sheaf.pages.slice(0, known), { pages, together: byPens(sheaf) }, certain), sheaf.pages)) {
          settled++
          expect(whole, `seed ${seed}, ${known} leaves known`).toContain(part)
        }
      }
    }
    expect(settled).toBeGreaterThan(50)
  })

  it('come soon in a sheaf in order: all but the last few leaves', () => {
    const sheaf = { pages: Array.from({ length: 40 }, (_, k) => (k % 2) + 1), hands: Array.from({ length: 40 }, (_, k) => Math.floor(k / 2)) }
    expect(settledBlocks(sheaf.pages, { pages: 2, together: byPens(sheaf) }, certain).flatMap(({ leaves }) => leaves)).toEqual(Array.from({ length: 34 }, (_, k) => k))
  })

  it('are none while so few leaves are known that anything may follow', () => {
    expect(settledBlocks([1, 2, 1, 2], { pages: 2 }, certain)).toEqual([])
  })
})
