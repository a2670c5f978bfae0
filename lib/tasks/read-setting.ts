import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { PaperPage, Withdrawal } from '@/lib/core/paper'
import { settingOf, type Setting } from '@/lib/core/setting'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { touchedByMarking } from '@/db/touched-by-marking'
import { gatePaper } from './gate-paper'

/** A paper as the Set screen opens it. `stamped` are ids of questions and points that marking has touched. */
export type SettingView = Readonly<{
  paperId: string
  title: string
  version: number
  /** Changes with each new blank paper; null: there is none yet. */
  blank: string | null
  pages: readonly PaperPage[]
  setting: Setting
  stamped: readonly string[]
  withdrawnQuestions: Readonly<Record<string, Withdrawal>>
  withdrawnPoints: readonly string[]
}>

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
  }
}
