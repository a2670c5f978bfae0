import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Memory } from './memory'

const widest = 5
const rough = 0.5
const exact = 0.1

/**
 * How far printed lines slope, in degrees, clockwise positive, within five either way; `sideways` looks for lines that run
 * down the picture. The likeliest first, then the best of the other peaks: what maximises the sharpness of the profile.
 */
export function skews(ink: GreyPicture, sideways: boolean, memory: Memory): number[] {
  const points = inked(ink, sideways, memory)
  const reach = Math.ceil(Math.hypot(ink.width, ink.height)) + 2
  const bins = new Float64Array(reach * 2)
  const sharpness = (degrees: number): number => profile(points, degrees, bins, reach)
  const steps = Math.round((2 * widest) / rough)
  const scores = Array.from({ length: steps + 1 }, (_, k) => sharpness(-widest + k * rough))
  const peaks = scores
    .map((score, k) => ({ score, k }))
    .filter(({ score, k }) => score >= (scores[k - 1] ?? 0) && score >= (scores[k + 1] ?? 0))
    .sort((a, b) => b.score - a.score)
    .slice(0, 2)
  return peaks.filter(({ score }) => score > peaks[0]!.score * 0.8).map(({ k }) => refined(-widest + k * rough, sharpness))
}

function refined(middle: number, sharpness: (degrees: number) => number): number {
  let best = middle
  let most = -1
  for (let d = middle - rough; d <= middle + rough + 1e-9; d += exact) {
    const score = sharpness(d)
    if (score > most) [most, best] = [score, d]
  }
  return best
}

/** x, y, weight of every inked pixel, from the middle of the picture. */
function inked({ width, height, data }: GreyPicture, sideways: boolean, memory: Memory): Float32Array {
  const { buffer, byteOffset } = memory('inked', data.length * 3 * 4)
  const out = new Float32Array(buffer, byteOffset, data.length * 3)
  let count = 0
  for (let y = 0; y < height; y++) count = inkedLine(data, y * width, width, height, y, sideways, out, count)
  return out.subarray(0, count)
}

function inkedLine(data: Uint8Array, at: number, width: number, height: number, y: number, sideways: boolean, out: Float32Array, count: number): number {
  for (let x = 0; x < width; x++) {
    const v = data[at + x]!
    if (v <= 40) continue
    out[count] = sideways ? y - height / 2 : x - width / 2
    out[count + 1] = sideways ? width / 2 - x : y - height / 2
    out[count + 2] = v
    count += 3
  }
  return count
}

function profile(points: Float32Array, degrees: number, bins: Float64Array, reach: number): number {
  bins.fill(0)
  const angle = (degrees * Math.PI) / 180
  const c = Math.cos(angle)
  const s = Math.sin(angle)
  for (let k = 0; k < points.length; k += 3) {
    const at = points[k + 1]! * c - points[k]! * s + reach
    const low = Math.floor(at)
    const part = at - low
    bins[low]! += points[k + 2]! * (1 - part)
    bins[low + 1]! += points[k + 2]! * part
  }
  let sum = 0
  for (let k = 1; k < bins.length; k++) {
    const step = bins[k]! - bins[k - 1]!
    sum += step * step
  }
  return sum
}
