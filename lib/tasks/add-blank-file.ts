import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import type { Db } from '@/db/knex'
import { addStoredFile } from '@/db/stored-files'

export type KeptBytes = Readonly<{ sha256: string; size: number }>

/** Writes the row of a blank paper whose bytes are kept; returns the file's id. */
export async function addBlankFile(trx: Db, actor: Actor, kept: KeptBytes, name: string): Promise<string> {
  const id = newId()
  await addStoredFile(trx, { id, ...kept, mediaType: 'application/pdf', originalName: name.slice(0, 200), createdBy: actor.userId })
  return id
}
