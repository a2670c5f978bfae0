import type { Actor } from '@/lib/core/actor'
import type { PaperDetails } from '@/lib/core/paper-details-view'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { getPaper, putPaperDetails } from '@/db/papers'
import { gatePaper } from './gate-paper'

export type SavePaperDetails = Readonly<{ paperId: string; /** As the form was opened with. */ before: PaperDetails; after: PaperDetails }>

/** Saves title, keeping, names, sample and solutions. Throws out_of_date when they are no longer what the form was opened with. */
export async function savePaperDetails(actor: Actor, { paperId, before, after }: SavePaperDetails): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const stored = detailsOf((await getPaper(trx, paperId))!)
    if (same(stored, after)) return
    if (!same(stored, before)) throw new AppError('out_of_date')
    await putPaperDetails(trx, paperId, after)
    for (const key of ['keepUntil', 'namesHidden', 'sampleSize', 'solutionsReleased'] as const) {
      if (stored[key] === after[key]) continue
      await addAuditLine(trx, actor, { act: `paper.${key}`, objectKind: 'paper', objectId: paperId, paperId, from: say(stored[key]), to: say(after[key]) })
    }
    if (stored.title !== after.title) await addAuditLine(trx, actor, { act: 'paper.title', objectKind: 'paper', objectId: paperId, paperId })
  })
}

export function detailsOf({ title, keepUntil, namesHidden, sampleSize, solutionsReleased }: PaperDetails): PaperDetails {
  return { title, keepUntil, namesHidden, sampleSize, solutionsReleased }
}

const keys = ['title', 'keepUntil', 'namesHidden', 'sampleSize', 'solutionsReleased'] as const
const same = (a: PaperDetails, b: PaperDetails) => keys.every((key) => a[key] === b[key])
const say = (value: string | number | boolean | null) => (value === null ? null : String(value))
