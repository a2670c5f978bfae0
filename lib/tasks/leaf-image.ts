import { AppError } from '@/lib/core/errors'
import { keptPicture } from '@/lib/infra/kept-picture'
import { keptPath } from '@/lib/infra/file-store'
import type { Db } from '@/db/knex'
import { getLeafSource } from '@/db/leaf-sources'
import { sheafPicture } from './look-at-sheaf'

/**
 * The stored image of a leaf as a file a picture program reads, its pixels as the sheaf holds them: a JPEG page's own bytes, any other page as PNG. Taken out of the sheaf once.
 * Throws not_found or page_unreadable.
 */
export async function leafImage(db: Db, leafId: string): Promise<Buffer> {
  const source = await getLeafSource(db, leafId)
  if (!source) throw new AppError('not_found')
  return keptPicture(leafId, 'leaf', () => sheafPicture(keptPath(source.sha256), source.index))
}
