import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import { keptPicture } from '@/lib/infra/kept-picture'
import { readKept } from '@/lib/infra/file-store'
import { drawStoredPage, sharpOf } from '@/lib/reading/decode-page'
import { openSheaf, type OpenSheaf } from '@/lib/reading/open-sheaf'
import { openDocument } from '@/lib/reading/pdfium'
import type { Db } from '@/db/knex'
import { getLeafSource } from '@/db/leaf-sources'

type Held = Readonly<{ sha256: string; bytes: Buffer; sheaf: OpenSheaf }>
// The sheaf last cut from stays open: a run goes through one sheaf leaf by leaf.
let held: { sha256: string; work: Promise<Held> } | null = null

function open(sha256: string): Promise<Held> {
  if (held?.sha256 === sha256) return held.work
  const work = readKept(sha256).then(async (bytes) => ({ sha256, bytes, sheaf: await openSheaf(bytes) }))
  held = { sha256, work }
  work.catch(() => { held = null })
  return work
}

async function drawn(bytes: Buffer, index: number): Promise<ReturnType<typeof drawStoredPage>> {
  const document = await openDocument(bytes)
  try {
    return drawStoredPage(document, index, 3)
  } finally {
    document.close()
  }
}

/**
 * The stored image of a leaf as a file a picture program reads, its pixels as the sheaf holds them: a JPEG page's own bytes, any other page as PNG. Taken out of the sheaf once.
 * Throws not_found or page_unreadable.
 */
export async function leafImage(db: Db, leafId: string): Promise<Buffer> {
  const source = await getLeafSource(db, leafId)
  if (!source) throw new AppError('not_found')
  return keptPicture(`${leafId}-leaf`, async () => {
    const { sheaf, bytes } = await open(source.sha256)
    const page = sheaf.page(source.index)
    if (page.image !== null && page.image.encoding === 'jpeg' && !page.inverted) return Buffer.from(page.bytes)
    if (page.image) return sharpOf(page).png({ compressionLevel: 3 }).toBuffer()
    const { picture } = await drawn(bytes, source.index)
    return sharp(picture.data, { raw: { width: picture.width, height: picture.height, channels: 3 } }).png({ compressionLevel: 3 }).toBuffer()
  })
}
