import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Paper } from '@/lib/core/paper'
import type { PaperRect } from '@/lib/core/paper-space'
import type { Cut } from '@/lib/cutting/cut-key'
import { db } from '@/db/knex'
import { getLeaf, getLeafEvidence, type Leaf } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { drawCut, type Picture } from './draw-cut'
import { gatePaper } from './gate-paper'

/** The name box, the boxes of the candidate number, or some of the writing, to compare hands by. */
export const cropBoxes = ['name', 'number', 'hand'] as const
export type CropBox = (typeof cropBoxes)[number]
export const cropDpi = 150
const around = 4
/** How much of a hand is looked at, in points. */
const handHeight = 64

/** A box of a leaf in paper space: straight, however the sheet lay. Throws not_found when its page has no such box. */
export async function readLeafCrop(actor: Actor, { leafId, box }: { leafId: string; box: CropBox }): Promise<Picture> {
  const leaf = await getLeaf(db(), leafId)
  if (!leaf) throw new AppError('not_found')
  await gatePaper(db(), actor, 'change', leaf.paperId)
  const cut = await leafCrop(leaf, await getPaper(db(), leaf.paperId), box)
  if (!cut) throw new AppError('not_found')
  return drawCut(db(), cut, cropDpi)
}

/** What is cut out of a leaf for such a box; null when its page has none. */
export async function leafCrop(leaf: Leaf, paper: Paper | null, box: CropBox): Promise<Cut | null> {
  const lie = await lieOf(leaf)
  const rect = lie && paper && (box === 'hand' ? handRect(paper, lie.paperPage) : boxRect(paper, box, lie.paperPage))
  return lie && rect ? { leafId: leaf.id, homography: lie.homography, rect, masks: [] } : null
}

/** How the leaf lies on its page: as placed, else as its print says. */
async function lieOf(leaf: Leaf) {
  if (leaf.homography && leaf.paperPage !== null) return { homography: leaf.homography, paperPage: leaf.paperPage }
  const guess = (await getLeafEvidence(db(), [leaf.id])).get(leaf.id)?.reading.guesses[0]
  return guess ? { homography: guess.homography, paperPage: guess.paperPage } : null
}

function boxRect(paper: Paper, kind: 'name' | 'number', page: number): PaperRect | null {
  const boxes = paper.boxes.filter((box) => box.kind === kind && box.page === page).map(({ rect }) => rect)
  if (boxes.length === 0) return null
  const x = Math.min(...boxes.map((box) => box.x)) - around
  const y = Math.min(...boxes.map((box) => box.y)) - around
  return { x, y, w: Math.max(...boxes.map((box) => box.x + box.w)) + around - x, h: Math.max(...boxes.map((box) => box.y + box.h)) + around - y }
}

function handRect(paper: Paper, page: number): PaperRect | null {
  const spaces = paper.questions.flatMap(({ spaces: own }) => own).filter((one) => one.page === page).map(({ rect }) => rect)
  const [tallest] = spaces.toSorted((a, b) => b.h - a.h)
  if (!tallest) return null
  const { x, y, w, h } = tallest
  // The question is printed at the top of its space; working stands in the middle of the tallest one.
  const from = y + Math.max(0, Math.min(h - handHeight, h * 0.3))
  return { x: x + w * 0.05, y: from, w: w * 0.5, h: Math.min(handHeight, h) }
}
