import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import type { PixelPoint } from '@/lib/core/paper-space'
import type { PlaceTarget } from '@/lib/core/sorting'
import { now } from '@/lib/infra/clock'
import { db, type Db } from '@/db/knex'
import { getLeaf, moveLeaf } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { addScriptPage, findScriptPage, setCurrentLeaf } from '@/db/scripts'
import { gatePaper } from './gate-paper'
import { layByHand } from './lay-by-hand'
import { scriptFor } from './script-for'
import { decideSorting, type Touch } from './sorting-record'
import { takeLeafOut } from './take-leaf-out'

type Place = Readonly<{
  leafId: string
  target: PlaceTarget
  paperPage: number
  /** Use this scan instead of the one that lies there; that one is kept, and so are the stamps. */
  instead?: boolean
  /** The page's corners on the stored image, clockwise from top left, when its print was not found. */
  corners?: readonly PixelPoint[]
}>

/**
 * Puts a leaf into a script as a page of the paper, from wherever it is now. Throws place_taken when a page lies there,
 * no_registration when the print of that page is not found on it.
 */
export async function placeLeaf(actor: Actor, { leafId, target, paperPage, instead = false, corners }: Place): Promise<void> {
  const leaf = await getLeaf(db(), leafId)
  if (!leaf) throw new AppError('not_found')
  await gatePaper(db(), actor, 'change', leaf.paperId)
  const paper = await getPaper(db(), leaf.paperId)
  const free = async (trx: Db, scriptId: string) => {
    const there = await findScriptPage(trx, scriptId, paperPage)
    if (there?.leafId && there.leafId !== leafId && !instead) throw new AppError('place_taken', { page: paperPage })
    return there
  }
  // Asked before the slow look at the picture, and again inside the transaction.
  if ('scriptId' in target) await free(db(), target.scriptId)
  const laid = await layByHand(leaf, paper!, paperPage, corners ?? null)
  await decideSorting(actor, leaf.paperId, 'leaf.placed', { kind: 'leaf', id: leafId, to: `page ${paperPage}` }, async (trx, touch) => {
    const current = await getLeaf(trx, leafId)
    if (!current || current.state === 'read') throw new AppError('out_of_date')
    await takeLeafOut(trx, touch, current)
    const scriptId = await scriptFor(trx, touch, actor, leaf.paperId, target)
    await touch.script(scriptId)
    const pageId = (await free(trx, scriptId))?.id ?? newId()
    await putPage(trx, touch, { pageId, scriptId, paperPage, leafId })
    await moveLeaf(trx, leafId, { ...laid, state: 'placed', paperPage, scriptPageId: pageId, decidedBy: actor.userId, decidedAt: now() })
  })
}

async function putPage(trx: Db, touch: Touch, { pageId, scriptId, paperPage, leafId }: { pageId: string; scriptId: string; paperPage: number; leafId: string }): Promise<void> {
  await touch.page(pageId)
  const there = await findScriptPage(trx, scriptId, paperPage)
  if (!there) await addScriptPage(trx, { id: pageId, scriptId, paperPage, extra: false, position: paperPage, leafId })
  else await setCurrentLeaf(trx, pageId, leafId)
}
