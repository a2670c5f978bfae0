import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { findUpload, serveUpload } from '@/lib/infra/sheaf-uploads'
import { gatePaper } from './gate-paper'

/**
 * Takes in a piece of a sheaf, however often the line broke. Asked on every request: may this person change this paper, and is
 * it their own upload? Another person's upload is not_found.
 * @param uploadId null when a new upload begins
 */
export async function takeUpload(actor: Actor, input: { paperId: string; uploadId: string | null; request: Request }): Promise<Response> {
  await gatePaper(db(), actor, 'change', input.paperId)
  if (input.uploadId !== null) {
    const upload = await findUpload(input.uploadId)
    if (!upload || upload.userId !== actor.userId || upload.paperId !== input.paperId) throw new AppError('not_found')
  }
  return serveUpload({ userId: actor.userId, paperId: input.paperId }, input.request)
}
