import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { dropJobs } from '@/db/jobs'
import { transaction, type Db } from '@/db/knex'
import { listLeavesOfSheaf, type Leaf } from '@/db/leaves'
import { dropScript, scriptsOfSheafAlone } from '@/db/scripts'
import { dropSheaf, getSheaf, type Sheaf } from '@/db/sheaves'
import { dropDecisionsOnSheaf } from '@/db/sorting-decisions'
import { dropStoredFile, isStored } from '@/db/stored-files'
import { dropKept } from '@/lib/infra/file-store'
import { dropPictures } from '@/lib/infra/kept-picture'
import { gatePaper } from './gate-paper'
import { renewSuggestions } from './renew-suggestions'
import { takeLeafOut } from './take-leaf-out'

/**
 * Stops the reading of a sheaf (or gives up one that failed) and takes everything of it away: leaves, the scripts made of them, the
 * names given to those, its job and its file. Throws out_of_date once the sheaf is read, reading_marked when an answer in it has been marked.
 */
export async function stopReading(actor: Actor, sheafId: string): Promise<void> {
  const gone = await transaction(async (trx) => {
    const sheaf = await getSheaf(trx, sheafId)
    if (!sheaf) throw new AppError('not_found')
    await gatePaper(trx, actor, 'change', sheaf.paperId)
    if (sheaf.state === 'placed') throw new AppError('out_of_date')
    return takeAway(trx, actor, sheaf)
  })
  for (const { id } of gone.leaves) await dropPictures(id)
  // Another sheaf may hold the same bytes, or the file may have been sent again at this moment.
  await transaction(async (trx) => {
    if (!(await isStored(trx, gone.sha256))) await dropKept(gone.sha256)
  })
}

async function takeAway(trx: Db, actor: Actor, sheaf: Sheaf): Promise<{ leaves: readonly Leaf[]; sha256: string }> {
  const { ids, marked } = await scriptsOfSheafAlone(trx, sheaf.id)
  if (marked.length > 0) throw new AppError('reading_marked', { scripts: marked.length })
  const leaves = await listLeavesOfSheaf(trx, sheaf.id)
  await dropDecisionsOnSheaf(trx, sheaf.id, ids)
  for (const leaf of leaves) await takeLeafOut(trx, untold, leaf)
  for (const id of ids) await dropScript(trx, id)
  await dropJobs(trx, 'read-sheaf', sheaf.id)
  await dropSheaf(trx, sheaf.id)
  await dropStoredFile(trx, sheaf.fileId)
  await renewSuggestions(trx, sheaf.paperId)
  await addAuditLine(trx, actor, { act: 'sheaf.stopped', objectKind: 'sheaf', objectId: sheaf.id, paperId: sheaf.paperId, from: sheaf.sha256, to: `leaves ${leaves.length}, scripts ${ids.length}` })
  return { leaves, sha256: sheaf.sha256 }
}

const nothing = async (): Promise<void> => undefined
/** There is nothing to undo: what would be put back is gone. */
const untold = { leaf: nothing, page: nothing, script: nothing, student: nothing }
