import { expect, it } from 'vitest'
import { storedCorners } from './four-corners'

const all = [{ x: 0, y: 0 }, { x: 1, y: 0 }, { x: 1, y: 1 }, { x: 0, y: 1 }]
const said = (turn: 0 | 90 | 180 | 270) => storedCorners(all, 100, 200, turn).map(({ x, y }) => [Math.round(x) + 0, Math.round(y) + 0])

it('finds the corners of the shown picture on the stored one, however it is turned', () => {
  expect(said(0)).toEqual([[0, 0], [100, 0], [100, 200], [0, 200]])
  expect(said(180)).toEqual([[100, 200], [0, 200], [0, 0], [100, 0]])
  // turned a quarter clockwise, the stored bottom left is shown at the top left
  expect(said(90)).toEqual([[0, 200], [0, 0], [100, 0], [100, 200]])
  expect(said(270)).toEqual([[100, 0], [100, 200], [0, 200], [0, 0]])
})
