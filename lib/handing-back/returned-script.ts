import { PDFDocument } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import type { Signing } from './add-annotations'
import { addOutline } from './add-outline'
import { ObjectCopier } from './object-copier'
import { addReturnedPage, type FileInWork, type ScriptPage } from './returned-page'
import { Shapes } from './shapes'
import { StreamedFile } from './streamed-file'
import { Structure } from './structure'
import type { Summary } from './summary'
import { addSummary } from './add-summary'
import { Typesetter } from '@/lib/typesetting/typesetter'
import { describeFile } from '@/lib/typesetting/describe-file'

/** One student's script to hand back. `builtAt` is written into the file, so that the same script built again is the same file. */
export type ScriptToReturn = Readonly<{
  /** Null for a copy of the pages alone, named `title`. */
  summary: Summary | null
  title?: string
  pages: readonly ScriptPage[]
  builtAt: Date
  /** Who marked what and when: the marking then lies over the pages as annotations that other programs list, for staff. */
  signing?: Signing | null
}>
/** Sheaves as loaded once for all students, by the name that pages give. */
export type LoadedSheaves = ReadonlyMap<string, PDFDocument>

/** Loads a sheaf for building; do it once for all its students. Throws what pdf-lib throws on a file it cannot read. */
export async function loadSheaf(bytes: Uint8Array): Promise<PDFDocument> {
  return PDFDocument.load(bytes, { updateMetadata: false, throwOnInvalidObject: false })
}

/**
 * The returned script of one student as PDF bytes: the summary, then the student's own pages with their images byte for byte and the
 * marking over them as vectors. Nothing else of a sheaf gets in: no other student's image, no metadata, attachments, annotations or
 * actions. Throws sheaf_missing, not_found for a page the sheaf has not, page_shared and page_unreadable.
 */
export async function buildReturnedScript(sheaves: LoadedSheaves, { summary, title, pages, builtAt, signing = null }: ScriptToReturn): Promise<Uint8Array> {
  const pdf = await PDFDocument.create({ updateMetadata: false })
  describeFile(pdf, title ?? (summary ? `${summary.title}, ${summary.student}` : ''), builtAt)
  const type = await Typesetter.for(pdf.context)
  const structure = new Structure()
  addScript({ pdf, type, shapes: new Shapes(pdf.context), structure, signing }, sheaves, { summary, pages })
  addOutline(pdf, pdf.getPages().map(({ ref }, k) => ({ says: bookmarkOf(k - (pdf.getPageCount() - pages.length)), page: ref })))
  structure.store(pdf)
  await type.embed()
  const file = new StreamedFile(pdf)
  return Buffer.concat([file.begin(), ...file.end()])
}

/** Adds one script to a file: its summary, where there is one, and its pages. Throws as above. */
export function addScript(file: FileInWork, sheaves: LoadedSheaves, { summary, pages }: Pick<ScriptToReturn, 'summary' | 'pages'>): void {
  if (summary) addSummary(file, summary, pages.length)
  const copiers = new Map<PDFDocument, ObjectCopier>()
  for (const page of pages) {
    const source = sheafOf(sheaves, page)
    const copier = copiers.get(source) ?? new ObjectCopier(source.context, file.pdf.context)
    copiers.set(source, copier)
    addReturnedPage(file, source, page, copier)
  }
}

function bookmarkOf(page: number): string {
  return page < 0 ? 'Summary' : `Page ${page + 1}`
}

function sheafOf(sheaves: LoadedSheaves, { sheaf, index }: ScriptPage): PDFDocument {
  const source = sheaves.get(sheaf)
  if (!source) throw new AppError('sheaf_missing')
  if (index < 0 || index >= source.getPageCount()) throw new AppError('not_found', { page: index + 1 })
  return source
}
