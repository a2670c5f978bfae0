import sharp from 'sharp'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import { readKept } from '@/lib/infra/file-store'
import { gatePaper } from './gate-paper'

/** Sharp enough to be looked at twice as large as on paper. */
const dpi = 180
/** A few pages are kept in memory: turning pages to and fro draws nothing twice. */
const kept = new Map<string, Promise<Buffer>>()
const mostKept = 60

/** A page (from 1) of the blank paper as a PNG in grey. Throws not_found where there is no blank paper or no such page. */
export async function readBlankPage(actor: Actor, { paperId, page }: { paperId: string; page: number }): Promise<Buffer> {
  await gatePaper(db(), actor, 'see', paperId)
  const paper = await getPaper(db(), paperId)
  const file = paper?.blankFileId ? await getStoredFile(db(), paper.blankFileId) : null
  if (!file || !paper!.pages.some((each) => each.page === page)) throw new AppError('not_found')
  const key = `${file.sha256}/${page}`
  const picture = kept.get(key) ?? drawPage(file.sha256, page)
  kept.delete(key)
  kept.set(key, picture)
  for (const old of kept.keys()) if (kept.size > mostKept) kept.delete(old)
  picture.catch(() => kept.delete(key))
  return picture
}

async function drawPage(sha256: string, page: number): Promise<Buffer> {
  const [drawn] = await openBlankPaper(await readKept(sha256), dpi, page)
  if (!drawn) throw new AppError('not_found')
  const { data, width, height } = drawn.picture
  return sharp(data, { raw: { width, height, channels: 1 } }).png({ compressionLevel: 7 }).toBuffer()
}
