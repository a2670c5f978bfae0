import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { CodeSpot } from '@/lib/core/printed-code'
import { suggestCodePlace } from '@/lib/printing/suggest-code-place'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { gatePaper } from './gate-paper'
import { pageGrounds } from './page-grounds'

/** Good free places for the codes: one that serves every page where there is one and `same` asks for it, else the best of each page. Pages without a free place are left out. */
export async function suggestCodeSpots(actor: Actor, { paperId, same }: { paperId: string; same: boolean }): Promise<CodeSpot[]> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  if (!paper) throw new AppError('not_found')
  const grounds = await pageGrounds(paper)
  const common = same ? suggestCodePlace(grounds) : null
  return grounds.flatMap((ground) => {
    const rect = common ?? suggestCodePlace([ground])
    return rect ? [{ page: ground.page, rect }] : []
  })
}
