import type { Db } from './knex'

/** Where a leaf's picture is found: the file of its sheaf, and its page there (from 0). */
export type LeafSource = Readonly<{ sha256: string; index: number }>

export async function getLeafSource(db: Db, leafId: string): Promise<LeafSource | null> {
  const row = (await db('leaves').join('sheaves', 'sheaves.id', 'leaves.sheaf_id').join('stored_files', 'stored_files.id', 'sheaves.file_id').where('leaves.id', leafId)
    .first({ sha256: 'stored_files.sha256', index: 'leaves.position' })) as LeafSource | undefined
  return row ?? null
}
