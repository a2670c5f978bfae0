import type { GreyPicture } from '@/lib/core/grey-picture'
import { toPixels, type Homography } from '@/lib/core/paper-space'
import { withMats, type Cv } from './opencv'
import { matOf } from './shrink'
import type { Template } from './template'

const window = 21
const levels = 2
/** Tracks further than this from the common map are not print, in pixels of 100 dpi (0.3 mm). */
const ransacPixels = 1.2
const fewest = 12

/**
 * Follows a template's corners on a leaf warped by a near map (template -> leaf, 100 dpi, corner-based pixels) and fits the exact
 * one. Null when too few corners agree on any map.
 */
export function fineFit(cv: Cv, leaf: GreyPicture, template: Template, near: Homography): Homography | null {
  return withMats(cv, (keep) => {
    const { width, height } = template.white
    const count = template.corners.length / 2
    if (count < fewest) return null
    const from = keep(matOf(cv, template.white))
    const image = keep(matOf(cv, leaf))
    const warped = keep(new cv.Mat())
    const [[a, b, c], [d, e, f]] = near
    // the engine counts pixel centres from 0, paper space from the corner: half a pixel on both sides
    const map = keep(cv.matFromArray(2, 3, cv.CV_64F, [a, b, c + (a + b) / 2 - 0.5, d, e, f + (d + e) / 2 - 0.5]))
    cv.warpAffine(image, warped, map, new cv.Size(width, height), cv.INTER_LINEAR | cv.WARP_INVERSE_MAP, cv.BORDER_CONSTANT, new cv.Scalar(255, 255, 255, 255))
    const points = keep(cv.matFromArray(count, 1, cv.CV_32FC2, template.corners as unknown as number[]))
    const next = keep(new cv.Mat())
    const status = keep(new cv.Mat())
    const error = keep(new cv.Mat())
    const done = new cv.TermCriteria(cv.TermCriteria_COUNT + cv.TermCriteria_EPS, 20, 0.02)
    cv.calcOpticalFlowPyrLK(from, warped, points, next, status, error, new cv.Size(window, window), levels, done)
    return fit(cv, keep, template.corners, next.data32F, status.data, near)
  })
}

function fit(cv: Cv, keep: <M extends { delete(): void }>(mat: M) => M, corners: Float32Array, found: Float32Array, status: Uint8Array, near: Homography): Homography | null {
  const paper: number[] = []
  const leaf: number[] = []
  for (let k = 0; k < status.length; k++) {
    if (!status[k]) continue
    const at = toPixels(near, { x: found[k * 2]! + 0.5, y: found[k * 2 + 1]! + 0.5 })
    paper.push(corners[k * 2]! + 0.5, corners[k * 2 + 1]! + 0.5)
    leaf.push(at.x, at.y)
  }
  if (paper.length < fewest * 2) return null
  const from = keep(cv.matFromArray(paper.length / 2, 1, cv.CV_32FC2, paper))
  const to = keep(cv.matFromArray(leaf.length / 2, 1, cv.CV_32FC2, leaf))
  const mask = keep(new cv.Mat())
  const h = keep(cv.findHomography(from, to, cv.RANSAC, ransacPixels, mask, 1000, 0.995))
  if (h.rows !== 3) return null
  const v = h.data64F
  const row = (k: number) => [v[k]!, v[k + 1]!, v[k + 2]!] as const
  const map: Homography = [row(0), row(3), row(6)]
  return plausible(map, near) ? map : null
}

/** A scan turns, shifts and stretches a little; it neither folds nor runs off. */
function plausible(map: Homography, near: Homography): boolean {
  return [[0, 0], [800, 0], [0, 1100], [800, 1100]].every(([x, y]) => {
    const [p, q] = [toPixels(map, { x: x!, y: y! }), toPixels(near, { x: x!, y: y! })]
    return Math.hypot(p.x - q.x, p.y - q.y) < 40
  })
}
