import { describe, expect, it } from 'vitest'
import { inkLines } from './ink-lines'
import { edgesOf, onPage, rectOf, resized, snapEdges, snapMove } from './snap'

const lines = { xs: [50, 300], ys: [100, 205] }

describe('snapping', () => {
  it('moves to the nearer of two edges in reach, and nowhere when none is', () => {
    expect(snapMove({ x: 53, y: 102, w: 248, h: 104 }, lines, 4)).toEqual({ x: 52, y: 101, w: 248, h: 104 })
    expect(snapMove({ x: 70, y: 120, w: 20, h: 20 }, lines, 4)).toEqual({ x: 70, y: 120, w: 20, h: 20 })
  })
  it('lays only the gripped edges on lines', () => {
    expect(snapEdges({ x: 52, y: 98, w: 246, h: 105 }, { x: 1, y: 1 }, lines, 4)).toEqual({ x: 52, y: 98, w: 248, h: 107 })
    expect(snapEdges({ x: 52, y: 98, w: 246, h: 105 }, { x: -1, y: 0 }, lines, 4)).toEqual({ x: 50, y: 98, w: 248, h: 105 })
  })
  it('offers the edges of other boxes', () => {
    expect(edgesOf([{ x: 1, y: 2, w: 3, h: 4 }])).toEqual({ xs: [1, 4], ys: [2, 6] })
  })
  it('keeps boxes right way round and on the page', () => {
    expect(resized({ x: 10, y: 10, w: 50, h: 50 }, { x: -1, y: 1 }, 80, -80)).toEqual({ x: 48, y: 10, w: 12, h: 12 })
    expect(onPage({ x: 580, y: -5, w: 100, h: 50 }, { width: 595, height: 842 })).toEqual({ x: 495, y: 0, w: 100, h: 50 })
    expect(rectOf({ x: 9, y: 8 }, { x: 1, y: 2 })).toEqual({ x: 1, y: 2, w: 8, h: 6 })
  })
})

describe('the lines of the print', () => {
  function page(draw: (put: (x: number, y: number) => void) => void) {
    const data = new Uint8Array(200 * 100).fill(255)
    draw((x, y) => { data[y * 200 + x] = 0 })
    return inkLines({ width: 200, height: 100, data }, 400)
  }
  const line = (put: (x: number, y: number) => void, y: number, from: number, to: number, gap = 2) => {
    for (let x = from; x < to; x += gap) for (let k = 0; k < 4; k++) put(x, y + k)
  }

  it('keep clear of lines of text above, below and at the edges they share', () => {
    const found = page((put) => { line(put, 10, 20, 150); line(put, 20, 20, 90) })
    expect(found.ys).toEqual([16, 32, 36, 52])
    expect(found.xs).toEqual([34])
  })
  it('and rules and strokes, whatever their thickness', () => {
    const found = page((put) => {
      for (let x = 20; x < 180; x++) for (const y of [50, 51]) put(x, y)
      for (let y = 50; y < 80; y++) put(100, y)
    })
    expect(found.ys).toContain(102)
    expect(found.xs).toContain(201)
  })
  it('are none on an empty page', () => {
    expect(page(() => undefined)).toEqual({ xs: [], ys: [] })
  })
})
