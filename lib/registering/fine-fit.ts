import type { GreyPicture } from '@/lib/core/grey-picture'
import { compose, toPixels, type Homography } from '@/lib/core/paper-space'
import { fitAffine, type Pair } from './fit-affine'
import { withMats, type Cv } from './opencv'
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
  const map = homography(cv, follow(leaf, template.tracks, nearer, furthest), nearer)
  return map && plausible(map, near) ? map : null
}

/** The same map between pictures of half the density. */
function halved([[a, b, c], [d, e, f]]: Homography): Homography {
  return [[a, b, c / 2], [d, e, f / 2], [0, 0, 1]]
}

function homography(cv: Cv, pairs: readonly Pair[], near: Homography): Homography | null {
  if (pairs.length < fewest) return null
  return withMats(cv, (keep) => {
    const from = keep(cv.matFromArray(pairs.length, 1, cv.CV_32FC2, pairs.flatMap(({ x, y }) => [x, y])))
    const to = keep(cv.matFromArray(pairs.length, 1, cv.CV_32FC2, pairs.flatMap(({ u, v }) => Object.values(toPixels(near, { x: u, y: v })))))
    const h = keep(cv.findHomography(from, to, cv.RANSAC, ransacPixels, keep(new cv.Mat()), 1000, 0.995))
    if (h.rows !== 3) return null
    const row = (k: number) => [h.data64F[k]!, h.data64F[k + 1]!, h.data64F[k + 2]!] as const
    return [row(0), row(3), row(6)]
  })
}

/** A scan turns, shifts and stretches a little; it neither folds nor runs off. */
function plausible(map: Homography, near: Homography): boolean {
  return [[0, 0], [800, 0], [0, 1100], [800, 1100]].every(([x, y]) => {
    const [p, q] = [toPixels(map, { x: x!, y: y! }), toPixels(near, { x: x!, y: y! })]
    return Math.hypot(p.x - q.x, p.y - q.y) < 40
  })
}
