import { isDeepStrictEqual } from 'node:util'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { settingOf, type Setting } from '@/lib/core/setting'
import { transaction } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { gatePaper } from './gate-paper'
import { storeSetting } from './store-setting'

export type SaveSetting = Readonly<{ paperId: string; /** The scheme version the change was made on. */ version: number; setting: Setting }>

/**
 * Saves answer spaces, boxes and scheme as one value. Sent twice it is saved once; made on an older version it throws out_of_date.
 * Also throws paper_invalid, and has_stamps for what marking has touched. Returns the scheme's version now.
 */
export async function saveSetting(actor: Actor, { paperId, version, setting }: SaveSetting): Promise<number> {
  return transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const paper = await getPaper(trx, paperId)
    if (!paper) throw new AppError('not_found')
    if (isDeepStrictEqual(plain(settingOf(paper)), plain(setting))) return paper.schemeVersion
    if (paper.schemeVersion !== version) throw new AppError('out_of_date', { version: paper.schemeVersion })
    return storeSetting(trx, actor, paper, setting)
  })
}

/** Only what would be stored counts: the database keeps boxes by kind. */
function plain(setting: Setting): unknown {
  const byKind = [...setting.boxes].sort((a, b) => (a.kind === b.kind ? 0 : a.kind < b.kind ? -1 : 1))
  return JSON.parse(JSON.stringify({ ...setting, boxes: byKind }))
}
