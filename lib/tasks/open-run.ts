import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Marking } from '@/lib/core/marking'
import type { Paper, Question } from '@/lib/core/paper'
import type { Run, Strip, StripPicture } from '@/lib/core/run'
import type { Round } from '@/lib/core/stamp'
import { cutKey } from '@/lib/cutting/cut-key'
import { fairOrder } from '@/lib/marking/fair-order'
import { listFlagsOfQuestion, type Flag } from '@/db/flags'
import { db, type Db } from '@/db/knex'
import { listMarkingsOfQuestion } from '@/db/markings'
import { getPaper } from '@/db/papers'
import { lastWorkedOn, listRunPages, listRunResponses, runSeed, sampledScriptIds, type RunResponse, type ScriptPage } from '@/db/runs'
import { blindResponseIds, sampleResponseIds } from '@/db/samples'
import { gatePaper } from './gate-paper'
import { actOfRound } from './gate-response'
import { begun } from './marking-in-hand'
import { cutOf, hidesNames, masksOf, pagePictures } from './pictures-of-script'

type Asked = Readonly<{ paperId: string; questionId: string; round: Round }>
type Held = Readonly<{ actor: Actor; round: Round; paper: Paper; question: Question; owner: boolean; hidden: boolean; blind: ReadonlySet<string>; markings: readonly Marking[]; worked: ReadonlyMap<string, number>; flags: readonly Flag[]; pages: ReadonlyMap<string, ScriptPage[]> }>

/**
 * The strips of a question in the order this person marks them, with this person's marking of that round and of no other. The order is drawn once and kept. A moderator gets
 * the responses of their open samples and nothing of anyone else's marking. Throws not_found or not_allowed.
 */
export async function openRun(actor: Actor, { paperId, questionId, round }: Asked): Promise<Run> {
  const act = actOfRound[round]
  if (!act) throw new AppError('bad_input', { round })
  const standing = await gatePaper(db(), actor, act, paperId, questionId)
  const paper = await getPaper(db(), paperId)
  const question = paper?.questions.find((candidate) => candidate.id === questionId)
  if (!paper || !question) throw new AppError('not_found')
  const hidden = round === 'second' || hidesNames(paper, standing)
  const markings = await listMarkingsOfQuestion(db(), questionId, round)
  const held: Held = {
    actor, round, paper, question, owner: standing.owner, hidden, markings, worked: await lastWorkedOn(db(), questionId, round), blind: await blindResponseIds(db(), actor.userId, paperId),
    flags: await listFlagsOfQuestion(db(), questionId), pages: byScript(await listRunPages(db(), questionId)),
  }
  const responses = await inOrder(db(), held, questionId)
  const following = paper.questions.find((other) => other.position > question.position && !other.withdrawn && (standing.marks === 'all' || standing.owner || standing.marks.includes(other.id)))
  const { id, label, text, answer, modelSolution, schemeNote, maximum, points } = question
  return {
    paperId, paperTitle: paper.title, className: [...new Set(responses.map((response) => response.className))].join(', '), round, step: paper.step, namesHidden: hidden,
    question: { id, label, text, answer, modelSolution, schemeNote, maximum, points: points.filter((point) => !point.withdrawn) },
    next: following ? { id: following.id, label: following.label } : null,
    strips: responses.map((response, k) => toStrip(held, response, k + 1)),
  }
}

function byScript(pages: readonly ScriptPage[]): Map<string, ScriptPage[]> {
  const of = new Map<string, ScriptPage[]>()
  for (const page of pages) of.set(page.scriptId, [...(of.get(page.scriptId) ?? []), page])
  return of
}

/** First marks in fair order, a sample in its reading order, agreeing only where two marks were given: an owner's everywhere, a moderator's in their own samples. */
async function inOrder(db: Db, { actor, round, paper, owner, blind, markings }: Held, questionId: string): Promise<RunResponse[]> {
  const all = new Map((await listRunResponses(db, questionId)).map((response) => [response.id, response]))
  const ids = async (): Promise<string[]> => {
    if (round === 'second') return sampleResponseIds(db, actor.userId, questionId)
    if (round === 'agreed') {
      const sampled = owner ? null : await sampledScriptIds(db, actor.userId, paper.id)
      return markings.map((marking) => marking.responseId).filter((id) => !blind.has(id) && (sampled === null || sampled.has(all.get(id)?.scriptId ?? '')))
    }
    return fairOrder([...all.keys()], await runSeed(db, actor.userId, questionId, round))
  }
  return (await ids()).flatMap((id) => all.get(id) ?? [])
}

function toStrip(held: Held, response: RunResponse, number: number): Strip {
  const { actor, round, question, paper, hidden, markings, flags } = held
  const here = markings.filter((marking) => marking.responseId === response.id)
  const mine = here.find((marking) => round === 'agreed' || marking.markerId === actor.userId)
  const other = round === 'first' ? here.find((marking) => marking.markerId !== actor.userId && begun(marking)) : undefined
  // The owner may look at another marker's stamps, unless they are to second-mark the same response blind.
  const shown = other ? (held.owner && !held.blind.has(response.id) ? other : undefined) : mine
  const pages = held.pages.get(response.scriptId) ?? []
  const flag = flags.findLast((candidate) => candidate.responseId === response.id && (round !== 'second' || candidate.raisedBy === actor.userId))
  return {
    responseId: response.id, number, name: hidden ? null : response.studentName, bar: other ? 'begun-by-other' : null,
    rescanned: shown !== undefined && begun(shown) && question.spaces.some((space) => (pages.find((page) => page.paperPage === space.page)?.leaf?.since ?? 0) > (held.worked.get(shown.id) ?? Infinity)),
    pictures: question.spaces.map((space) => stripPicture(held, response.id, space, pages.find((page) => page.paperPage === space.page))),
    pages: pagePictures(pages, paper, hidden),
    marking: shown ? { id: shown.id, state: shown.state, stamps: shown.stamps } : null,
    flag: flag ? { id: flag.id, note: flag.note, answer: flag.answer } : null,
  }
}

function stripPicture({ paper, hidden }: Held, responseId: string, space: Question['spaces'][number], page: ScriptPage | undefined): StripPicture {
  const cut = page ? cutOf(page, space.rect, hidden ? masksOf(paper, space.page) : []) : null
  return { spaceId: space.id, scriptPageId: page?.id ?? null, rect: space.rect, src: cut && `/api/strips/${responseId}/${space.id}?v=${cutKey(cut)}` }
}
