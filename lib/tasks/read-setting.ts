import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { settingOf } from '@/lib/core/setting'
import type { SettingView } from '@/lib/core/setting-view'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { hasSample } from '@/db/samples'
import { countScannedPages } from '@/db/scripts'
import { touchedByMarking } from '@/db/touched-by-marking'
import { gatePaper } from './gate-paper'

/** All that the Set screen shows and changes. */
export async function readSetting(actor: Actor, paperId: string): Promise<SettingView> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  if (!paper) throw new AppError('not_found')
  const touched = await touchedByMarking(db(), paperId)
  return {
    paperId, title: paper.title, version: paper.schemeVersion, blank: paper.blankFileId, pages: paper.pages, setting: settingOf(paper),
    stamped: [...touched.questions, ...touched.points],
    withdrawnQuestions: Object.fromEntries(paper.questions.flatMap(({ id, withdrawn }) => (withdrawn ? [[id, withdrawn]] : []))),
    withdrawnPoints: paper.questions.flatMap(({ points }) => points.filter((point) => point.withdrawn).map(({ id }) => id)),
    scanned: await countScannedPages(db(), paperId),
    sampled: await hasSample(db(), paperId),
  }
}
