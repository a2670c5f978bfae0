import { mayOnPaper, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Paper } from '@/lib/core/paper'
import type { SampleOffer, SampleView, SecondMarking } from '@/lib/core/second-marking'
import { markerPatterns } from '@/lib/second-marking/marker-patterns'
import { sampleView } from '@/lib/second-marking/sample-view'
import { defaultSampleSize } from '@/lib/second-marking/default-sample-size'
import { listClassSets, type ClassSet } from '@/db/class-sets'
import { db, type Db } from '@/db/knex'
import { listMarkerAdjustments, type KeptAdjustment } from '@/db/marker-adjustments'
import { listOwners, listPeopleWith, type PaperPerson } from '@/db/paper-people'
import { getPaper } from '@/db/papers'
import { listSampledAnswers, type SampledAnswer } from '@/db/sampled-answers'
import { firstMarkerIds, listSamples, listSampleScripts, type Sample, type SampleScript } from '@/db/samples'
import { gatePaper } from './gate-paper'
import { sampleCandidates } from './sample-candidates'

const nameOf = ({ givenName, familyName }: PaperPerson) => `${givenName.charAt(0)}. ${familyName}`

type Held = Readonly<{ actor: Actor; owner: boolean; paper: Paper; answers: readonly SampledAnswer[]; scripts: readonly SampleScript[]; people: readonly PaperPerson[]; adjustments: readonly KeptAdjustment[] }>

async function viewOf(trx: Db, held: Held, sample: Sample, set: ClassSet): Promise<SampleView> {
  const { actor, owner, paper } = held
  const scripts = held.scripts.filter(({ sampleId }) => sampleId === sample.id)
  const columns = paper.questions.map(({ id, label, maximum, tolerance }) => ({ id, label, maximum, tolerance: tolerance ?? sample.tolerance }))
  const answers = held.answers.filter(({ sampleId }) => sampleId === sample.id)
  const there = new Set(scripts.map(({ scriptId }) => scriptId))
  const addable = sample.closedAt === null ? (await sampleCandidates(trx, paper.id, set.id)).candidates.filter(({ scriptId }) => !there.has(scriptId)) : []
  const person = held.people.find(({ userId }) => userId === sample.moderatorId)
  return {
    id: sample.id, classSetId: set.id, className: set.className, moderator: person ? nameOf(person) : 'a moderator', mine: sample.moderatorId === actor.userId,
    seed: sample.seed, size: sample.size, defaultSize: sample.defaultSize, drawnAt: sample.drawnAt, closedAt: sample.closedAt,
    addable: addable.map(({ scriptId, number }) => ({ scriptId, number })),
    patterns: markerPatterns(answers, columns, paper.step),
    adjustments: held.adjustments.filter(({ sampleId }) => sampleId === sample.id).map(({ sampleId: _sample, paperId: _paper, ...adjustment }) => adjustment),
    ...sampleView({ answers, scripts, columns, owner }),
  }
}

/** Class sets whose sample can be drawn, with the moderators who could mark them blind. */
async function offerOf(trx: Db, paper: Paper, set: ClassSet, people: readonly PaperPerson[], drawnFor: ReadonlySet<string>): Promise<SampleOffer> {
  const { candidates, toMark } = await sampleCandidates(trx, paper.id, set.id)
  const owners = new Set((await listOwners(trx, paper.id)).map(({ userId }) => userId))
  const markers = await firstMarkerIds(trx, set.id)
  const defaultSize = defaultSampleSize(candidates.length)
  const free = people.filter(({ userId }) => !owners.has(userId) && !markers.has(userId) && !drawnFor.has(userId))
  return {
    classSetId: set.id, className: set.className, scripts: candidates.length, toMark, size: paper.sampleSize ?? defaultSize, defaultSize,
    moderators: free.map((person) => ({ userId: person.userId, name: `${person.givenName} ${person.familyName}` })),
  }
}

/**
 * Second marking as it stands: an owner sees every sample and what can be drawn, a moderator their own samples without names.
 * Nothing of an answer's first mark is in it before its second mark is settled. Throws not_found or not_allowed.
 */
export async function readSecondMarking(actor: Actor, paperId: string, trx: Db = db()): Promise<SecondMarking> {
  const standing = await gatePaper(trx, actor, 'agree', paperId)
  const owner = mayOnPaper(actor, 'change', standing)
  const paper = await getPaper(trx, paperId)
  if (!paper) throw new AppError('not_found')
  const sets = await listClassSets(trx, paperId)
  const samples = await listSamples(trx, paperId)
  const people = await listPeopleWith(trx, 'moderator')
  const held: Held = { actor, owner, paper, people, answers: await listSampledAnswers(trx, paperId), scripts: await listSampleScripts(trx, paperId), adjustments: await listMarkerAdjustments(trx, paperId) }
  const views: SampleView[] = []
  for (const sample of samples) if (owner || sample.moderatorId === actor.userId) views.push(await viewOf(trx, held, sample, sets.find(({ id }) => id === sample.classSetId)!))
  const offers: SampleOffer[] = []
  for (const set of owner ? sets.filter(({ scripts }) => scripts > 0) : []) {
    const drawnFor = new Set(samples.filter(({ classSetId }) => classSetId === set.id).map(({ moderatorId }) => moderatorId))
    offers.push(await offerOf(trx, paper, set, people, drawnFor))
  }
  return { paperId, owner, offers, samples: views }
}
