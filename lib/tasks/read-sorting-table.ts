import type { Actor } from '@/lib/core/actor'
import { sayNumberRead, type NumberReading } from '@/lib/core/digit-reading'
import { AppError } from '@/lib/core/errors'
import type { Turn } from '@/lib/core/paper-space'
import type { LeafNeighbour, LeafStub, LooseLeaf, PlaceTarget, SortScript, SortScriptPage, SortStudent, SortingTable } from '@/lib/core/sorting'
import { listClassSetStudents, listSittingClasses, type SittingClass } from '@/db/class-set-students'
import { db } from '@/db/knex'
import { getLeafEvidence, listLeavesOfPaper, listPlacedReasons, type Leaf, type LeafEvidence } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { listScriptPages, listScripts } from '@/db/scripts'
import { getSheaf, listSheaves } from '@/db/sheaves'
import { lastSortingDecision } from '@/db/sorting-decisions'
import { latePlaces, likelyPlaces, mostPlaces } from '@/lib/placing/likely-places'
import { gatePaper } from './gate-paper'
import { readNumbers } from './read-numbers'

/** Loose sheets with what is known of them, names to confirm, and everyone's script: what the sorting table shows. */
export async function readSortingTable(actor: Actor, paperId: string): Promise<SortingTable> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  if (!paper) throw new AppError('not_found')
  const sheaves = await listSheaves(db(), paperId)
  const names = new Map(sheaves.map((sheaf) => [sheaf.id, sheaf.name]))
  const leaves = await listLeavesOfPaper(db(), paperId)
  // Leaves may have come in a sheaf that was sent to another paper.
  for (const id of new Set(leaves.map(({ sheafId }) => sheafId))) if (!names.has(id)) names.set(id, (await getSheaf(db(), id))?.name ?? '')
  const loose = leaves.filter((leaf) => leaf.state === 'loose')
  const evidence = await getLeafEvidence(db(), loose.map(({ id }) => id))
  const classes = await listSittingClasses(db(), paperId)
  const students = await studentsOf(classes)
  const scripts = await scriptsOf(paperId, paper.pages.map(({ page }) => page), leaves)
  const stub = (leaf: Leaf): LeafStub => ({ id: leaf.id, number: leaf.position + 1, half: leaf.half, sheafName: names.get(leaf.sheafId) ?? '', turn: leaf.turn })
  const pile: Pile = { leaves, scripts, students }
  const namePage = paper.boxes.find(({ kind }) => kind === 'name')?.page ?? paper.boxes[0]?.page ?? null
  return {
    paperId, title: paper.title, classes: [...new Set(classes.map(({ className }) => className))], pages: paper.pages, students, scripts,
    namePage, nameBoxes: (['name', 'number'] as const).filter((kind) => paper.boxes.some((box) => box.kind === kind && box.page === namePage)),
    loose: loose.map((leaf) => ({ ...stub(leaf), ...looseOf(leaf, evidence.get(leaf.id) ?? null, pile) })),
    setAside: leaves.filter(({ state }) => state === 'set_aside').map(stub),
    blank: leaves.filter(({ state }) => state === 'blank').map(stub),
    reading: sheaves.filter(({ state }) => state === 'waiting' || state === 'reading').length,
    lastAct: (await lastSortingDecision(db(), paperId, actor.userId))?.act ?? null,
  }
}

type Pile = Readonly<{ leaves: readonly Leaf[]; scripts: readonly SortScript[]; students: readonly SortStudent[] }>

async function studentsOf(classes: readonly SittingClass[]): Promise<SortStudent[]> {
  const listed = await listClassSetStudents(db(), classes.map(({ classSetId }) => classSetId))
  const called = (one: { givenName: string; familyName: string }) => `${one.givenName} ${one.familyName}`
  return listed.map((one) => ({
    ...one, className: classes.find(({ classSetId }) => classSetId === one.classSetId)?.className ?? '',
    sameName: listed.some((other) => other.studentId !== one.studentId && called(other) === called(one)),
  }))
}

async function scriptsOf(paperId: string, paperPages: readonly number[], leaves: readonly Leaf[]): Promise<SortScript[]> {
  const turns = new Map<string, Turn>(leaves.map(({ id, turn }) => [id, turn]))
  const scans = new Map<string, number>()
  for (const { scriptPageId } of leaves) if (scriptPageId) scans.set(scriptPageId, (scans.get(scriptPageId) ?? 0) + 1)
  const reasons = await listPlacedReasons(db(), paperId)
  const pages = new Map<string, SortScriptPage[]>()
  for (const { id, scriptId, paperPage, leafId } of await listScriptPages(db(), paperId)) {
    const older = (scans.get(id) ?? 0) - (leafId === null ? 0 : 1)
    pages.set(scriptId, [...(pages.get(scriptId) ?? []), { id, paperPage, leafId, turn: turns.get(leafId ?? '') ?? 0, reasons: reasons.get(leafId ?? '') ?? [], older }])
  }
  const numbers = await readNumbers(db(), paperId)
  return (await listScripts(db(), paperId)).map((script) => {
    const own = pages.get(script.id) ?? []
    return {
      id: script.id, number: script.position, classSetId: script.classSetId, studentId: script.studentId, suggestedStudentId: script.suggestedStudentId,
      suggestionReason: script.suggestionReason, suggestionCertainty: script.suggestionCertainty, numberRead: sayNumberOf(numbers.get(script.id)), pages: own, missing: paperPages.filter((page) => !own.some(({ paperPage, leafId }) => paperPage === page && leafId !== null)),
    }
  })
}

function sayNumberOf(number: NumberReading | undefined): string | null {
  return number ? sayNumberRead(number) : null
}

function looseOf(leaf: Leaf, evidence: LeafEvidence | null, pile: Pile): Omit<LooseLeaf, keyof LeafStub> {
  const reasons = evidence?.placed?.reasons ?? []
  // What is unlike the paper altogether is no page of it, not even perhaps.
  const guesses = (reasons.includes('unlike_paper') ? [] : (evidence?.reading.guesses ?? [])).map(({ paperPage, confidence }) => ({ paperPage, confidence }))
  const own = pile.leaves.filter(({ sheafId }) => sheafId === leaf.sheafId)
  const at = own.findIndex(({ id }) => id === leaf.id)
  const paperPage = leaf.paperPage ?? guesses[0]?.paperPage ?? null
  const late = latePlaces(evidence?.placed?.candidates ?? [], paperPage, reasons.includes('re_scan_unsure'), pile.scripts)
  const near = likelyPlaces({ position: at, paperPage, secondScan: reasons.includes('duplicate_page') }, piled(own, pile.scripts), withoutScript(pile))
  return {
    width: evidence?.reading.part?.w ?? leaf.width, height: evidence?.reading.part?.h ?? leaf.height, paperPage: leaf.paperPage, guesses, reasons, missing: evidence?.placed?.missing ?? [], problem: evidence?.reading.problem ?? null,
    before: neighbour(own[at - 1], pile), after: neighbour(own[at + 1], pile),
    places: reasons.includes('unlike_paper') ? [] : (reasons.length > 1 ? [...near, ...late] : [...late, ...near]).slice(0, mostPlaces),
  }
}

function neighbour(leaf: Leaf | undefined, { scripts }: Pile): LeafNeighbour | null {
  if (!leaf) return null
  const script = scripts.find(({ pages }) => pages.some(({ id }) => id === leaf.scriptPageId))
  return { number: leaf.position + 1, half: leaf.half, state: leaf.state, paperPage: leaf.paperPage, scriptId: script?.id ?? null }
}

function piled(own: readonly Leaf[], scripts: readonly SortScript[]) {
  const positions = new Map(own.map((leaf, at) => [leaf.id, at]))
  return scripts.map(({ id, pages }) => ({ id, pages: pages.map(({ paperPage, leafId }) => ({ paperPage, position: positions.get(leafId ?? '') ?? null })) }))
}

/** Who has no script at all, not even a likely one. Those expected come first. */
function withoutScript({ students, scripts }: Pile): PlaceTarget[] {
  const likely = new Set(scripts.flatMap(({ suggestedStudentId }) => suggestedStudentId ?? []))
  const free = students.filter(({ scriptId, studentId }) => scriptId === null && !likely.has(studentId))
  return free.toSorted((a, b) => Number(a.attendance !== 'expected') - Number(b.attendance !== 'expected')).map(({ classSetId, studentId }) => ({ classSetId, studentId }))
}
