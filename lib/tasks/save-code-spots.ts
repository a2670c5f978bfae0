import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { CodeSpot } from '@/lib/core/printed-code'
import { assertCodePlace } from '@/lib/printing/code-place'
import { addAuditLine } from '@/db/audit'
import { listCodeSpots, setCodeSpots } from '@/db/code-spots'
import { db, transaction } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { gatePaper } from './gate-paper'
import { pageGrounds } from './page-grounds'

/**
 * Says where the code of each page goes; pages that are not named have none. Throws code_place_bad for a place over print, over an answer
 * space, off the page, too small, or without room for the name.
 */
export async function saveCodeSpots(actor: Actor, { paperId, spots }: { paperId: string; spots: readonly CodeSpot[] }): Promise<void> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  if (!paper) throw new AppError('not_found')
  if (new Set(spots.map(({ page }) => page)).size !== spots.length) throw new AppError('bad_input')
  const grounds = await pageGrounds(paper)
  for (const spot of spots) {
    const ground = grounds.find(({ page }) => page === spot.page)
    if (!ground) throw new AppError('bad_input')
    assertCodePlace(spot, ground)
  }
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    if (JSON.stringify(await listCodeSpots(trx, paperId)) === JSON.stringify([...spots].sort((a, b) => a.page - b.page))) return
    await setCodeSpots(trx, paperId, spots)
    await addAuditLine(trx, actor, { act: 'code-spots.saved', objectKind: 'paper', objectId: paperId, paperId, to: `${spots.length} pages` })
  })
}
