import { createReadStream } from 'node:fs'
import { once } from 'node:events'
import { Readable } from 'node:stream'
import { setTimeout } from 'node:timers/promises'
import { ZipArchive } from 'archiver'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { db } from '@/db/knex'
import { awaitedFile, listFilesInWork, listStandingFiles, type FileOfSet } from '@/db/returned-scripts'
import { keptPath, openKept } from '@/lib/infra/file-store'
import { classFile, pagesOf, type BundledScript } from '@/lib/handing-back/class-file'
import { scriptResult, summaryOf } from '@/lib/handing-back/script-result'
import { loadSheafFile } from '@/lib/handing-back/sheaf-file'
import { pairRows, type Student } from '@/lib/results/mark-book-rows'
import { gateClassSet } from './gate-class-set'
import { gatherClassSet, gatheredScript, type GatheredSet } from './gather-class-set'
import { SheavesAtHand } from './sheaves-at-hand'

/** A download that is made while it is read. */
export type Bundle = Readonly<{ name: string; stream: Readable }>
/** `before`: what stands handed back of a script that is being built again. */
type Listed = FileOfSet & Readonly<{ student: Student; before: FileOfSet | null }>

/** How often a script that is still being built is looked for, in milliseconds. */
const look = 300

/**
 * All that stands handed back of a class set as one ZIP of the very files students have, in the order of the register; for owners. While
 * a release is being built its scripts are in it too, each as soon as it is there. Throws not_found, not_allowed or not_released.
 */
export async function openClassZip(actor: Actor, classSetId: string): Promise<Bundle> {
  const { gathered, files } = await standing(actor, classSetId, true)
  const zip = new ZipArchive({ store: true })
  void fill(zip, files).catch((error: Error) => zip.destroy(error))
  return { name: `${titleOf(gathered)}.zip`, stream: zip }
}

async function fill(zip: ZipArchive, files: readonly Listed[]): Promise<void> {
  for (const [k, file] of files.entries()) {
    const sha256 = (await whenBuilt(file, () => zip.destroyed)) ?? file.before?.sha256
    if (zip.destroyed) return
    if (!sha256) continue
    const put = once(zip, 'entry')
    zip.append(createReadStream(keptPath(sha256)), { name: entryName(k + 1, files.length, file), date: new Date(file.askedAt) })
    await put
  }
  await zip.finalize()
}

async function whenBuilt(file: FileOfSet, stopped: () => boolean): Promise<string | null> {
  if (file.sha256 !== null || file.problem !== null) return file.sha256
  for (;;) {
    const { sha256, open } = await awaitedFile(db(), file.id)
    if (!open || stopped()) return sha256
    await setTimeout(look)
  }
}

/** "07 Souza, Ibrahim, 8144.pdf": sorted by name a folder is in the order of the register. */
function entryName(number: number, of: number, { student, revision }: Listed): string {
  const words = [`${student.familyName}, ${student.givenName}`, student.candidateNumber, ...(revision > 1 ? [`revision ${revision}`] : [])].filter((word) => word !== '').join(', ')
  return `${String(number).padStart(String(of).length, '0')} ${words.replace(/[\\/:*?"<>|\p{Cc}]/gu, '-')}.pdf`
}

/**
 * All that stands handed back of a class set as one PDF for printing on both sides, in the order of the register; for owners. A script
 * that has changed since is in it as it was handed back. Throws not_found, not_allowed or not_released.
 */
export async function openClassPdf(actor: Actor, classSetId: string): Promise<Bundle> {
  const { gathered, files } = await standing(actor, classSetId, false)
  const title = titleOf(gathered)
  const builtAt = new Date(Math.max(...files.map(({ askedAt }) => askedAt)))
  return { name: `${title}.pdf`, stream: Readable.from(classFile(title, builtAt, bundled(gathered, files))) }
}

async function* bundled(gathered: GatheredSet, files: readonly Listed[]): AsyncGenerator<BundledScript> {
  const sheaves = new SheavesAtHand()
  try {
    for (const file of files) {
      const name = `${file.student.familyName}, ${file.student.givenName}`
      const source = gatheredScript(gathered, file.scriptId)
      const result = source && scriptResult(source)
      if (source && result && result.key === file.contentKey) {
        const summary = summaryOf(source, result, { day: new Date(file.askedAt).toISOString().slice(0, 10), revision: file.revision })
        const { says, ...ready } = await sheaves.fetch(result.pages)
        yield { name, summary: { ...summary, copies: says }, ...ready }
      } else yield* asHandedBack(name, file.sha256!)
    }
  } finally {
    sheaves.close()
  }
}

/** A script out of its frozen file, fonts and all. */
async function* asHandedBack(name: string, sha256: string): AsyncGenerator<BundledScript> {
  const file = openKept(sha256)
  try {
    const document = await loadSheafFile(file)
    yield { name, summary: null, pages: pagesOf(document, 'file'), sheaves: new Map([['file', document]]) }
  } finally {
    file.close()
  }
}

async function standing(actor: Actor, classSetId: string, withWork: boolean): Promise<{ gathered: GatheredSet; files: readonly Listed[] }> {
  const set = await gateClassSet(db(), actor, 'change', classSetId)
  const gathered = await gatherClassSet(db(), classSetId)
  const [held, inWork] = [await listStandingFiles(db(), classSetId), withWork ? await listFilesInWork(db(), classSetId) : []]
  const files = pairRows(gathered.students, []).flatMap(({ student }): Listed[] => {
    const [before, coming] = [held, inWork].map((list) => list.find(({ studentId }) => studentId === student?.studentId) ?? null)
    const file = coming ?? before
    return student && file ? [{ ...file, student, before: before ?? null }] : []
  })
  if (files.length === 0) throw new AppError('not_released')
  await addAuditLine(db(), actor, { act: 'release.downloaded', objectKind: 'class_set', objectId: classSetId, paperId: set.paperId, to: files.length })
  return { gathered, files }
}

function titleOf({ paper, set }: GatheredSet): string {
  return `${set.className}, ${paper.title}`
}
