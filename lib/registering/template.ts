import type { BlankPage, GreyPicture } from '@/lib/core/grey-picture'
import { inkedPart, type Inked } from './best-shift'
import { blocksOf, type Block } from './block-fit'
import { clearOfPrint } from './clear-of-print'
import { level } from './level'
import { withMats, type Cv } from './opencv'
import { repeats } from './repeats'
import { boxShrink, matOf } from './shrink'
import { makeTracks, type Tracks } from './track'

/** Half the side of a patch of print that is looked for on a leaf, in pixels at 100 dpi. */
export const patchReach = 5
const perCell = 3
const cell = 40

/** A blank page made ready: levelled at 100 dpi, its ink at 25 and 12.5 dpi, and corners of print with the patches round them. */
export type Template = Readonly<{
  page: BlankPage
  white: GreyPicture
  ink25: GreyPicture
  ink12: GreyPicture
  inked12: Inked
  blocks25: readonly Block[]
  /** 1 where nothing is printed within a millimetre. */
  clear: Uint8Array
  /** 1 where nothing is printed within half a millimetre: there a pen is told from print. */
  free: Uint8Array
  corners: Float32Array
  patches: readonly Float32Array[]
  /** Print that is followed for the exact fit, at 100 and at 50 dpi. */
  tracks: Tracks
  tracks50: Tracks
}>

/** Makes a blank page (at 100 dpi) ready for registering leaves to it. Patches have mean 0 and length 1. */
export function makeTemplate(cv: Cv, page: BlankPage): Template {
  const { white, ink } = level(page.picture)
  const found = printedCorners(cv, white)
  const corners: number[] = []
  const patches: Float32Array[] = []
  for (let k = 0; k < found.length; k += 2) {
    const patch = normal(patchAt(white, found[k]!, found[k + 1]!))
    if (!patch) continue
    corners.push(found[k]!, found[k + 1]!)
    patches.push(patch)
  }
  const sure = corners.flatMap((x, k) => (k % 2 || repeats(white, Math.round(x), Math.round(corners[k + 1]!)) ? [] : [x, corners[k + 1]!]))
  const ink12 = boxShrink(ink, 2)
  return {
    page, white, ink25: ink, ink12, inked12: inkedPart(ink12), blocks25: blocksOf(ink), clear: clearOfPrint(white), free: clearOfPrint(white, 2), corners: Float32Array.from(corners), patches,
    tracks: makeTracks(white, sure),
    tracks50: makeTracks(boxShrink(white, 2), everyOther(sure)),
  }
}

/** At most three strong corners in every 40 px square. Pixel centres, as the vision engine counts: the first is (0, 0). */
function printedCorners(cv: Cv, white: GreyPicture): number[] {
  return withMats(cv, (keep) => {
    const mat = keep(matOf(cv, white))
    const found = keep(new cv.Mat())
    cv.goodFeaturesToTrack(mat, found, 6000, 0.02, 6, keep(new cv.Mat()), 5)
    const used = new Map<number, number>()
    const kept: number[] = []
    for (let k = 0; k < found.rows; k++) {
      const x = found.data32F[k * 2]!
      const y = found.data32F[k * 2 + 1]!
      const key = Math.floor(y / cell) * 1000 + Math.floor(x / cell)
      const count = used.get(key) ?? 0
      if (count >= perCell || x < 12 || y < 12 || x > white.width - 13 || y > white.height - 13) continue
      used.set(key, count + 1)
      kept.push(x, y)
    }
    return kept
  })
}

function patchAt({ width, data }: GreyPicture, x: number, y: number): Float32Array {
  const side = 2 * patchReach + 1
  const out = new Float32Array(side * side)
  const [cx, cy] = [Math.round(x), Math.round(y)]
  for (let j = -patchReach, k = 0; j <= patchReach; j++) for (let i = -patchReach; i <= patchReach; i++, k++) out[k] = data[(cy + j) * width + cx + i]!
  return out
}

/** A patch with mean 0 and length 1; null when it is plain paper. */
export function normal(patch: Float32Array): Float32Array | null {
  let sum = 0
  for (const v of patch) sum += v
  const mean = sum / patch.length
  let square = 0
  for (const v of patch) square += (v - mean) ** 2
  const length = Math.sqrt(square)
  return length < 12 * Math.sqrt(patch.length) * 0.5 ? null : patch.map((v) => (v - mean) / length)
}

/** Half of the corners, in pixel indices of half the density. */
function everyOther(corners: readonly number[]): number[] {
  const kept: number[] = []
  for (let k = 0; k + 1 < corners.length; k += 4) kept.push((corners[k]! + 0.5) / 2 - 0.5, (corners[k + 1]! + 0.5) / 2 - 0.5)
  return kept
}
