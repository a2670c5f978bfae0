import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { ModerationRecordView } from '@/lib/core/moderation-record'
import { sayDay } from '@/lib/core/say-day'
import type { SampleView } from '@/lib/core/second-marking'
import { env } from '@/lib/infra/env'
import { moderationRecord, type RecordedDecision } from '@/lib/second-marking/moderation-record'
import { standsOf } from '@/lib/second-marking/sample-view'
import { getClassSet } from '@/db/class-sets'
import { listSampleDecisions } from '@/db/counting-decisions'
import { db, type Db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { getSample } from '@/db/samples'
import { shortName } from '@/db/short-name'
import { gatePaper } from './gate-paper'
import { readSecondMarking } from './read-second-marking'

/** The decisions on answers of a sample that both marked, with both marks. */
async function decisionsOf(trx: Db, { id, questions }: SampleView): Promise<RecordedDecision[]> {
  const compared = new Map(questions.flatMap(({ label, compared: answers }) => answers.map((answer) => [answer.responseId, { label, ...answer }] as const)))
  return (await listSampleDecisions(trx, id)).flatMap(({ responseId, round, reason, mark, by, at, superseded }) => {
    const answer = compared.get(responseId)
    const stands = standsOf(round, reason)
    return answer && stands ? [{ label: answer.label, scriptNumber: answer.scriptNumber, first: answer.first, second: answer.second, mark, stands, reason, by, at, superseded: superseded === 1 }] : []
  })
}

/** The record of one sample as it stands now, for an owner: sample and seed, figures, decisions, adjustments, who and when. Throws not_found or not_allowed. */
export async function readModerationRecord(actor: Actor, sampleId: string): Promise<ModerationRecordView & { at: number }> {
  const sample = await getSample(db(), sampleId)
  if (!sample) throw new AppError('not_found')
  await gatePaper(db(), actor, 'change', sample.paperId)
  const view = (await readSecondMarking(actor, sample.paperId)).samples.find(({ id }) => id === sampleId)!
  const [paper, set] = [(await getPaper(db(), sample.paperId))!, (await getClassSet(db(), sample.classSetId))!]
  const at = Date.now()
  const { moderator, seed, size, defaultSize, scripts, moderation, patterns, adjustments, undecided } = view
  const record = moderationRecord({
    school: env.schoolName, title: paper.title, className: set.className, satOn: sayDay(set.satOn), moderator, seed, size, defaultSize, scripts, moderation, patterns, adjustments, undecided,
    drawnBy: await shortName(db(), sample.drawnBy), drawnAt: sample.drawnAt, closed: sample.closedAt === null ? null : { by: await shortName(db(), sample.closedBy!), at: sample.closedAt },
    decisions: await decisionsOf(db(), view),
  }, at)
  return { paperId: sample.paperId, sampleId, record, at }
}
