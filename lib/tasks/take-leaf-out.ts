import { AppError } from '@/lib/core/errors'
import type { Db } from '@/db/knex'
import { findOlderLeaf, moveLeaf, type Leaf } from '@/db/leaves'
import { dropScript, dropScriptPage, getScript, getScriptPage, hasStamps, listPagesOfScript, setCurrentLeaf } from '@/db/scripts'
import type { Touch } from './sorting-record'

/**
 * Takes a leaf out of the script page it lies in. An older scan of that page holds again; a page that is left empty goes, unless
 * stamps lie on it, and so does a script without a name, page or mark.
 */
export async function takeLeafOut(trx: Db, touch: Touch, leaf: Leaf): Promise<void> {
  await touch.leaf(leaf.id)
  if (leaf.scriptPageId === null) return
  const page = await getScriptPage(trx, leaf.scriptPageId)
  if (!page) throw new AppError('out_of_date')
  await touch.page(page.id)
  await touch.script(page.scriptId)
  await moveLeaf(trx, leaf.id, { scriptPageId: null })
  if (page.leafId !== leaf.id) return
  const older = await findOlderLeaf(trx, page.id, leaf.id)
  await setCurrentLeaf(trx, page.id, older?.id ?? null)
  if (older || (await hasStamps(trx, { scriptPageId: page.id }))) return
  await dropScriptPage(trx, page.id)
  const script = await getScript(trx, page.scriptId)
  const empty = (await listPagesOfScript(trx, page.scriptId)).length === 0
  if (script && empty && script.studentId === null && !(await hasStamps(trx, { scriptId: script.id }))) await dropScript(trx, script.id)
}
