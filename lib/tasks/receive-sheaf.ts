import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { listSittingClasses } from '@/db/class-set-students'
import { getClassSet } from '@/db/class-sets'
import { db, type Db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { dropUpload, findUpload } from '@/lib/infra/sheaf-uploads'
import { gatePaper } from './gate-paper'
import { keepSheaf } from './keep-sheaf'

/**
 * Takes a complete upload over as a sheaf of the paper: looked at by its content, kept byte for byte, and put in the queue for
 * reading, file, sheaf and job in one transaction. `classSetIds` says whose scripts lie in it, those of other papers too; it may be left out when the paper has one class set.
 * Throws the file errors, file_same (this very file is here), bad_input (class sets), not_found (no such upload of this person).
 */
export async function receiveSheaf(actor: Actor, input: { paperId: string; uploadId: string; classSetIds: readonly string[] }): Promise<{ sheafId: string }> {
  await gatePaper(db(), actor, 'change', input.paperId)
  const classSetIds = await chosenClassSets(db(), actor, input.paperId, input.classSetIds)
  const upload = await findUpload(input.uploadId)
  if (!upload || upload.userId !== actor.userId || upload.paperId !== input.paperId) throw new AppError('not_found')
  if (!upload.complete) throw new AppError('out_of_date')
  try {
    const sheafId = await keepSheaf(actor, { paperId: input.paperId, file: upload.file, name: upload.name, classSetIds })
    await dropUpload(upload.id)
    return { sheafId }
  } catch (error) {
    // Turned down for what it is: sent again it would be turned down again. A fault of ours leaves it, to be tried once more.
    if (error instanceof AppError) await dropUpload(upload.id)
    throw error
  }
}

/** Class sets of this paper or of others that this person may change too. */
async function chosenClassSets(db: Db, actor: Actor, paperId: string, chosen: readonly string[]): Promise<string[]> {
  const all = (await listSittingClasses(db, paperId)).map(({ classSetId }) => classSetId)
  const wanted = chosen.length === 0 && all.length === 1 ? all : [...new Set(chosen)]
  if (!wanted.some((id) => all.includes(id))) throw badChoice()
  for (const id of wanted.filter((one) => !all.includes(one))) {
    const set = await getClassSet(db, id)
    if (!set) throw badChoice()
    await gatePaper(db, actor, 'change', set.paperId)
    if (!(await getPaper(db, set.paperId))?.blankFileId) throw badChoice()
  }
  return wanted
}

function badChoice(): AppError {
  return new AppError('bad_input', { lines: [{ path: 'classSetIds', says: 'choose whose scripts lie in this sheaf' }] })
}
