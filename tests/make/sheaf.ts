import { copyFile } from 'node:fs/promises'
import path from 'node:path'
import { addJob } from '@/db/jobs'
import { transaction } from '@/db/knex'
import { addSheaf } from '@/db/sheaves'
import { addStoredFile } from '@/db/stored-files'
import { env } from '@/lib/infra/env'
import { keepFile } from '@/lib/infra/file-store'
import { newId } from '@/lib/core/ids'

/** A sheaf of a real scan, taken in and waiting to be read. */
export async function aWaitingSheaf(paperId: string, classSetId: string, scan: string, leafCount: number): Promise<string> {
  const copy = path.join(env.dataFolder, `${newId()}.pdf`)
  await copyFile(scan, copy)
  const kept = await keepFile(copy)
  const fileId = newId()
  const sheafId = newId()
  await transaction(async (trx) => {
    await addStoredFile(trx, { id: fileId, ...kept, mediaType: 'application/pdf', originalName: path.basename(scan), createdBy: null })
    await addSheaf(trx, { id: sheafId, paperId, fileId, leafCount, classSetIds: [classSetId], createdBy: null })
    await addJob(trx, 'read-sheaf', sheafId)
  })
  return sheafId
}
