import type { CodeSpot } from '@/lib/core/printed-code'
import type { Db } from './knex'

type Row = { paper_id: string; page: number; x: number; y: number; side: number }

/** Where the codes of a paper go, page by page. */
export async function listCodeSpots(db: Db, paperId: string): Promise<CodeSpot[]> {
  const rows = await db<Row>('code_spots').where({ paper_id: paperId }).orderBy('page')
  return rows.map(({ page, x, y, side }) => ({ page, rect: { x, y, w: side, h: side } }))
}

/** Puts these places in the stead of all that were there. */
export async function setCodeSpots(db: Db, paperId: string, spots: readonly CodeSpot[]): Promise<void> {
  await db<Row>('code_spots').where({ paper_id: paperId }).delete()
  if (spots.length > 0) await db<Row>('code_spots').insert(spots.map(({ page, rect }) => ({ paper_id: paperId, page, x: rect.x, y: rect.y, side: rect.w })))
}
