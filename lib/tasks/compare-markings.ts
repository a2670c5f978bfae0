import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { kept, markOf, type Marking } from '@/lib/core/marking'
import type { ComparedMarking, Comparison } from '@/lib/core/second-marking'
import { cutKey } from '@/lib/cutting/cut-key'
import { withinTolerance } from '@/lib/second-marking/agreement'
import { sampleView, standsOf } from '@/lib/second-marking/sample-view'
import { getClassSet } from '@/db/class-sets'
import { getCountingDecision } from '@/db/counting-decisions'
import { db } from '@/db/knex'
import { getResponse, listScriptPages } from '@/db/runs'
import { listSampledAnswers } from '@/db/sampled-answers'
import { listSampleScripts } from '@/db/samples'
import { shortName } from '@/db/short-name'
import { comparedMarkings } from './compared-markings'
import { gateResponse, type GatedResponse } from './gate-response'
import { cutOf, hidesNames, masksOf } from './pictures-of-script'

async function seen(marking: Marking): Promise<ComparedMarking> {
  return { markingId: marking.id, marker: await shortName(db(), marking.markerId), mark: markOf(marking.stamps), stamps: kept(marking.stamps) }
}

async function picturesOf({ paper, question, scriptId, standing, responseId }: GatedResponse): Promise<Comparison['pictures']> {
  const pages = await listScriptPages(db(), scriptId)
  return question.spaces.map(({ id, page: onPage, rect }) => {
    const page = pages.find(({ paperPage }) => paperPage === onPage)
    const cut = page ? cutOf(page, rect, hidesNames(paper, standing) ? masksOf(paper, onPage) : []) : null
    return { spaceId: id, scriptPageId: page?.id ?? null, rect, src: cut && `/api/strips/${responseId}/${id}?v=${cutKey(cut)}` }
  })
}

/**
 * The first and second marking of an answer side by side, for an owner or the moderator of its sample. Throws marking_unsettled before
 * the second marking is settled, and what the gate says: a moderator sees nothing of the first mark until then.
 */
export async function compareMarkings(actor: Actor, responseId: string): Promise<Comparison> {
  const gated = await gateResponse(db(), actor, 'agreed', responseId)
  const { paper, question, scriptId } = gated
  const { first, second, agreed, sample } = await comparedMarkings(db(), actor, gated)
  const response = await getResponse(db(), responseId)
  const set = response && (await getClassSet(db(), response.classSetId))
  if (!set) throw new AppError('not_found')
  const tolerance = question.tolerance ?? sample.tolerance
  const scripts = (await listSampleScripts(db(), paper.id)).filter(({ sampleId }) => sampleId === sample.id)
  const answers = (await listSampledAnswers(db(), paper.id)).filter((one) => one.sampleId === sample.id && one.questionId === question.id)
  const view = sampleView({ answers, scripts, columns: [{ id: question.id, label: question.label, maximum: question.maximum, tolerance }], owner: false })
  const order = view.questions[0]?.compared.map((one) => one.responseId) ?? []
  const at = order.indexOf(responseId)
  const decision = await getCountingDecision(db(), responseId)
  const stands = decision && standsOf(decision.round, decision.reason)
  return {
    paperId: paper.id, paperTitle: paper.title, className: set.className, responseId, tolerance,
    question: { id: question.id, label: question.label, text: question.text, maximum: question.maximum },
    scriptNumber: scripts.find((one) => one.scriptId === scriptId)?.number ?? 0,
    pictures: await picturesOf(gated), first: await seen(first), second: await seen(second),
    agreed: agreed && { ...(await seen(agreed)), settled: agreed.state === 'settled' },
    within: withinTolerance({ first: markOf(first.stamps), second: markOf(second.stamps), tolerance }),
    decided: decision && stands ? { stands, reason: decision.reason, by: decision.decidedBy ? await shortName(db(), decision.decidedBy) : '', at: decision.decidedAt } : null,
    figures: view.figures, before: order[at - 1] ?? null, after: order[at + 1] ?? null,
  }
}
