import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Paper } from '@/lib/core/paper'
import { answersCutAgain, settingOf, type Setting } from '@/lib/core/setting'
import { assertToleranceKept } from '@/lib/setting/assert-tolerance-kept'
import { checkSetting } from '@/lib/setting/check-setting'
import { planChanges, type Touched } from '@/lib/setting/plan-changes'
import { faultLines, placeInWords } from '@/lib/setting/setting-fault'
import { addAuditLine } from '@/db/audit'
import type { Db } from '@/db/knex'
import { getPaper, putMarkingRules, setPaperBoxes } from '@/db/papers'
import { dropPoints, dropQuestions, dropSpaces, idsOfOtherPapers, parkLabels, putQuestion } from '@/db/questions'
import { ensureResponses } from '@/db/responses'
import { hasSample } from '@/db/samples'
import { addSchemeVersion } from '@/db/scheme-versions'
import { countScannedPages } from '@/db/scripts'
import { touchedByMarking } from '@/db/touched-by-marking'
import { askToPrune } from './prune-cuts'
import { renewInk } from './renew-ink'
import { renewSuggestions } from './renew-suggestions'

/**
 * Puts a checked setting in place of the stored one, inside the caller's transaction and after its gate: keeps the scheme's next
 * version, the responses of new questions and the audit line. Returns the version; throws paper_invalid, has_stamps or tolerance_fixed.
 */
export async function storeSetting(trx: Db, actor: Actor, paper: Paper, next: Setting): Promise<number> {
  const withdrawn = new Set(paper.questions.flatMap(({ points }) => points.filter((point) => point.withdrawn).map(({ id }) => id)))
  const faults = checkSetting(next, paper.pages, withdrawn)
  if (faults.length > 0) throw new AppError('paper_invalid', { lines: faultLines(faults, placeInWords) })
  const plan = planChanges(paper.questions, next, (await touchedByMarking(trx, paper.id)) satisfies Touched)
  if (await hasSample(trx, paper.id)) assertToleranceKept(paper, next)
  await assertOwnIds(trx, paper.id, next)
  await dropSpaces(trx, plan.dropSpaces)
  await dropPoints(trx, plan.dropPoints)
  await dropQuestions(trx, plan.dropQuestions)
  await putMarkingRules(trx, paper.id, next.step, next.tolerance)
  await setPaperBoxes(trx, paper.id, next.boxes)
  await parkLabels(trx, paper.id)
  for (const [position, question] of next.questions.entries()) await putQuestion(trx, paper.id, { ...question, position, points: question.points.map((point) => ({ ...point, withdrawn: false })) })
  await ensureResponses(trx, paper.id)
  if (answersCutAgain(settingOf(paper), next, await countScannedPages(trx, paper.id)) > 0) await askToPrune(trx, paper.id)
  if (spacesOf(paper) !== spacesOf(next)) await renewInk(trx, paper.id)
  if (JSON.stringify(paper.boxes) !== JSON.stringify(next.boxes)) await renewSuggestions(trx, paper.id)
  return markSchemeChanged(trx, actor, paper.id, 'scheme.saved')
}

/** Where answers are written, as one value to compare. */
function spacesOf({ questions }: Pick<Setting, 'questions'>): string {
  return JSON.stringify(questions.map(({ id, spaces }) => [id, spaces.map(({ page, rect: { x, y, w, h } }) => [page, x, y, w, h])]))
}

/** Keeps the scheme as it stands now as the next version and says so in the audit. */
export async function markSchemeChanged(trx: Db, actor: Actor, paperId: string, act: string, objectKind = 'paper', objectId = paperId): Promise<number> {
  const paper = (await getPaper(trx, paperId))!
  const scheme = { ...settingOf(paper), withdrawn: paper.questions.flatMap(({ id, withdrawn, points }) => [...(withdrawn ? [{ id, ...withdrawn }] : []), ...points.filter((point) => point.withdrawn).map((point) => ({ id: point.id }))]) }
  const version = await addSchemeVersion(trx, paperId, scheme, actor.userId)
  await addAuditLine(trx, actor, { act, objectKind, objectId, paperId, from: version - 1, to: version })
  return version
}

async function assertOwnIds(trx: Db, paperId: string, { questions }: Setting): Promise<void> {
  const ids = {
    questions: questions.map(({ id }) => id),
    points: questions.flatMap(({ points }) => points.map(({ id }) => id)),
    spaces: questions.flatMap(({ spaces }) => spaces.map(({ id }) => id)),
  }
  const all = [...ids.questions, ...ids.points, ...ids.spaces]
  if (new Set(all).size !== all.length || (await idsOfOtherPapers(trx, paperId, ids)).length > 0) throw new AppError('bad_input')
}
