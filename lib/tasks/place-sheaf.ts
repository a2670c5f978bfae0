import { newId } from '@/lib/core/ids'
import type { LeafFinding, LeafReading, PageGuess } from '@/lib/core/leaf'
import { addAuditLine } from '@/db/audit'
import type { Db } from '@/db/knex'
import { getLeaf, getLeafEvidence, listLeavesOfSheaf, listLeavesWithEvidence, moveLeaf, setLeafPaper, type Leaf } from '@/db/leaves'
import { addScript, addScriptPage, findScriptPage, nextScriptPosition, setCurrentLeaf } from '@/db/scripts'
import { ensureResponses } from '@/db/responses'
import { endSheaf, listSheafClassSets, type Sheaf } from '@/db/sheaves'
import type { LateVerdict } from '@/lib/placing/join-late'
import { placePapers } from '@/lib/placing/place-papers'
import { codedScript } from './coded-script'
import { findLate } from './find-late'
import { askToPrune } from './prune-cuts'
import { renewInk } from './renew-ink'
import { renewSuggestions } from './renew-suggestions'

type Found = Readonly<{ leaf: Leaf; reading: LeafReading; finding: LeafFinding; /** Where it goes when scripts were there before its sheaf. */ late?: LateVerdict | undefined }>

/** Another paper whose scripts may lie in a sheaf, and how many pages it has. */
export type OtherPaper = Readonly<{ paperId: string; pages: number }>

/**
 * Puts the leaves of a sheaf that is read into scripts, all in the caller's transaction. What is not certain becomes a loose
 * sheet, an empty page stays as a blank one; names are suggested, given only where they were printed on the pages. A page that comes
 * later than its script joins it, in place of an older scan too, and stamps stay where they are on the page. What was placed while the
 * sheaf was still being read, and what a person decided since, stays as it is.
 */
export async function placeSheaf(trx: Db, sheaf: Sheaf, pages: number, others: readonly OtherPaper[] = []): Promise<void> {
  const leaves = await listLeavesWithEvidence(trx, sheaf.id)
  const findings = placePapers(leaves.map(({ evidence }) => evidence.reading), [pages, ...others.map((other) => other.pages)])
  const found = leaves.map(({ leaf, evidence }, k) => ({ leaf, reading: evidence.reading, finding: findings[k]! }))
  for (const [paper, paperId] of [sheaf.paperId, ...others.map((other) => other.paperId)].entries()) await placeOfPaper(trx, { ...sheaf, paperId }, paper, found)
  await endSheaf(trx, sheaf.id, { state: 'placed' })
  const count = (kind: LeafFinding['kind']) => findings.filter((finding) => finding.kind === kind).length
  const scripts = new Set(findings.flatMap(({ script }) => script ?? [])).size
  const to = `scripts ${scripts}, placed ${count('script')}, loose ${count('loose')}, blank ${count('blank')}`
  await addAuditLine(trx, null, { act: 'sheaf.placed', objectKind: 'sheaf', objectId: sheaf.id, paperId: sheaf.paperId, to })
}

/** Puts those leaves of a sheaf in place that are of one of its papers (from 0; 0 is the paper it was sent to). From then on they are that paper's alone. */
async function placeOfPaper(trx: Db, sheaf: Sheaf, paper: number, all: readonly Found[]): Promise<void> {
  const own = all.filter(({ finding }) => (finding.paper ?? 0) === paper).map(({ leaf, reading, finding }): Found => ({ leaf, reading: { ...reading, guesses: ofPaper(reading.guesses, paper) }, finding: { ...finding, guesses: ofPaper(finding.guesses, paper) } }))
  if (paper > 0) for (const { leaf } of own) await setLeafPaper(trx, leaf.id, sheaf.paperId)
  const late = await findLate(trx, sheaf, own)
  await putFound(trx, sheaf, own.map((one, k) => ({ ...one, late: late.get(k) })))
  if ([...late.values()].some(({ kind }) => kind === 'join')) await askToPrune(trx, sheaf.paperId)
}

function ofPaper(guesses: readonly PageGuess[], paper: number): PageGuess[] {
  return guesses.filter((guess) => (guess.paper ?? 0) === paper).map(({ paperPage, rotation, homography, confidence }) => ({ paperPage, rotation, homography, confidence }))
}

/** Puts whole scripts at the start of a sheaf in place while the rest is being read, so that they can be marked. Put in place twice it is done once. */
export async function placeFirst(trx: Db, sheaf: Sheaf, readings: readonly LeafReading[], findings: readonly LeafFinding[]): Promise<void> {
  const leaves = await listLeavesOfSheaf(trx, sheaf.id)
  const same = (one: { half?: 0 | 1 }, leaf: Leaf): boolean => (one.half ?? null) === leaf.half
  const found = findings.flatMap((finding): Found[] => {
    const leaf = leaves.find((one) => one.position === finding.index && same(finding, one))
    const reading = readings.find((one) => one.index === finding.index && one.half === finding.half)
    return leaf && reading ? [{ leaf, reading, finding }] : []
  })
  // What may belong to an earlier script waits for the end, when the whole sheaf is known.
  const late = await findLate(trx, sheaf, found)
  await putFound(trx, sheaf, found.filter((_, k) => !late.has(k)))
}

async function putFound(trx: Db, sheaf: Sheaf, found: readonly Found[]): Promise<void> {
  const classSetId = (await listSheafClassSets(trx, sheaf.id, sheaf.paperId))[0]!
  // A script of which a leaf lies in place already is there, whole: nothing is added to it by itself.
  const there = new Set(found.flatMap(({ leaf, finding }) => (leaf.state === 'read' ? [] : (finding.script ?? []))))
  const scriptIds = new Map<number, string>()
  for (const { leaf, reading, finding, late } of found) {
    if (leaf.state !== 'read') continue
    if (finding.printed !== undefined) await putByCode(trx, sheaf.paperId, { leaf, reading, finding })
    else if (late?.kind === 'join') await join(trx, late, leaf, reading, finding)
    else if (late) await lay(trx, leaf, reading, { ...finding, kind: 'loose', script: null, homography: null, reasons: [...(finding.kind === 'loose' ? finding.reasons : []), late.reason], candidates: late.candidates.slice(0, 40) })
    else if (finding.kind !== 'script') await lay(trx, leaf, reading, finding)
    else if (there.has(finding.script!)) await lay(trx, leaf, reading, { ...finding, kind: 'loose', script: null, homography: null, reasons: ['order_unclear'] })
    else {
      if (!scriptIds.has(finding.script!)) scriptIds.set(finding.script!, await startScript(trx, sheaf.paperId, classSetId))
      await putIn(trx, scriptIds.get(finding.script!)!, leaf, reading, finding)
    }
  }
  await ensureResponses(trx, sheaf.paperId)
  const placed = new Set(found.map(({ leaf }) => leaf.id))
  await renewInk(trx, sheaf.paperId, ({ leafId }) => leafId !== null && placed.has(leafId))
  await renewSuggestions(trx, sheaf.paperId)
}

/**
 * Puts a leaf where its code says, also into a script that is there since an earlier sheaf. The very sheet that lies there scanned anew takes
 * the old scan's place; any other sheet for that page is a person's to decide.
 */
async function putByCode(trx: Db, paperId: string, { leaf, reading, finding }: Found): Promise<void> {
  const loose: LeafFinding = { ...finding, kind: 'loose', script: null, homography: null }
  const scriptId = await codedScript(trx, paperId, finding.printed!)
  if (scriptId === null) return lay(trx, leaf, reading, { ...loose, reasons: ['code_unknown'] })
  const there = await findScriptPage(trx, scriptId, finding.paperPage!)
  if (!there?.leafId) return putIn(trx, scriptId, leaf, reading, finding, there?.id)
  const before = await getLeaf(trx, there.leafId)
  const sameSheet = (await getLeafEvidence(trx, [there.leafId])).get(there.leafId)?.reading.code?.token === reading.code?.token
  if (sameSheet && before?.sheafId !== leaf.sheafId) return join(trx, { kind: 'join', scriptId, reason: 're_scan' }, leaf, reading, finding)
  await lay(trx, leaf, reading, { ...loose, reasons: ['duplicate_page'], candidates: [scriptId] })
}

async function startScript(trx: Db, paperId: string, classSetId: string): Promise<string> {
  const id = newId()
  const position = await nextScriptPosition(trx, paperId)
  await addScript(trx, { id, classSetId, position, studentId: null, suggestedStudentId: null, suggestionReason: null, suggestionCertainty: null, confirmedBy: null, confirmedAt: null })
  return id
}

async function putIn(trx: Db, scriptId: string, leaf: Leaf, reading: LeafReading, finding: LeafFinding, pageId?: string): Promise<void> {
  const id = pageId ?? newId()
  const paperPage = finding.paperPage!
  if (pageId) await setCurrentLeaf(trx, pageId, leaf.id)
  else await addScriptPage(trx, { id, scriptId, paperPage, extra: false, position: paperPage, leafId: leaf.id })
  await moveLeaf(trx, leaf.id, {
    state: 'placed', turn: finding.rotation, homography: finding.homography, paperPage, scriptPageId: id, confidence: finding.confidence, evidence: { reading, placed: finding },
  })
}

/** Puts a leaf into a script that was there before its sheaf. A scan that lies there is kept as the older one. */
async function join(trx: Db, { scriptId, reason }: Extract<LateVerdict, { kind: 'join' }>, leaf: Leaf, reading: LeafReading, finding: LeafFinding): Promise<void> {
  const { paperPage, rotation, homography, confidence } = reading.guesses[0]!
  const there = await findScriptPage(trx, scriptId, paperPage)
  const id = there?.id ?? newId()
  if (there) await setCurrentLeaf(trx, id, leaf.id)
  else await addScriptPage(trx, { id, scriptId, paperPage, extra: false, position: paperPage, leafId: leaf.id })
  const placed: LeafFinding = { ...finding, kind: 'script', script: null, paperPage, rotation, homography, confidence, reasons: [reason], missing: [] }
  await moveLeaf(trx, leaf.id, { state: 'placed', turn: rotation, homography, paperPage, scriptPageId: id, confidence, evidence: { reading, placed } })
  await addAuditLine(trx, null, { act: reason === 're_scan' ? 'leaf.scanned-again' : 'leaf.joined', objectKind: 'leaf', objectId: leaf.id, to: `script ${scriptId} page ${paperPage}` })
}

/** Lays a leaf on the sorting table, or among the empty backs. */
async function lay(trx: Db, leaf: Leaf, reading: LeafReading, finding: LeafFinding): Promise<void> {
  const paperPage = reading.clear ? (reading.guesses[0]?.paperPage ?? null) : null
  await moveLeaf(trx, leaf.id, {
    state: finding.kind === 'blank' ? 'blank' : 'loose', turn: finding.rotation, homography: null, paperPage, confidence: finding.confidence, evidence: { reading, placed: finding },
  })
}
