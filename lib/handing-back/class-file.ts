import { PDFDocument, type PDFPage } from 'pdf-lib'
import { describeFile } from '@/lib/typesetting/describe-file'
import { addOutline, type Bookmark } from './add-outline'
import { addScript, type LoadedSheaves, type ScriptToReturn } from './returned-script'
import type { ScriptPage } from './returned-page'
import { Shapes } from './shapes'
import { StreamedFile } from './streamed-file'
import { Structure } from './structure'
import { Typesetter } from '@/lib/typesetting/typesetter'

/** One script of a class file. `name` is its bookmark. */
export type BundledScript = Readonly<{ name: string; sheaves: LoadedSheaves }> & Pick<ScriptToReturn, 'summary' | 'pages'>

/**
 * All scripts of a class as one file for printing on both sides: each begins on a right-hand page, after an empty one where it must.
 * Fonts lie in it once. Each script goes out as it is made, so that a file of any length takes the memory of one script.
 */
export async function* classFile(title: string, builtAt: Date, scripts: AsyncIterable<BundledScript>): AsyncGenerator<Uint8Array> {
  const pdf = await PDFDocument.create({ updateMetadata: false })
  describeFile(pdf, title, builtAt)
  const type = await Typesetter.for(pdf.context)
  const shapes = new Shapes(pdf.context)
  const file = new StreamedFile(pdf)
  const bookmarks: Bookmark[] = []
  yield file.begin()
  for await (const { name, sheaves, ...script } of scripts) {
    const first = pdf.getPageCount()
    addScript({ pdf, type, shapes, structure: new Structure(), signing: null }, sheaves, script)
    const added = pdf.getPageCount() - first
    if (added === 0) continue
    bookmarks.push({ says: name, page: pdf.getPage(first).ref })
    if (added % 2 === 1) addEmptyPage(pdf, pdf.getPage(first + added - 1))
    yield* file.finished()
  }
  addOutline(pdf, bookmarks)
  await type.embed()
  yield* file.end()
}

function addEmptyPage(pdf: PDFDocument, like: PDFPage): void {
  const { width, height } = like.getSize()
  pdf.addPage([width, height])
}

/** The pages of a finished file as they are, to be taken over under the name `sheaf`. */
export function pagesOf(document: PDFDocument, sheaf: string): ScriptPage[] {
  return document.getPages().map((page, index) => ({ sheaf, index, homography: null, image: page.getSize(), drawings: [], words: '' }))
}
