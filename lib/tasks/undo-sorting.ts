import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { ensureResponses } from '@/db/responses'
import { lastSortingDecision, setSortingUndone } from '@/db/sorting-decisions'
import { gatePaper } from './gate-paper'
import { renewInk } from './renew-ink'
import { renewSuggestions } from './renew-suggestions'
import { idsOf, putRowsBack, rowsNow, sameRows, scriptsIn, type SortingRows } from './sorting-record'

/**
 * Takes back the last thing this person decided at the sorting table of a paper, and so on backwards. Throws not_found when there
 * is nothing, out_of_date when someone changed it since, has_stamps when marks were given on what it made.
 */
export async function undoSorting(actor: Actor, paperId: string): Promise<{ act: string }> {
  return transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const decision = await lastSortingDecision<SortingRows>(trx, paperId, actor.userId)
    if (!decision) throw new AppError('not_found')
    const now = await rowsNow(trx, idsOf(decision.after))
    if (!sameRows(now, decision.after)) throw new AppError('out_of_date')
    await putRowsBack(trx, decision.before)
    await setSortingUndone(trx, decision.id)
    await addAuditLine(trx, actor, { act: 'sorting.undone', objectKind: 'sorting-decision', objectId: decision.id, paperId, from: decision.act })
    await ensureResponses(trx, paperId)
    const touched = await scriptsIn(trx, decision.before)
    await renewInk(trx, paperId, ({ scriptId }) => touched.has(scriptId))
    await renewSuggestions(trx, paperId)
    return { act: decision.act }
  })
}
