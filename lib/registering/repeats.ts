import type { GreyPicture } from '@/lib/core/grey-picture'

const reach = 7
const side = 2 * reach + 1
/** Shifts that a track could take for its own place, in pixels of 100 dpi: the dots of a dotted line are 1 mm apart. */
const shifts = [3, 4, 5, 6, 7, 8].flatMap((by) => [[by, 0], [-by, 0], [0, by], [0, -by]] as const)
const sameFrom = 0.75

/** Whether print repeats itself round a place, as a dotted line does: followed on a leaf it may be found a dot too far. */
export function repeats(picture: GreyPicture, x: number, y: number): boolean {
  const own = patch(picture, x, y)
  if (!own) return false
  return shifts.some(([dx, dy]) => {
    const other = patch(picture, x + dx, y + dy)
    return other !== null && own.reduce((sum, value, k) => sum + value * other[k]!, 0) > sameFrom
  })
}

/** A piece of a picture with mean 0 and length 1; null at the edge and on plain paper. */
function patch({ width, height, data }: GreyPicture, x: number, y: number): Float32Array | null {
  if (x < reach || y < reach || x >= width - reach || y >= height - reach) return null
  const out = new Float32Array(side * side)
  for (let j = -reach, k = 0; j <= reach; j++) for (let i = -reach; i <= reach; i++) out[k++] = data[(y + j) * width + x + i]!
  const mean = out.reduce((sum, value) => sum + value, 0) / out.length
  const length = Math.sqrt(out.reduce((sum, value) => sum + (value - mean) ** 2, 0))
  return length < 6 * side ? null : out.map((value) => (value - mean) / length)
}
