import { mayOnPaper, type Actor, type PaperStanding } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { placeOfScript } from '@/db/runs'
import { blindResponseIds } from '@/db/samples'
import { listSignedStamps, type SignedStamp } from '@/db/scripts-to-return'
import { now } from '@/lib/infra/clock'
import type { Signing } from '@/lib/handing-back/add-annotations'
import { pageToReturn } from '@/lib/handing-back/page-marks'
import { buildReturnedScript } from '@/lib/handing-back/returned-script'
import { scriptResult, summaryOf } from '@/lib/handing-back/script-result'
import type { GatheredScript } from '@/lib/handing-back/script-to-return'
import { coverNames } from './cover-names'
import { gateScript } from './gate-script'
import { gatherClassSet, gatheredScript, type GatheredSet } from './gather-class-set'
import { hidesNames } from './pictures-of-script'
import { SheavesAtHand } from './sheaves-at-hand'

/**
 * A script with its settled marking as annotations that other programs list, for staff: an owner gets the summary and all marks, a
 * marker the marks of their questions, a moderator those of their sample that are not to be marked blind. Where names are hidden from
 * the reader the pages are pictures with the names covered. Throws not_found, not_allowed, page_shared, page_unreadable or sheaf_missing.
 */
export async function openAnnotatedScript(actor: Actor, scriptId: string): Promise<{ bytes: Uint8Array; name: string }> {
  const place = await placeOfScript(db(), scriptId)
  const paper = place && (await getPaper(db(), place.paperId))
  if (!place || !paper) throw new AppError('not_found')
  const standing = await gateScript(db(), actor, { paperId: paper.id, scriptId })
  const gathered = await gatherClassSet(db(), place.classSetId)
  const whole = mayOnPaper(actor, 'change', standing)
  const signed = await listSignedStamps(db(), scriptId)
  const seen = whole ? signed : await seenBy(actor, standing, paper.id, signed)
  const script = withOnly(nameless(gathered, scriptId), new Set(whole ? paper.questions.map(({ id }) => id) : seen.map(({ questionId }) => questionId)))
  const bytes = hidesNames(paper, standing) && !whole ? await covered(scriptId, script, seen) : await open(script, whole, seen)
  await addAuditLine(db(), actor, { act: 'script.annotated-copy', objectKind: 'script', objectId: scriptId, paperId: paper.id })
  return { bytes, name: `${paper.title}, ${whole ? `${script.givenName} ${script.familyName}` : `script ${numberOf(gathered, scriptId)}`}, annotated.pdf` }
}

const numberOf = (gathered: GatheredSet, scriptId: string): number => gathered.scripts.find((one) => one.scriptId === scriptId)!.position + 1

/** A script whose name is open goes by its number. */
function nameless(gathered: GatheredSet, scriptId: string): GatheredScript {
  return gatheredScript(gathered, scriptId, { givenName: 'Script', familyName: String(numberOf(gathered, scriptId)), candidateNumber: '' })
}

async function seenBy(actor: Actor, standing: PaperStanding, paperId: string, signed: readonly SignedStamp[]): Promise<SignedStamp[]> {
  const blind = await blindResponseIds(db(), actor.userId, paperId)
  return signed.filter(({ responseId, questionId }) => !blind.has(responseId) && (standing.moderates || mayOnPaper(actor, 'mark', standing, questionId)))
}

function withOnly(script: GatheredScript, questionIds: ReadonlySet<string>): GatheredScript {
  return { ...script, answers: script.answers.filter(({ questionId }) => questionIds.has(questionId)) }
}

function signingOf({ answers, paper }: GatheredScript, signed: readonly SignedStamp[]): Signing {
  const byStamp = new Map(signed.map((one) => [one.stampId, one]))
  const byLabel = new Map(paper.questions.map(({ id, label }) => [label, { marker: answers.find(({ questionId }) => questionId === id)?.marking?.marker, settledAt: signed.find(({ questionId }) => questionId === id)?.settledAt }]))
  const last = Math.max(0, ...signed.map(({ settledAt }) => settledAt))
  return ({ id, label }) => {
    const of = label === null ? undefined : byLabel.get(label)
    return { author: of?.marker ?? 'Sheafmark', at: new Date(byStamp.get(id)?.savedAt ?? of?.settledAt ?? last) }
  }
}

async function open(script: GatheredScript, whole: boolean, signed: readonly SignedStamp[]): Promise<Uint8Array> {
  const result = whole ? scriptResult(script) : null
  const pages = result?.pages ?? script.pages.map((page, k) => pageToReturn(script, page, k + 1, false))
  const at = new Date(now())
  const summary = result && { ...summaryOf(script, result, { day: at.toISOString().slice(0, 10), revision: 1 }), about: result.markers.length > 0 ? `copy for staff, marked by ${result.markers.join(' and ')}` : 'copy for staff' }
  const sheaves = new SheavesAtHand()
  try {
    const { sheaves: sources, says, ...ready } = await sheaves.fetch(pages)
    return await buildReturnedScript(sources, { summary: summary && { ...summary, copies: says }, title: script.paper.title, pages: ready.pages, builtAt: at, signing: signingOf(script, signed) })
  } finally {
    sheaves.close()
  }
}

async function covered(scriptId: string, script: GatheredScript, signed: readonly SignedStamp[]): Promise<Uint8Array> {
  const { pages, sheaf } = await coverNames(db(), scriptId, script)
  return buildReturnedScript(new Map([['covered', sheaf]]), { summary: null, title: script.paper.title, pages, builtAt: new Date(now()), signing: signingOf(script, signed) })
}
