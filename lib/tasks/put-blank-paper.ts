import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Paper, PaperPage } from '@/lib/core/paper'
import { settingOf } from '@/lib/core/setting'
import { checkSetting } from '@/lib/setting/check-setting'
import { faultLines, placeInWords } from '@/lib/setting/setting-fault'
import { addAuditLine } from '@/db/audit'
import { db, transaction } from '@/db/knex'
import { getPaper, hasScripts, setBlankPaper } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import { keepBytes } from '@/lib/infra/file-store'
import { addBlankFile } from './add-blank-file'
import { gatePaper } from './gate-paper'
import { openBlank } from './open-blank'

/** Sizes this near are the same sheet, in points. */
const samePage = 1.5

/**
 * Puts a blank paper (PDF bytes, kept as they are) in place. Throws the file errors, and pages_differ when answer spaces would
 * fall off it, or when scripts were placed on pages of another number or size.
 */
export async function putBlankPaper(actor: Actor, { paperId, bytes, name }: { paperId: string; bytes: Uint8Array; name: string }): Promise<{ pages: number }> {
  await gatePaper(db(), actor, 'change', paperId)
  const pages = await openBlank(bytes)
  const kept = await keepBytes(bytes)
  return transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const paper = (await getPaper(trx, paperId))!
    const before = paper.blankFileId && (await getStoredFile(trx, paper.blankFileId))
    if (before && before.sha256 === kept.sha256) return { pages: pages.length }
    assertFits(paper, pages, await hasScripts(trx, paperId))
    const fileId = await addBlankFile(trx, actor, kept, name)
    await setBlankPaper(trx, paperId, fileId, pages)
    await addAuditLine(trx, actor, { act: 'paper.blank-put', objectKind: 'paper', objectId: paperId, paperId, from: paper.blankFileId, to: fileId })
    return { pages: pages.length }
  })
}

function assertFits(paper: Paper, pages: readonly PaperPage[], scripts: boolean): void {
  const same = paper.pages.length === pages.length && paper.pages.every((page, k) => Math.abs(page.width - pages[k]!.width) <= samePage && Math.abs(page.height - pages[k]!.height) <= samePage)
  if (same) return
  if (scripts) throw new AppError('pages_differ', { pages: pages.length, before: paper.pages.length })
  const off = checkSetting(settingOf(paper), pages).filter((fault) => fault.space !== undefined || fault.box !== undefined)
  if (off.length > 0) throw new AppError('pages_differ', { pages: pages.length, before: paper.pages.length, lines: faultLines(off, placeInWords) })
}
