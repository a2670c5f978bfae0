import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import type { Paper } from '@/lib/core/paper'
import type { CodeSpot } from '@/lib/core/printed-code'
import { now } from '@/lib/infra/clock'
import { readKept } from '@/lib/infra/file-store'
import { newToken } from '@/lib/infra/new-token'
import { assertCodePlace, type CodePlace } from '@/lib/printing/code-place'
import { buildPrintPack, type PackScript } from '@/lib/printing/print-pack'
import { addAuditLine } from '@/db/audit'
import { getClassSet, type ClassSet } from '@/db/class-sets'
import { listClassSetStudents } from '@/db/class-set-students'
import { listCodeSpots } from '@/db/code-spots'
import { db, transaction } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { addPrintRun, countSpares } from '@/db/print-runs'
import { getStoredFile } from '@/db/stored-files'
import { gatePaper } from './gate-paper'
import { pageGrounds } from './page-grounds'

export type MakePrintPack = Readonly<{ paperId: string; classSetId: string; spares: number; twoSided: boolean }>
type Printed = PackScript & Readonly<{ id: string; studentId: string | null }>

/**
 * Prints a class set's papers with codes: one PDF in the order of the list, spare scripts at its end, and the run with every token kept.
 * Each call is a print of its own; earlier ones stay good. Throws code_place_missing, code_place_bad (the paper was changed since), bad_input
 * for a class set without anyone to print for, and the errors of the blank paper.
 */
export async function makePrintPack(actor: Actor, { paperId, classSetId, spares, twoSided }: MakePrintPack): Promise<{ bytes: Uint8Array; name: string }> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  const set = await getClassSet(db(), classSetId)
  if (!paper || set?.paperId !== paperId) throw new AppError('not_found')
  const spots = await listCodeSpots(db(), paperId)
  const places = await checkedPlaces(paper, spots)
  const scripts = await scriptsToPrint(set, spares, paper.pages.length)
  if (scripts.length === 0) throw new AppError('bad_input', { lines: [{ path: 'spares', says: 'Nobody is on this list. Ask for spare scripts, or add students.' }] })
  const file = (await getStoredFile(db(), paper.blankFileId!))!
  const title = `${paper.title}, ${set.className}`
  const bytes = await buildPrintPack({ blank: await readKept(file.sha256), pages: paper.pages, places, scripts, twoSided, title, builtAt: new Date(now()) })
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const id = newId()
    await addPrintRun(trx, { id, paperId, classSetId, blankFileId: file.id, twoSided, spots, scripts, createdBy: actor.userId })
    await addAuditLine(trx, actor, { act: 'pack.printed', objectKind: 'class_set', objectId: classSetId, paperId, to: `scripts ${scripts.length}, of them spare ${spares}` })
  })
  return { bytes, name: `${title}.pdf` }
}

async function checkedPlaces(paper: Paper, spots: readonly CodeSpot[]): Promise<CodePlace[]> {
  const grounds = await pageGrounds(paper)
  return grounds.map((ground) => {
    const spot = spots.find(({ page }) => page === ground.page)
    if (!spot) throw new AppError('code_place_missing', { page: ground.page })
    return assertCodePlace(spot, ground)
  })
}

/** Everyone expected, in the order of the list, then the spare ones, numbered on from earlier prints. */
async function scriptsToPrint({ id, className }: ClassSet, spares: number, pages: number): Promise<Printed[]> {
  const listed = (await listClassSetStudents(db(), [id])).filter(({ attendance }) => attendance === 'expected')
  const tokens = () => Array.from({ length: pages }, newToken)
  const before = await countSpares(db(), id)
  return [
    ...listed.map((student): Printed => ({ id: newId(), studentId: student.studentId, name: `${student.givenName} ${student.familyName}`, about: `${student.candidateNumber} · ${className}`, tokens: tokens() })),
    ...Array.from({ length: spares }, (_, k): Printed => ({ id: newId(), studentId: null, name: `Spare ${before + k + 1}`, about: className, tokens: tokens() })),
  ]
}
