import type { GreyPicture } from '@/lib/core/grey-picture'
import { compose, toPixels, type Homography, type PixelPoint } from '@/lib/core/paper-space'
import { fitAffine, type Pair } from './fit-affine'
import { withMats, type Cv } from './opencv'
import { steadyFit } from './steady-fit'
import type { Template } from './template'
import { follow } from './track'

/** Tracks further than this from the common map are not print, in pixels of 100 dpi (0.3 mm). */
const ransacPixels = 1.2
const fewest = 12
/** How far print may lie off the near map, in pixels of the density at hand. */
const furthest = 5

/**
 * Follows a template's print on a levelled leaf from a near map (template -> leaf, 100 dpi, corner-based pixels), first at 50 dpi (`half`), then
 * at 100, and fits the exact map. Null when too few patches agree on any.
 */
export function fineFit(cv: Cv, leaf: GreyPicture, half: GreyPicture, template: Template, near: Homography): Homography | null {
  const rough = follow(half, template.tracks50, halved(near), furthest)
  const [a, b, c, d, e, f] = fitAffine(rough, 0.7)
  const nearer = compose(near, [[a, c, e * 2], [b, d, f * 2], [0, 0, 1]])
  const followed = follow(leaf, template.tracks, nearer, furthest).map((pair) => ({ ...pair, ...onLeaf(nearer, pair) }))
  const agreed = agreeing(cv, followed)
  const map = agreed.length < fewest ? null : steadyFit(agreed)
  return map && plausible(map, agreed) ? map : null
}

function onLeaf(near: Homography, { u, v }: Pair): { u: number; v: number } {
  const at = toPixels(near, { x: u, y: v })
  return { u: at.x, v: at.y }
}

/** The same map between pictures of half the density. */
function halved([[a, b, c], [d, e, f]]: Homography): Homography {
  return [[a, b, c / 2], [d, e, f / 2], [0, 0, 1]]
}

/** The pairs that lie on one common map. */
function agreeing(cv: Cv, pairs: readonly Pair[]): Pair[] {
  if (pairs.length < fewest) return []
  return withMats(cv, (keep) => {
    const from = keep(cv.matFromArray(pairs.length, 1, cv.CV_32FC2, pairs.flatMap(({ x, y }) => [x, y])))
    const to = keep(cv.matFromArray(pairs.length, 1, cv.CV_32FC2, pairs.flatMap(({ u, v }) => [u, v])))
    const inside = keep(new cv.Mat())
    const h = keep(cv.findHomography(from, to, cv.RANSAC, ransacPixels, inside, 1000, 0.995))
    return h.rows === 3 ? pairs.filter((_, k) => inside.data[k]! > 0) : []
  })
}

/** A scan turns, shifts and stretches a little; it neither folds nor runs off, and the print that agrees lies on it. */
function plausible(map: Homography, agreed: readonly Pair[]): boolean {
  const [o, right, down] = [{ x: 0, y: 0 }, { x: 800, y: 0 }, { x: 0, y: 800 }].map((at) => toPixels(map, at)) as [PixelPoint, PixelPoint, PixelPoint]
  const lengths = [right, down].map((end) => Math.hypot(end.x - o.x, end.y - o.y) / 800)
  const off = agreed.map(({ x, y, u, v }) => Math.hypot(toPixels(map, { x, y }).x - u, toPixels(map, { x, y }).y - v)).sort((p, q) => p - q)
  return lengths.every((length) => length > 0.85 && length < 1.15) && off[off.length >> 1]! < ransacPixels
}
