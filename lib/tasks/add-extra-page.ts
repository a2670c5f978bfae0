import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import type { PlaceTarget } from '@/lib/core/sorting'
import { now } from '@/lib/infra/clock'
import { db } from '@/db/knex'
import { getLeaf, getLeafEvidence, moveLeaf } from '@/db/leaves'
import { addScriptPage, listPagesOfScript } from '@/db/scripts'
import { gatePaper } from './gate-paper'
import { laidAsItself } from './lay-by-hand'
import { scriptFor } from './script-for'
import { decideSorting } from './sorting-record'
import { takeLeafOut } from './take-leaf-out'

/** Extra pages come after every page a paper can have. */
const afterThePaper = 1000

/** Puts a leaf into a script as an extra page: a sheet with no page of the paper behind it. Throws page_unreadable. */
export async function addExtraPage(actor: Actor, { leafId, target }: { leafId: string; target: PlaceTarget }): Promise<void> {
  const leaf = await getLeaf(db(), leafId)
  if (!leaf) throw new AppError('not_found')
  await gatePaper(db(), actor, 'change', leaf.paperId)
  const reading = (await getLeafEvidence(db(), [leafId])).get(leafId)?.reading
  const laid = laidAsItself(leaf, { x: reading?.image?.dpiX ?? 200, y: reading?.image?.dpiY ?? 200 }, reading?.part)
  await decideSorting(actor, leaf.paperId, 'leaf.extra', { kind: 'leaf', id: leafId }, async (trx, touch) => {
    const current = await getLeaf(trx, leafId)
    if (!current || current.state === 'read') throw new AppError('out_of_date')
    await takeLeafOut(trx, touch, current)
    const scriptId = await scriptFor(trx, touch, actor, leaf.paperId, target)
    await touch.script(scriptId)
    const last = Math.max(afterThePaper, ...(await listPagesOfScript(trx, scriptId)).map(({ position }) => position))
    const pageId = newId()
    await touch.page(pageId)
    await addScriptPage(trx, { id: pageId, scriptId, paperPage: null, extra: true, position: last + 1, leafId })
    await moveLeaf(trx, leafId, { ...laid, state: 'placed', paperPage: null, scriptPageId: pageId, decidedBy: actor.userId, decidedAt: now() })
  })
}
