import { AppError } from '@/lib/core/errors'
import type { ImagePart } from '@/lib/core/leaf'
import type { Paper } from '@/lib/core/paper'
import { corners, homographyFrom, turnOf, type Homography, type PixelPoint, type Turn } from '@/lib/core/paper-space'
import { db } from '@/db/knex'
import { getLeafEvidence, type Leaf } from '@/db/leaves'
import { getSheaf } from '@/db/sheaves'
import { keptPath } from '@/lib/infra/file-store'
import { blankPagesOf } from './read-sheaf'
import type { Onto } from './leaf-thread'
import { openLeaves } from './read-leaves'

export type LaidPage = Readonly<{ homography: Homography; turn: Turn; confidence: number | null }>

/** From this confidence the lie found while reading is taken as it is. */
const sureEnough = 0.5

/**
 * How a leaf lies on the page a person says it is: as found while reading, found now by looking at that page alone, or as the
 * person shows it by its four corners (pixels of the leaf's part of the stored image, clockwise from top left). Throws no_registration, bad_input.
 */
export async function layByHand(leaf: Leaf, paper: Paper, paperPage: number, shown: readonly PixelPoint[] | null): Promise<LaidPage> {
  const page = paper.pages.find((one) => one.page === paperPage)
  if (!page) throw new AppError('bad_input', { lines: [{ path: 'paperPage', says: 'the paper has no such page' }] })
  const evidence = (await getLeafEvidence(db(), [leaf.id])).get(leaf.id)
  const part = evidence?.reading.part
  if (shown) return laidByCorners(leaf, page, shown, part)
  if (leaf.homography && leaf.paperPage === paperPage) return { homography: leaf.homography, turn: leaf.turn, confidence: leaf.confidence }
  const seen = evidence?.reading.guesses.find((guess) => guess.paperPage === paperPage && guess.confidence >= sureEnough)
  const guess = seen ?? (await lookAgain(leaf, paper, { paperPage, ...(part && { part }) }))
  if (!guess) throw new AppError('no_registration', { page: paperPage })
  return { homography: guess.homography, turn: guess.rotation, confidence: guess.confidence }
}

async function lookAgain(leaf: Leaf, paper: Paper, onto: Onto) {
  const sheaf = await getSheaf(db(), leaf.sheafId)
  const reader = await openLeaves(keptPath(sheaf!.sha256), await blankPagesOf(paper))
  try {
    return await reader.readOnto(leaf.position, onto)
  } finally {
    await reader.close()
  }
}

function laidByCorners(leaf: Leaf, page: { width: number; height: number }, shown: readonly PixelPoint[], part?: ImagePart): LaidPage {
  const { width, height } = part ? { width: part.w, height: part.h } : leaf
  const onImage = shown.map(({ x, y }): PixelPoint => ({ x: x + (part?.x ?? 0), y: y + (part?.y ?? 0) }))
  const homography = homographyFrom(corners({ x: 0, y: 0, w: page.width, h: page.height }), onImage)
  if (!homography || width === null || height === null || !isSensible(shown, width * height)) throw new AppError('bad_input', { lines: [{ path: 'corners', says: 'show the four corners of the page, clockwise' }] })
  return { homography, turn: turnOf(homography, { x: page.width / 2, y: page.height / 2 }), confidence: null }
}

/** Clockwise, bulging nowhere inwards, and at least a tenth of the sheet. */
function isSensible(shown: readonly PixelPoint[], sheet: number): boolean {
  const turns = shown.map((at, k) => {
    const next = shown[(k + 1) % 4]!
    const after = shown[(k + 2) % 4]!
    return (next.x - at.x) * (after.y - next.y) - (next.y - at.y) * (after.x - next.x)
  })
  const area = shown.reduce((sum, at, k) => sum + at.x * shown[(k + 1) % 4]!.y - shown[(k + 1) % 4]!.x * at.y, 0) / 2
  return turns.every((turn) => turn > 0) && area > sheet / 10
}

/** A sheet with no page behind it is its own paper space: its upright picture in points, by the density of the scan. */
export function laidAsItself(leaf: Leaf, dpi: { x: number; y: number }, part?: ImagePart): LaidPage {
  const { turn } = leaf
  const { width, height } = part ? { width: part.w, height: part.h } : leaf
  const [left, top] = [part?.x ?? 0, part?.y ?? 0]
  if (width === null || height === null) throw new AppError('page_unreadable', { page: leaf.position + 1 })
  const [w, h] = [(width * 72) / dpi.x, (height * 72) / dpi.y]
  const upright = turn % 180 === 0 ? { w, h } : { w: h, h: w }
  const pixels: PixelPoint[] = corners({ x: left, y: top, w: width, h: height }).map(({ x, y }) => ({ x, y }))
  const first = (4 - turn / 90) % 4
  const homography = homographyFrom(corners({ x: 0, y: 0, ...upright }), [0, 1, 2, 3].map((k) => pixels[(k + first) % 4]!))!
  return { homography, turn, confidence: null }
}
