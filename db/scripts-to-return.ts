import type { ImagePart } from '@/lib/core/leaf'
import { compose, type Homography } from '@/lib/core/paper-space'
import type { Round, Stamp } from '@/lib/core/stamp'
import type { Db } from './knex'
import { listStamps } from './stamps'

/** A page of a script as the sheaf holds it. Sizes in pixels of the stored image (of the page's own `part` of one that shows two); no homography for a page that was never registered. */
export type PageToReturn = Readonly<{
  id: string; scriptId: string; paperPage: number | null
  leaf: Readonly<{ sheafId: string; position: number; half: 0 | 1 | null; part?: ImagePart | null; width: number; height: number; homography: Homography | null }> | null
}>
type PageRow = {
  id: string; script_id: string; paper_page: number | null; sheaf_id: string | null; position: number | null; half: 0 | 1 | null; width: number | null; height: number | null; homography: string | null; part: string | null
}

/** The pages of every script of a class set, in order within each. */
export async function listPagesToReturn(db: Db, classSetId: string): Promise<PageToReturn[]> {
  const rows = (await db('script_pages').join('scripts', 'scripts.id', 'script_pages.script_id').leftJoin('leaves', 'leaves.id', 'script_pages.leaf_id')
    .where('scripts.class_set_id', classSetId).orderBy(['script_pages.script_id', 'script_pages.position'])
    .select('script_pages.id', 'script_pages.script_id', 'script_pages.paper_page', 'leaves.sheaf_id', { position: 'leaves.position' }, 'leaves.half', 'leaves.width', 'leaves.height', 'leaves.homography',
      db.raw(`case when leaves.half is not null then json_extract(leaves.finding, '$.reading.part') end as part`))) as PageRow[]
  return rows.map((row) => ({
    id: row.id, scriptId: row.script_id, paperPage: row.paper_page,
    leaf: row.sheaf_id === null || row.width === null || row.height === null ? null : ownPart({
      sheafId: row.sheaf_id, position: row.position!, half: row.half, width: row.width, height: row.height,
      homography: row.homography === null ? null : (JSON.parse(row.homography) as Homography),
    }, row.part === null ? null : (JSON.parse(row.part) as ImagePart)),
  }))
}

/** A leaf that is a part of an image of two pages, spoken of as if that part were all. */
function ownPart<Leaf extends NonNullable<PageToReturn['leaf']>>(leaf: Leaf, part: ImagePart | null): NonNullable<PageToReturn['leaf']> {
  if (leaf.half === null || part === null) return leaf
  return { ...leaf, part, width: part.w, height: part.h, homography: leaf.homography && compose([[1, 0, -part.x], [0, 1, -part.y], [0, 0, 1]], leaf.homography) }
}

/** The settled marking that counts for a response. */
export type CountingMarking = Readonly<{ scriptId: string; questionId: string; round: Round; markerId: string; marker: string; stamps: readonly Stamp[] }>

/** The settled, counting markings of a class set with their stamps, in two statements. */
export async function listCountingMarkings(db: Db, classSetId: string): Promise<CountingMarking[]> {
  const rows = (await db('scripts').join('responses', 'responses.script_id', 'scripts.id').join('counting_decisions', 'counting_decisions.response_id', 'responses.id')
    .join('markings', 'markings.id', 'counting_decisions.marking_id').join('users', 'users.id', 'markings.marker_id')
    .where({ 'scripts.class_set_id': classSetId, 'markings.state': 'settled' }).whereNull('counting_decisions.superseded_at')
    .select({ id: 'markings.id', scriptId: 'scripts.id', questionId: 'responses.question_id', round: 'markings.round', markerId: 'markings.marker_id', given: 'users.given_name', family: 'users.family_name' })) as
    { id: string; scriptId: string; questionId: string; round: Round; markerId: string; given: string; family: string }[]
  const stamps = new Map<string, Stamp[]>()
  for (const stamp of await listStamps(db, rows.map(({ id }) => id))) stamps.set(stamp.markingId, [...(stamps.get(stamp.markingId) ?? []), stamp])
  return rows.map(({ id, given, family, ...row }) => ({ ...row, marker: `${given.charAt(0)}. ${family}`, stamps: stamps.get(id) ?? [] }))
}

export type Adjustment = Readonly<{ scriptId: string; questionId: string; halves: number; reason: string }>

/** The adjustments of a class set that hold for the markings that count, oldest first. */
export async function listAdjustments(db: Db, classSetId: string): Promise<Adjustment[]> {
  return (await db('adjustments').join('responses', 'responses.id', 'adjustments.response_id').join('scripts', 'scripts.id', 'responses.script_id')
    .leftJoin('counting_decisions', (join) => join.on('counting_decisions.response_id', 'responses.id').andOnNull('counting_decisions.superseded_at'))
    .where({ 'scripts.class_set_id': classSetId }).whereNull('adjustments.undone_at')
    .where((held) => held.whereNull('adjustments.marking_id').orWhere('adjustments.marking_id', db.ref('counting_decisions.marking_id')))
   .orderBy('adjustments.decided_at')
    .select({ scriptId: 'scripts.id', questionId: 'responses.question_id', halves: 'adjustments.halves', reason: 'adjustments.reason' })) as Adjustment[]
}

export type LooseLeaf = Readonly<{ id: string; position: number; sheafName: string }>

/** Loose sheets of the sheaves in which scripts of this class set may lie. */
export async function listLooseLeaves(db: Db, classSetId: string): Promise<LooseLeaf[]> {
  return (await db('sheaf_class_sets').join('sheaves', 'sheaves.id', 'sheaf_class_sets.sheaf_id').join('leaves', 'leaves.sheaf_id', 'sheaves.id').join('stored_files', 'stored_files.id', 'sheaves.file_id')
    .where({ 'sheaf_class_sets.class_set_id': classSetId, 'leaves.state': 'loose' }).orderBy(['sheaves.created_at', 'leaves.position'])
    .select({ id: 'leaves.id', position: 'leaves.position', sheafName: 'stored_files.original_name' })) as LooseLeaf[]
}

/** Sheaves of the class set that are still being read. */
export async function countSheavesInWork(db: Db, classSetId: string): Promise<number> {
  return (await db('sheaf_class_sets').join('sheaves', 'sheaves.id', 'sheaf_class_sets.sheaf_id').where({ class_set_id: classSetId }).whereIn('sheaves.state', ['waiting', 'reading']).count({ n: '*' }).first<{ n: number }>()).n
}


export type SignedStamp = Readonly<{ stampId: string; questionId: string; responseId: string; savedAt: number; settledAt: number }>

/** When each stamp of a script's counting markings was pressed, and when its marking was settled. */
export async function listSignedStamps(db: Db, scriptId: string): Promise<SignedStamp[]> {
  return (await db('responses').join('counting_decisions', 'counting_decisions.response_id', 'responses.id').join('markings', 'markings.id', 'counting_decisions.marking_id').join('stamps', 'stamps.marking_id', 'markings.id')
    .where({ 'responses.script_id': scriptId, 'markings.state': 'settled', 'stamps.removed': 0 }).whereNull('counting_decisions.superseded_at')
    .select({ stampId: 'stamps.id', questionId: 'responses.question_id', responseId: 'responses.id', savedAt: 'stamps.saved_at', settledAt: 'markings.settled_at' })) as SignedStamp[]
}
