import type { Actor } from '@/lib/core/actor'
import { assertMaySchool } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { halves, type MarkingStep } from '@/lib/core/marks'
import type { PaperPage } from '@/lib/core/paper'
import { readPaperFile, type ReadPaper } from '@/lib/setting/read-paper-file'
import { keepUntil } from '@/lib/setting/keep-until'
import { addAuditLine } from '@/db/audit'
import { addClassSet } from '@/db/class-sets'
import { isTeacherOf } from '@/db/classes'
import { transaction, type Db } from '@/db/knex'
import { addPaper, getPaper, paperMaker, setBlankPaper, setPaperPages } from '@/db/papers'
import { now } from '@/lib/infra/clock'
import { env } from '@/lib/infra/env'
import { keepBytes } from '@/lib/infra/file-store'
import { newId } from '@/lib/core/ids'
import { addBlankFile } from './add-blank-file'
import { openBlank } from './open-blank'
import { putFileDetails } from './put-file-details'
import { storeSetting } from './store-setting'

export type CreatePaper = Readonly<{
  /** Made where the form was filled in: sent twice makes one paper. */
  id: string
  /** Empty: the title of the paper.json. */
  title: string
  step: MarkingStep
  classSets: readonly Readonly<{ classId: string; satOn: string }>[]
  blank: Readonly<{ bytes: Uint8Array; name: string }> | null
  /** A paper.json, parsed but not checked. */
  paperFile?: unknown
}>

/** Makes a paper with its class sets, blank paper and what a paper.json says. All or nothing; throws paper_invalid and the file errors. */
export async function createPaper(actor: Actor, input: CreatePaper): Promise<{ paperId: string }> {
  assertMaySchool(actor, 'new-paper')
  const pages = input.blank && (await openBlank(input.blank.bytes))
  const file = input.paperFile === undefined ? null : readPaperFile(input.paperFile, pages ?? undefined)
  const title = input.title.trim() || file?.title
  if (!title) throw new AppError('bad_input', { lines: [{ path: 'title', says: 'Write a title.' }] })
  const kept = input.blank && (await keepBytes(input.blank.bytes))
  return transaction(async (trx) => {
    if (await isOwnAlready(trx, actor, input.id)) return { paperId: input.id }
    await addPaper(trx, { id: input.id, title, step: input.step, tolerance: halves(1), keepUntil: endOfKeeping(input.classSets), createdBy: actor.userId })
    await addAuditLine(trx, actor, { act: 'paper.created', objectKind: 'paper', objectId: input.id, paperId: input.id })
    await addClassSets(trx, actor, input)
    if (kept) await setBlankPaper(trx, input.id, await addBlankFile(trx, actor, kept, input.blank!.name), pages!)
    if (file) await putFile(trx, actor, input.id, file, pages)
    return { paperId: input.id }
  })
}

async function isOwnAlready(trx: Db, actor: Actor, id: string): Promise<boolean> {
  const maker = await paperMaker(trx, id)
  if (maker !== null && maker !== actor.userId) throw new AppError('already_there')
  return maker !== null
}

function endOfKeeping(sets: CreatePaper['classSets']): string {
  const last = sets.map(({ satOn }) => satOn).sort().at(-1) ?? new Date(now()).toISOString().slice(0, 10)
  return keepUntil(last, env.SHEAFMARK_KEEP_MONTHS)
}

async function addClassSets(trx: Db, actor: Actor, { id, classSets }: CreatePaper): Promise<void> {
  for (const { classId, satOn } of classSets) {
    if (!(await isTeacherOf(trx, actor.userId, classId))) throw new AppError('not_allowed')
    const setId = newId()
    await addClassSet(trx, { id: setId, paperId: id, classId, satOn, resitOf: null })
    await addAuditLine(trx, actor, { act: 'class-set.added', objectKind: 'class_set', objectId: setId, paperId: id })
  }
}

async function putFile(trx: Db, actor: Actor, paperId: string, file: ReadPaper, pages: readonly PaperPage[] | null): Promise<void> {
  if (!pages) await setPaperPages(trx, paperId, file.pages)
  await storeSetting(trx, actor, (await getPaper(trx, paperId))!, file.setting)
  await putFileDetails(trx, paperId, file)
}
