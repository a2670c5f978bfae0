import type { LeafFinding, LeafReading, LeafReason } from '@/lib/core/leaf'
import type { Homography, Turn } from '@/lib/core/paper-space'
import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

export type LeafState = 'read' | 'placed' | 'loose' | 'blank' | 'set_aside'
export type LeafGlance = 'clear' | 'unclear' | 'empty' | 'unreadable'

type LeafRow = {
  id: string; sheaf_id: string; position: number; half: 0 | 1 | null; state: LeafState; glance: LeafGlance; read_at: number; width: number | null; height: number | null; turn: Turn
  homography: string | null; paper_page: number | null; confidence: number | null; problem: string | null; finding: string; script_page_id: string | null
  decided_by: string | null; decided_at: number | null
}

/** A scanned page where it stands now. `position` counts from 0 in its sheaf; sizes are pixels of the stored image. */
export type Leaf = Readonly<{
  id: string; sheafId: string; position: number; half: 0 | 1 | null; state: LeafState; glance: LeafGlance; readAt: number; width: number | null; height: number | null; turn: Turn
  homography: Homography | null; paperPage: number | null; confidence: number | null; problem: string | null; scriptPageId: string | null
  decidedBy: string | null; decidedAt: number | null
}>
/** What the engine saw on a leaf, and where it put it once its neighbours were known. */
export type LeafEvidence = Readonly<{ reading: LeafReading; placed: LeafFinding | null }>

const nothingSeen = { guesses: [], image: null, empty: false, clear: false, ink: null } as const
/** A finding that is not there (a leaf made by hand) is one that shows nothing. */
function toEvidence(row: Pick<LeafRow, 'finding' | 'position'>): LeafEvidence {
  const { reading, placed } = JSON.parse(row.finding) as Partial<LeafEvidence>
  return { reading: reading ?? { index: row.position, ...nothingSeen }, placed: placed ?? null }
}

const light = ['id', 'sheaf_id', 'position', 'half', 'state', 'glance', 'read_at', 'width', 'height', 'turn', 'homography', 'paper_page', 'confidence', 'problem', 'script_page_id', 'decided_by', 'decided_at']
  .map((column) => `leaves.${column}`)

/** A leaf is of its sheaf's paper unless it was found to be of another. */
const paperOfLeaf = 'coalesce(leaves.paper_id, sheaves.paper_id)'

function toLeaf(row: LeafRow): Leaf {
  return {
    id: row.id, sheafId: row.sheaf_id, position: row.position, half: row.half, state: row.state, glance: row.glance, readAt: row.read_at, width: row.width, height: row.height, turn: row.turn,
    homography: row.homography ? (JSON.parse(row.homography) as Homography) : null, paperPage: row.paper_page, confidence: row.confidence, problem: row.problem,
    scriptPageId: row.script_page_id, decidedBy: row.decided_by, decidedAt: row.decided_at,
  }
}

function glanceOf(reading: LeafReading): LeafGlance {
  if (reading.problem) return 'unreadable'
  if (reading.empty) return 'empty'
  return reading.clear ? 'clear' : 'unclear'
}

/** Keeps what one leaf showed. Read twice it stays one row: the first finding holds. */
export async function addLeafReading(db: Db, sheafId: string, reading: LeafReading): Promise<void> {
  const best = reading.guesses[0]
  await db('leaves').insert({
    id: newId(), sheaf_id: sheafId, position: reading.index, half: reading.half ?? null, state: 'read', glance: glanceOf(reading), read_at: Date.now(),
    width: reading.image?.width ?? null, height: reading.image?.height ?? null, turn: best?.rotation ?? reading.image?.shownTurn ?? 0,
    paper_page: reading.clear ? (best?.paperPage ?? null) : null, confidence: best?.confidence ?? null, problem: reading.problem ?? null,
    finding: JSON.stringify({ reading, placed: null } satisfies LeafEvidence),
  }).onConflict().ignore()
}

/** The leaves of a sheaf in order, each with what the engine saw. */
export async function listLeavesWithEvidence(db: Db, sheafId: string): Promise<{ leaf: Leaf; evidence: LeafEvidence }[]> {
  const rows = await db<LeafRow>('leaves').where({ sheaf_id: sheafId }).orderBy(['position', 'half'])
  return rows.map((row) => ({ leaf: toLeaf(row), evidence: toEvidence(row) }))
}

/** The leaves of a sheaf in order, without the engine's findings. */
export async function listLeavesOfSheaf(db: Db, sheafId: string): Promise<Leaf[]> {
  return ((await db('leaves').where({ sheaf_id: sheafId }).orderBy(['position', 'half']).select(light)) as LeafRow[]).map(toLeaf)
}

/** Every leaf of a paper in order of sheaf and position, without the engine's findings. */
export async function listLeavesOfPaper(db: Db, paperId: string): Promise<Leaf[]> {
  const rows = (await db('leaves').join('sheaves', 'sheaves.id', 'leaves.sheaf_id').whereRaw(`${paperOfLeaf} = ?`, [paperId])
    .orderBy(['sheaves.created_at', 'leaves.sheaf_id', 'leaves.position', 'leaves.half']).select(light)) as LeafRow[]
  return rows.map(toLeaf)
}

export async function getLeaf(db: Db, id: string): Promise<(Leaf & { paperId: string }) | null> {
  const row = (await db('leaves').join('sheaves', 'sheaves.id', 'leaves.sheaf_id').where('leaves.id', id).select([...light, db.raw(`${paperOfLeaf} as paper_id`)]).first()) as (LeafRow & { paper_id: string }) | undefined
  return row ? { ...toLeaf(row), paperId: row.paper_id } : null
}

/** What the engine saw, leaf by leaf. */
export async function getLeafEvidence(db: Db, leafIds: readonly string[]): Promise<Map<string, LeafEvidence>> {
  const found = new Map<string, LeafEvidence>()
  for (let from = 0; from < leafIds.length; from += 400) {
    const rows = await db<LeafRow>('leaves').whereIn('id', leafIds.slice(from, from + 400)).select('id', 'position', 'finding')
    for (const row of rows) found.set(row.id, toEvidence(row))
  }
  return found
}

/** What the engine said of the placed leaves of a paper, where it said anything. */
export async function listPlacedReasons(db: Db, paperId: string): Promise<Map<string, LeafReason[]>> {
  const reasons = "json_extract(leaves.finding, '$.placed.reasons')"
  const rows = (await db('leaves').join('sheaves', 'sheaves.id', 'leaves.sheaf_id').where({ 'leaves.state': 'placed' }).whereRaw(`${paperOfLeaf} = ?`, [paperId]).whereRaw(`${reasons} <> '[]'`)
    .select({ id: 'leaves.id', reasons: db.raw(reasons) })) as { id: string; reasons: string }[]
  return new Map(rows.map(({ id, reasons: said }) => [id, JSON.parse(said) as LeafReason[]]))
}

/** What was seen written on a leaf's likeliest page: the number in its boxes, where strokes are, and how the page was found to lie. */
export type SeenWriting<T> = Readonly<{ paperPage: number; homography: Homography; seen: T }>

/** One part of what was seen written on leaves, by leaf: only that part is taken out of the findings. Leaves without it are left out. */
export async function getSeenWriting<K extends 'number' | 'strokes'>(db: Db, leafIds: readonly string[], part: K): Promise<Map<string, SeenWriting<NonNullable<LeafReading[K]>>>> {
  const found = new Map<string, SeenWriting<NonNullable<LeafReading[K]>>>()
  for (let from = 0; from < leafIds.length; from += 400) {
    const rows = (await db<LeafRow>('leaves').whereIn('id', leafIds.slice(from, from + 400))
      .select('id', db.raw(`json_extract(finding, '$.reading.${part}') as seen`), db.raw(`json_extract(finding, '$.reading.guesses[0]') as best`))) as unknown as { id: string; seen: string | null; best: string | null }[]
    for (const { id, seen, best } of rows) {
      if (!seen || !best) continue
      const { paperPage, homography } = JSON.parse(best) as LeafReading['guesses'][number]
      found.set(id, { paperPage, homography, seen: JSON.parse(seen) as NonNullable<LeafReading[K]> })
    }
  }
  return found
}

export type LeafPlace = Pick<Leaf, 'state' | 'turn' | 'homography' | 'paperPage' | 'scriptPageId' | 'decidedBy' | 'decidedAt'>

/** Puts a leaf somewhere else. What is not named stays. */
export async function moveLeaf(db: Db, id: string, to: Partial<LeafPlace & { confidence: number | null; evidence: LeafEvidence }>): Promise<void> {
  const change: Partial<LeafRow> = {}
  if (to.state !== undefined) change.state = to.state
  if (to.turn !== undefined) change.turn = to.turn
  if (to.homography !== undefined) change.homography = to.homography ? JSON.stringify(to.homography) : null
  if (to.paperPage !== undefined) change.paper_page = to.paperPage
  if (to.scriptPageId !== undefined) change.script_page_id = to.scriptPageId
  if (to.decidedBy !== undefined) change.decided_by = to.decidedBy
  if (to.decidedAt !== undefined) change.decided_at = to.decidedAt
  if (to.confidence !== undefined) change.confidence = to.confidence
  if (to.evidence !== undefined) change.finding = JSON.stringify(to.evidence)
  await db<LeafRow>('leaves').where({ id }).update(change)
}

/** Says that a leaf is of another paper than the one its sheaf was sent to. */
export async function setLeafPaper(db: Db, id: string, paperId: string): Promise<void> {
  await db('leaves').where({ id }).update({ paper_id: paperId })
}

/** The newest other leaf of a script page: the scan that held before a later one took its place. */
export async function findOlderLeaf(db: Db, scriptPageId: string, besides: string): Promise<Leaf | null> {
  const row = await db<LeafRow>('leaves').where({ script_page_id: scriptPageId, state: 'placed' }).whereNot({ id: besides }).orderByRaw('max(read_at, coalesce(decided_at, 0)) desc').first()
  return row ? toLeaf(row) : null
}
