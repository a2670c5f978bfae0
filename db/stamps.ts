import type { HalfMarks } from '@/lib/core/marks'
import type { Stamp, StampKind } from '@/lib/core/stamp'
import type { Db } from './knex'

export type StampRow = {
  id: string; marking_id: string; version: number; kind: StampKind; worth: HalfMarks; mark_point_id: string | null; script_page_id: string | null
  x: number; y: number; w: number; h: number; text: string; path: string; removed: 0 | 1; saved_at: number
}

function toStamp(row: StampRow): Stamp {
  return {
    id: row.id, markingId: row.marking_id, version: row.version, kind: row.kind, worth: row.worth, markPointId: row.mark_point_id, scriptPageId: row.script_page_id,
    x: row.x, y: row.y, w: row.w, h: row.h, text: row.text, path: JSON.parse(row.path) as number[], removed: row.removed === 1,
  }
}

function toRow({ markingId, markPointId, scriptPageId, path, removed, ...stamp }: Stamp): Omit<StampRow, 'saved_at'> {
  return { ...stamp, marking_id: markingId, mark_point_id: markPointId, script_page_id: scriptPageId, path: JSON.stringify(path), removed: removed ? 1 : 0 }
}

/**
 * Keeps a stamp. Its id and version are made where the pen came down: sent twice it is stored once, and a version that is not higher than the one here is left out (false).
 * A stamp never moves to another marking.
 */
export async function putStamp(db: Db, stamp: Stamp): Promise<boolean> {
  const row = { ...toRow(stamp), saved_at: Date.now() }
  const stored = (await db<StampRow>('stamps').insert(row).onConflict('id').merge().where('stamps.version', '<', stamp.version)
    .andWhere('stamps.marking_id', stamp.markingId).returning('id')) as { id: string }[]
  return stored.length > 0
}

/** The marking a stamp belongs to; null when no stamp has this id. */
export async function markingIdOfStamp(db: Db, id: string): Promise<string | null> {
  const row = await db<StampRow>('stamps').where({ id }).first('marking_id')
  return row?.marking_id ?? null
}

/** The stamps of some markings, tombstones included, in the order they were last saved. */
export async function listStamps(db: Db, markingIds: readonly string[]): Promise<Stamp[]> {
  const rows: StampRow[] = []
  // SQLite takes a limited number of values in one statement.
  for (let from = 0; from < markingIds.length; from += 500) {
    rows.push(...(await db<StampRow>('stamps').whereIn('marking_id', markingIds.slice(from, from + 500)).orderBy(['saved_at', 'id'])))
  }
  return rows.map(toStamp)
}
