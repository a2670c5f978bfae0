import { AppError } from '@/lib/core/errors'
import type { Paper } from '@/lib/core/paper'
import type { BlankPage } from '@/lib/core/grey-picture'
import { db, transaction } from '@/db/knex'
import { addLeafReading, listReadPositions } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { getSheaf, startSheaf } from '@/db/sheaves'
import { getStoredFile } from '@/db/stored-files'
import { env } from '@/lib/infra/env'
import { keptPath, readKept } from '@/lib/infra/file-store'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { openLeaves, readLeaves } from './read-leaves'
import { placeSheaf } from './place-sheaf'

/**
 * Reads a sheaf leaf by leaf and then puts it into scripts. Each leaf's finding is stored as it is read, so it may be killed and
 * started again at any point: it goes on with the leaves that are missing, and the placing is one transaction.
 * @param goOn asked before each leaf is stored; once false nothing more is written and the answer is false
 */
export async function readSheaf(sheafId: string, goOn: () => boolean): Promise<boolean> {
  const sheaf = await getSheaf(db(), sheafId)
  if (!sheaf || sheaf.state === 'placed') return true
  const paper = await getPaper(db(), sheaf.paperId)
  const reader = await openLeaves(keptPath(sheaf.sha256), await blankPagesOf(paper), env.SHEAFMARK_THREADS)
  try {
    await transaction((trx) => startSheaf(trx, sheafId, reader.pageCount))
    if (!(await readMissing(reader, sheafId, goOn))) return false
  } finally {
    await reader.close()
  }
  return transaction(async (trx) => {
    if (!goOn()) return false
    if ((await getSheaf(trx, sheafId))?.state === 'reading') await placeSheaf(trx, sheaf, paper!.pages.length)
    return true
  })
}

/** The pages of a paper's blank PDF as pictures. Throws paper_invalid when the paper has none. */
export async function blankPagesOf(paper: Paper | null): Promise<BlankPage[]> {
  const file = paper?.blankFileId ? await getStoredFile(db(), paper.blankFileId) : null
  if (!file) throw new AppError('paper_invalid')
  return openBlankPaper(await readKept(file.sha256))
}

async function readMissing(reader: Awaited<ReturnType<typeof openLeaves>>, sheafId: string, goOn: () => boolean): Promise<boolean> {
  const known = new Set(await listReadPositions(db(), sheafId))
  // Once one lane has stopped, the reader is closing and what the other lanes bring is no finding.
  let open = true
  const store = async (reading: Parameters<typeof addLeafReading>[2]) => {
    open &&= goOn()
    if (!open) return
    try {
      await transaction((trx) => addLeafReading(trx, sheafId, reading))
    } catch (error) {
      open = false
      throw error
    }
  }
  await readLeaves(reader, (index) => known.has(index) || !open, store, env.SHEAFMARK_THREADS)
  return open && goOn()
}
