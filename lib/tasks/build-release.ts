import { AppError, type ErrorCode } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { addAuditLine } from '@/db/audit'
import { db, transaction } from '@/db/knex'
import { getRelease, markReleaseFailed, markReleased, type Release } from '@/db/releases'
import { countBuilt, isBuilt, listScriptsToBuild, markBuilt, markNotBuilt, type ScriptToBuild } from '@/db/returned-scripts'
import { addStoredFile } from '@/db/stored-files'
import { now } from '@/lib/infra/clock'
import { keepBytes } from '@/lib/infra/file-store'
import { buildReturnedScript } from '@/lib/handing-back/returned-script'
import { scriptResult, summaryOf, type ScriptResult } from '@/lib/handing-back/script-result'
import { gatherClassSet, gatheredScript, type GatheredSet } from './gather-class-set'
import { mailReleased } from './mail-released'
import { keptBackReason } from './scripts-to-go'
import { SheavesAtHand } from './sheaves-at-hand'

/**
 * Builds the scripts of a release one by one and hands them all back at the end in one transaction, with the mails. Each script is
 * stored as it is built, so it may be killed and started again at any point: it goes on with what is missing, and a script built
 * twice is the same file. What cannot be built stays behind with its reason and keeps nobody else's back.
 * @param goOn asked before each script is stored; once false nothing more is written and the answer is false
 */
export async function buildRelease(releaseId: string, goOn: () => boolean): Promise<boolean> {
  const release = await getRelease(db(), releaseId)
  if (release?.state !== 'building') return true
  const gathered = await gatherClassSet(db(), release.classSetId)
  const sheaves = new SheavesAtHand()
  try {
    for (const script of await listScriptsToBuild(db(), releaseId)) {
      if (!goOn()) return false
      await buildOne(release, gathered, script, sheaves)
    }
  } finally {
    sheaves.close()
  }
  return transaction(async (trx) => {
    if (!goOn()) return false
    const built = await countBuilt(trx, releaseId)
    if (built === 0) throw new AppError('nothing_to_return')
    const at = now()
    if (!(await markReleased(trx, releaseId, at))) return true
    await mailReleased(trx, releaseId, gathered.paper.title)
    await addAuditLine(trx, null, { act: 'release.released', objectKind: 'release', objectId: releaseId, paperId: gathered.paper.id, to: built })
    return true
  })
}

/** A release that could not be built at all. */
export async function releaseFailed(releaseId: string, code: string): Promise<void> {
  await transaction(async (trx) => {
    await markReleaseFailed(trx, releaseId, code)
    await addAuditLine(trx, null, { act: 'release.failed', objectKind: 'release', objectId: releaseId, to: code })
  })
}

const stayBehind: readonly ErrorCode[] = ['page_shared', 'page_unreadable', 'sheaf_missing', 'not_found']

async function buildOne(release: Release, gathered: GatheredSet, script: ScriptToBuild, sheaves: SheavesAtHand): Promise<void> {
  // A mark may have been taken back, or a name, since the release was asked for.
  const problem = keptBackReason(gathered, script.scriptId, new Set())
  const source = gatheredScript(gathered, script.scriptId)
  if (problem || !source || gathered.scripts.find(({ scriptId }) => scriptId === script.scriptId)?.studentId !== script.studentId) {
    return transaction((trx) => markNotBuilt(trx, script.id, problem ?? 'name_open'))
  }
  try {
    const result = scriptResult(source)
    const summary = summaryOf(source, result, { day: new Date(release.createdAt).toISOString().slice(0, 10), revision: script.revision })
    const { sheaves: sources, pages, says } = await sheaves.fetch(result.pages)
    const kept = await keepBytes(await buildReturnedScript(sources, { summary: { ...summary, copies: says }, pages, builtAt: new Date(release.createdAt) }))
    await store(script, result, kept, release)
  } catch (error) {
    if (!(error instanceof AppError) || !stayBehind.includes(error.code)) throw error
    await transaction((trx) => markNotBuilt(trx, script.id, error.code === 'not_found' ? 'sheaf_missing' : error.code))
  }
}

async function store(script: ScriptToBuild, { detail, key }: ScriptResult, kept: { sha256: string; size: number }, release: Release): Promise<void> {
  await transaction(async (trx) => {
    // Another worker was quicker, with the same file.
    if (await isBuilt(trx, script.id)) return
    const fileId = newId()
    await addStoredFile(trx, { id: fileId, ...kept, mediaType: 'application/pdf', originalName: `${detail.title}.pdf`, createdBy: release.createdBy })
    await markBuilt(trx, script.id, { fileId, contentKey: key, at: now(), detail })
  })
}
