import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { mergePaperFile } from '@/lib/setting/merge-paper-file'
import { readPaperFile } from '@/lib/setting/read-paper-file'
import { transaction } from '@/db/knex'
import { getPaper, setPaperPages } from '@/db/papers'
import { hasStamps } from '@/db/touched-by-marking'
import { gatePaper } from './gate-paper'
import { putFileDetails } from './put-file-details'
import { storeSetting } from './store-setting'

export type ImportPaper = Readonly<{ paperId: string; version: number; /** A paper.json, parsed but not checked. */ paperFile: unknown }>

/**
 * Lays a paper.json over a paper: replaces the scheme while nothing is stamped, afterwards only adds and changes by label.
 * Throws paper_invalid, has_stamps and out_of_date. Returns the scheme's version now.
 */
export async function importPaper(actor: Actor, { paperId, version, paperFile }: ImportPaper): Promise<number> {
  return transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const paper = (await getPaper(trx, paperId))!
    const file = readPaperFile(paperFile, paper.pages.length > 0 ? paper.pages : undefined)
    if (paper.schemeVersion !== version) throw new AppError('out_of_date', { version: paper.schemeVersion })
    if (paper.pages.length === 0) await setPaperPages(trx, paperId, file.pages)
    const setting = mergePaperFile(paper.questions, file.setting, await hasStamps(trx, paperId))
    const next = await storeSetting(trx, actor, { ...paper, pages: paper.pages.length > 0 ? paper.pages : file.pages }, setting)
    await putFileDetails(trx, paperId, file)
    return next
  })
}
