import { PDFDocument, PDFName, PDFRawStream, PDFDict } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import { keptPicture } from '@/lib/infra/cut-store'
import { readKept } from '@/lib/infra/file-store'
import type { Db } from '@/db/knex'
import { getLeafSource } from '@/db/leaf-sources'

let held: { sha256: string; open: Promise<PDFDocument> } | null = null

/** The stored image of a leaf as a file a picture program reads, its pixels as the sheaf holds them. Throws not_found or page_unreadable. */
export async function leafImage(db: Db, leafId: string): Promise<Buffer> {
  const source = await getLeafSource(db, leafId)
  if (!source) throw new AppError('not_found')
  return keptPicture(`${leafId}-leaf`, async () => {
    if (held?.sha256 !== source.sha256) held = { sha256: source.sha256, open: readKept(source.sha256).then((bytes) => PDFDocument.load(bytes, { updateMetadata: false })) }
    const page = (await held.open).getPage(source.index)
    const images = page.node.Resources()?.lookup(PDFName.of('XObject'), PDFDict)
    const [only] = (images?.entries() ?? []).map(([, ref]) => page.doc.context.lookup(ref))
    if (!(only instanceof PDFRawStream)) throw new AppError('page_unreadable')
    return Buffer.from(only.contents)
  })
}
