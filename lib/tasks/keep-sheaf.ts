import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { addAuditLine } from '@/db/audit'
import { addJob } from '@/db/jobs'
import { db, transaction } from '@/db/knex'
import { addSheaf, findSheafOfBytes } from '@/db/sheaves'
import { addStoredFile } from '@/db/stored-files'
import { isKept, keepFile } from '@/lib/infra/file-store'
import { asSheaf } from './as-sheaf'
import { gatePaper } from './gate-paper'

export type KeepSheaf = Readonly<{ paperId: string; /** A file on this disk; it is moved into the store. */ file: string; name: string; classSetIds: readonly string[] }>

/**
 * Keeps a file as a sheaf of the paper: looked at by its content, stored byte for byte (pictures as a PDF that holds them), and put in the queue for reading, all in
 * one transaction. Throws the file errors and file_same (this very file is here). Returns the sheaf's id.
 */
export async function keepSheaf(actor: Actor, { paperId, file, name, classSetIds }: KeepSheaf): Promise<string> {
  await gatePaper(db(), actor, 'change', paperId)
  const { path, pageCount: leafCount } = await asSheaf([file], `${file}.pdf`)
  const { sha256, size } = await keepFile(path)
  return transaction(async (trx) => {
    // A sheaf of the same bytes was stopped at this moment, and took them along.
    if (!(await isKept(sha256))) throw new AppError('out_of_date')
    if (await findSheafOfBytes(trx, paperId, sha256)) throw new AppError('file_same')
    const fileId = newId()
    const sheafId = newId()
    await addStoredFile(trx, { id: fileId, sha256, size, mediaType: 'application/pdf', originalName: name, createdBy: actor.userId })
    await addSheaf(trx, { id: sheafId, paperId, fileId, leafCount, classSetIds, createdBy: actor.userId })
    await addJob(trx, 'read-sheaf', sheafId)
    await addAuditLine(trx, actor, { act: 'sheaf.received', objectKind: 'sheaf', objectId: sheafId, paperId, to: sha256 })
    return sheafId
  })
}
