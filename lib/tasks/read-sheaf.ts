import { AppError } from '@/lib/core/errors'
import type { Paper } from '@/lib/core/paper'
import type { BlankPage } from '@/lib/core/grey-picture'
import type { LeafFinding, LeafReading } from '@/lib/core/leaf'
import { db, transaction } from '@/db/knex'
import { addLeafReading, listLeavesWithEvidence } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { getSheaf, listSheafPapers, startSheaf, type Sheaf } from '@/db/sheaves'
import { getStoredFile } from '@/db/stored-files'
import { env } from '@/lib/infra/env'
import { keptPath, readKept } from '@/lib/infra/file-store'
import { placeFirstPile } from '@/lib/placing/place-pile'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { openLeaves, readLeaves, type LeafReader } from './read-leaves'
import { placeFirst, placeSheaf } from './place-sheaf'
import { printedCodesOf } from './printed-codes-of'

/**
 * Reads a sheaf leaf by leaf and then puts it into scripts; scripts that are certain whatever follows are put in place on the way.
 * Each leaf's finding is stored as it is read, so it may be killed and started again at any point: it goes on with the leaves
 * that are missing, and the placing of the rest is one transaction. A sheaf that is taken away meanwhile is left alone.
 * @param goOn asked before each leaf is stored; once false nothing more is written and the answer is false
 */
export async function readSheaf(sheafId: string, goOn: () => boolean): Promise<boolean> {
  const sheaf = await getSheaf(db(), sheafId)
  if (!sheaf || sheaf.state === 'placed') return true
  const papers = await papersOf(sheaf)
  const [paper, ...others] = papers as [Paper, ...Paper[]]
  const blank = await Promise.all(papers.map(async (one, k) => (await blankPagesOf(one)).map((page) => (others.length > 0 ? { ...page, paper: k } : page))))
  const reader = await openLeaves(keptPath(sheaf.sha256), blank.flat(), env.SHEAFMARK_THREADS, await printedCodesOf(db(), papers.map(({ id }) => id)))
  try {
    await transaction((trx) => startSheaf(trx, sheafId, reader.pageCount))
    if (!(await readMissing(reader, sheaf, others.length > 0 ? null : paper.pages.length, goOn))) return false
  } finally {
    await reader.close()
  }
  return transaction(async (trx) => {
    if (!goOn()) return false
    if (await isBeingRead(trx, sheafId)) await placeSheaf(trx, sheaf, paper.pages.length, others.map(({ id, pages }) => ({ paperId: id, pages: pages.length })))
    return true
  })
}

/** The papers whose scripts may lie in a sheaf, its own first. */
async function papersOf(sheaf: Sheaf): Promise<Paper[]> {
  const papers = await Promise.all((await listSheafPapers(db(), sheaf)).map((id) => getPaper(db(), id)))
  return papers.map((paper) => {
    if (!paper) throw new AppError('paper_invalid')
    return paper
  })
}

/** The pages of a paper's blank PDF as pictures, with the boxes for the candidate number on them. Throws paper_invalid when the paper has none. */
export async function blankPagesOf(paper: Paper | null): Promise<BlankPage[]> {
  const file = paper?.blankFileId ? await getStoredFile(db(), paper.blankFileId) : null
  if (!file) throw new AppError('paper_invalid')
  const boxes = paper!.boxes.filter(({ kind }) => kind === 'number')
  const pages = await openBlankPaper(await readKept(file.sha256))
  return pages.map((one) => ({ ...one, numberBoxes: boxes.filter(({ page }) => page === one.page).map(({ rect }) => rect) }))
}

/** Whether a sheaf is still there to be read: somebody may have stopped it. */
async function isBeingRead(db: Parameters<typeof getSheaf>[0], sheafId: string): Promise<boolean> {
  return (await getSheaf(db, sheafId))?.state === 'reading'
}

async function readMissing(reader: LeafReader, sheaf: Sheaf, pages: number | null, goOn: () => boolean): Promise<boolean> {
  const readings = (await listLeavesWithEvidence(db(), sheaf.id)).map(({ evidence }) => evidence.reading)
  const known = new Set(readings.map(({ index }) => index))
  // Where several papers may lie in a sheaf, nothing is certain before its end.
  const placeMore = pages === null ? () => nothingYet : firstPlacer(pages)
  // Once one lane has stopped, the reader is closing and what the other lanes bring is no finding.
  let open = true
  const store = async (leaves: readonly LeafReading[]) => {
    open &&= goOn()
    if (!open) return
    try {
      readings.push(...leaves)
      const first = placeMore(readings)
      await transaction(async (trx) => {
        open &&= await isBeingRead(trx, sheaf.id)
        if (!open) return
        for (const leaf of leaves) await addLeafReading(trx, sheaf.id, leaf)
        if (first.findings.length > 0) await placeFirst(trx, sheaf, first.readings, first.findings)
      })
    } catch (error) {
      open = false
      throw error
    }
  }
  await readLeaves(reader, (index) => known.has(index) || !open, store, env.SHEAFMARK_THREADS)
  return open && goOn()
}

/** Looked again for scripts that are certain after so many more leaves, and so large a part of those known: the longer the sheaf, the rarer. */
const oftenest = 4
const part = 0.08

type First = Readonly<{ readings: readonly LeafReading[]; findings: readonly LeafFinding[] }>

const nothingYet: First = { readings: [], findings: [] }

/** Finds scripts that can be put in place, each once. Asked with all readings so far, in any order. */
function firstPlacer(pages: number): (readings: readonly LeafReading[]) => First {
  let looked = 0
  let placed = 0
  const byCode = new Set<number>()
  return (readings) => {
    const first = fromTheStart(readings)
    if (first.length - looked < Math.max(oftenest, part * looked)) return { readings: [], findings: [] }
    looked = first.length
    const from = first.findIndex((leaf) => rank(leaf) >= placed)
    const found = placeFirstPile(first, pages, from === -1 ? first.length : from)
    const coded = found.filter((finding) => finding.printed !== undefined && !byCode.has(rank(finding)))
    for (const finding of coded) byCode.add(rank(finding))
    const inTurn = found.filter((finding) => finding.printed === undefined && rank(finding) >= placed)
    placed = Math.max(placed, ...inTurn.map((finding) => rank(finding) + 1))
    const findings = [...coded, ...inTurn]
    return { readings: first, findings }
  }
}

/** The place of a leaf in its sheaf, both halves of a sheet counted. */
function rank({ index, half }: Readonly<{ index: number; half?: 0 | 1 }>): number {
  return 2 * index + (half ?? 1)
}

/** The readings up to the first leaf that is not read yet, in order. */
function fromTheStart(readings: readonly LeafReading[]): LeafReading[] {
  const inOrder = [...readings].sort((a, b) => rank(a) - rank(b))
  const gap = inOrder.findIndex(({ index }, k) => index > (inOrder[k - 1]?.index ?? -1) + 1)
  return gap === -1 ? inOrder : inOrder.slice(0, gap)
}
