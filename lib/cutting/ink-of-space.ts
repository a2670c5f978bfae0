import { inflateRawSync } from 'node:zlib'
import { strokeCellPoints, type StrokeMap } from '@/lib/core/leaf'
import { mmPerPoint, type PaperRect } from '@/lib/core/paper-space'

/** What a pixel of 100 dpi covers, in square millimetres. */
const perPixel = 0.254 ** 2
const cellSize = strokeCellPoints * mmPerPoint

/** How much is written in a box of a page (points), in square millimetres of ink. */
export function inkOfSpace(strokes: StrokeMap, { x, y, w, h }: PaperRect): number {
  const counts = inflateRawSync(Buffer.from(strokes.cells, 'base64'))
  const [left, top] = [(x * mmPerPoint) / cellSize, (y * mmPerPoint) / cellSize]
  const [right, bottom] = [left + (w * mmPerPoint) / cellSize, top + (h * mmPerPoint) / cellSize]
  let ink = 0
  for (let row = Math.max(0, Math.floor(top)); row < bottom; row++) {
    const high = Math.min(row + 1, bottom) - Math.max(row, top)
    for (let column = Math.max(0, Math.floor(left)); column < Math.min(right, strokes.columns); column++) {
      const wide = Math.min(column + 1, right) - Math.max(column, left)
      ink += (counts[row * strokes.columns + column] ?? 0) * high * wide
    }
  }
  return ink * perPixel
}
