import { PDFName, type PDFDict, type PDFDocument, type PDFRef } from 'pdf-lib'
import { textString } from '@/lib/typesetting/operators'

/** A bookmark: where it leads is the page's top. */
export type Bookmark = Readonly<{ says: string; page: PDFRef }>

/** Puts bookmarks into a file, one after the other. */
export function addOutline({ context, catalog }: PDFDocument, bookmarks: readonly Bookmark[]): void {
  if (bookmarks.length === 0) return
  const root = context.nextRef()
  const refs = bookmarks.map(() => context.nextRef())
  bookmarks.forEach(({ says, page }, k) => {
    const item: PDFDict = context.obj({ Title: textString(says), Parent: root, Dest: [page, 'Fit'] })
    const [before, after] = [refs[k - 1], refs[k + 1]]
    if (before) item.set(PDFName.of('Prev'), before)
    if (after) item.set(PDFName.of('Next'), after)
    context.assign(refs[k]!, item)
  })
  context.assign(root, context.obj({ Type: 'Outlines', First: refs[0]!, Last: refs.at(-1)!, Count: refs.length }))
  catalog.set(PDFName.of('Outlines'), root)
}
