import { describe, expect, it } from 'vitest'
import { placeByHabit } from './stamp-place'

const space = { x: 48, y: 250, w: 499, h: 120 }

describe('where a stamp goes', () => {
  it('goes where the last one like it went', () => {
    expect(placeByHabit({ space: 0, at: { x: 300, y: 290 } }, [space], [], 0, 2)).toEqual({ space: 0, at: { x: 300, y: 290 } })
  })
  it('moves on along the line when a stamp lies there', () => {
    const taken = [{ space: 0, at: { x: 301, y: 291 } }]
    const { at } = placeByHabit({ space: 0, at: { x: 300, y: 290 } }, [space], taken, 0, 2)
    expect(at).toEqual({ x: 326, y: 290 })
  })
  it('gives the points of a scheme places of their own, one under another, inside the space', () => {
    const places = [0, 1, 2].map((rank) => placeByHabit(undefined, [space], [], rank, 3).at)
    expect(places[0]!.y).toBeLessThan(places[1]!.y)
    expect(places[1]!.y).toBeLessThan(places[2]!.y)
    for (const at of places) {
      expect(at.x).toBeGreaterThan(space.x)
      expect(at.y).toBeLessThan(space.y + space.h)
    }
  })
  it('stays inside the space however many lie there', () => {
    const taken = Array.from({ length: 30 }, (_, k) => ({ space: 0, at: { x: 300 + 26 * k, y: 290 } }))
    const { at } = placeByHabit({ space: 0, at: { x: 300, y: 290 } }, [space], taken, 0, 1)
    expect(at.x).toBeLessThan(space.x + space.w)
    expect(at.x).toBeGreaterThan(space.x)
  })
})
