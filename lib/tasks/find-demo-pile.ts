import type { Db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import { demoPileOf } from '@/lib/infra/demo-piles'
import { env } from '@/lib/infra/env'

/** The path of a scanned pile to try a paper with: only in the demo school, and only for a paper of its invented classes. */
export async function findDemoPile(db: Db, paperId: string): Promise<string | null> {
  if (!env.demo) return null
  const blankId = (await getPaper(db, paperId))?.blankFileId
  const blank = blankId ? await getStoredFile(db, blankId) : null
  return blank ? demoPileOf(blank.sha256) : null
}
