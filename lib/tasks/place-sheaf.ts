import { newId } from '@/lib/core/ids'
import type { LeafFinding } from '@/lib/core/leaf'
import { addAuditLine } from '@/db/audit'
import type { Db } from '@/db/knex'
import { listLeavesWithEvidence, moveLeaf, type Leaf, type LeafEvidence } from '@/db/leaves'
import { addScript, addScriptPage, nextScriptPosition } from '@/db/scripts'
import { ensureResponses } from '@/db/responses'
import { endSheaf, listSheafClassSets, type Sheaf } from '@/db/sheaves'
import { placeLeaves } from '@/lib/placing/place-leaves'
import { renewSuggestions } from './renew-suggestions'

/**
 * Puts the leaves of a sheaf that is read into scripts, all in the caller's transaction. What is not certain becomes a loose
 * sheet, an empty page stays as a blank one; names are suggested, never given.
 */
export async function placeSheaf(trx: Db, sheaf: Sheaf, pages: number): Promise<void> {
  const leaves = await listLeavesWithEvidence(trx, sheaf.id)
  const findings = placeLeaves(leaves.map(({ evidence }) => evidence.reading), pages)
  const classSetId = (await listSheafClassSets(trx, sheaf.id))[0]!
  const first = await nextScriptPosition(trx, sheaf.paperId)
  const scriptIds = new Map<number, string>()
  for (const [k, { leaf, evidence }] of leaves.entries()) {
    const finding = findings[k]!
    if (finding.kind !== 'script') {
      await lay(trx, leaf, evidence, finding)
      continue
    }
    const running = finding.script!
    if (!scriptIds.has(running)) scriptIds.set(running, await startScript(trx, classSetId, first + running - 1))
    await putIn(trx, scriptIds.get(running)!, leaf, evidence, finding)
  }
  await ensureResponses(trx, sheaf.paperId)
  await renewSuggestions(trx, sheaf.paperId)
  await endSheaf(trx, sheaf.id, { state: 'placed' })
  const count = (kind: LeafFinding['kind']) => findings.filter((finding) => finding.kind === kind).length
  const to = `scripts ${scriptIds.size}, placed ${count('script')}, loose ${count('loose')}, blank ${count('blank')}`
  await addAuditLine(trx, null, { act: 'sheaf.placed', objectKind: 'sheaf', objectId: sheaf.id, paperId: sheaf.paperId, to })
}

async function startScript(trx: Db, classSetId: string, position: number): Promise<string> {
  const id = newId()
  await addScript(trx, { id, classSetId, position, studentId: null, suggestedStudentId: null, suggestionReason: null, confirmedBy: null, confirmedAt: null })
  return id
}

async function putIn(trx: Db, scriptId: string, leaf: Leaf, { reading }: LeafEvidence, finding: LeafFinding): Promise<void> {
  const id = newId()
  const paperPage = finding.paperPage!
  await addScriptPage(trx, { id, scriptId, paperPage, extra: false, position: paperPage, leafId: leaf.id })
  await moveLeaf(trx, leaf.id, {
    state: 'placed', turn: finding.rotation, homography: finding.homography, paperPage, scriptPageId: id, confidence: finding.confidence, evidence: { reading, placed: finding },
  })
}

/** Lays a leaf on the sorting table, or among the empty backs. */
async function lay(trx: Db, leaf: Leaf, { reading }: LeafEvidence, finding: LeafFinding): Promise<void> {
  const paperPage = reading.clear ? (reading.guesses[0]?.paperPage ?? null) : null
  await moveLeaf(trx, leaf.id, {
    state: finding.kind === 'blank' ? 'blank' : 'loose', turn: finding.rotation, homography: null, paperPage, confidence: finding.confidence, evidence: { reading, placed: finding },
  })
}
