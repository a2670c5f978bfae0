import type { Db } from './knex'

type FileRow = { id: string; sha256: string; size: number; media_type: string; original_name: string; created_by: string | null; created_at: number }
export type StoredFile = Readonly<{ id: string; sha256: string; size: number; mediaType: string; originalName: string }>

export async function addStoredFile(db: Db, file: StoredFile & { createdBy: string | null }): Promise<void> {
  await db<FileRow>('stored_files').insert({
    id: file.id, sha256: file.sha256, size: file.size, media_type: file.mediaType, original_name: file.originalName, created_by: file.createdBy, created_at: Date.now(),
  })
}

export async function getStoredFile(db: Db, id: string): Promise<StoredFile | null> {
  const row = await db<FileRow>('stored_files').where({ id }).first()
  return row ? { id: row.id, sha256: row.sha256, size: row.size, mediaType: row.media_type, originalName: row.original_name } : null
}

/** Drops the row of a file. Its bytes may go too once no other row names them: see isStored. */
export async function dropStoredFile(db: Db, id: string): Promise<void> {
  await db<FileRow>('stored_files').where({ id }).delete()
}

/** Whether any row names these bytes. */
export async function isStored(db: Db, sha256: string): Promise<boolean> {
  return Boolean(await db<FileRow>('stored_files').where({ sha256 }).first('id'))
}
