import { PDFDocument, PDFName, type PDFRef } from 'pdf-lib'
import type { PaperPage } from '@/lib/core/paper'
import { describeFile } from '@/lib/typesetting/describe-file'
import { packed } from '@/lib/typesetting/operators'
import { Typesetter } from '@/lib/typesetting/typesetter'
import { blankForms } from './blank-forms'
import type { CodePlace } from './code-place'
import { drawCode } from './draw-code'
import { drawNameLine } from './draw-name-line'

/** One script to print: whose it is (a spare one names nobody), and the token of each page of the paper, in order. */
export type PackScript = Readonly<{ name: string; about: string; tokens: readonly string[] }>
export type PrintPack = Readonly<{
  /** The blank paper's PDF, and the sizes of its pages as shown. */
  blank: Uint8Array
  pages: readonly PaperPage[]
  /** Where the code and its line go, page by page. */
  places: readonly CodePlace[]
  scripts: readonly PackScript[]
  /** Printed on both sides: a script with an odd number of pages gets an empty back, so that each begins on a sheet of its own. */
  twoSided: boolean
  title: string
  builtAt: Date
}>
/** What stands on a page of a pack; `script` counts from 0, `paperPage` from 1. Null is an empty back. */
export type PackPage = Readonly<{ script: number; paperPage: number }> | null

/**
 * The print pack of a class: every script's pages one after another, the paper's own drawing unchanged under a code and the student's name.
 * Throws file_locked, file_damaged and pages_differ of the blank paper.
 */
export async function buildPrintPack({ blank, pages, places, scripts, twoSided, title, builtAt }: PrintPack): Promise<Uint8Array> {
  const pdf = await PDFDocument.create({ updateMetadata: false })
  describeFile(pdf, title, builtAt, null)
  const forms = await blankForms(pdf, blank, pages)
  const type = await Typesetter.for(pdf.context)
  for (const page of packPages(scripts.length, pages.length, twoSided)) {
    if (!page) {
      pdf.addPage([pages[0]!.width, pages[0]!.height])
      continue
    }
    const k = page.paperPage - 1
    const script = scripts[page.script]!
    const height = pages[k]!.height
    const ink = `${drawCode(script.tokens[k]!, places[k]!.rect, height)}\n${drawNameLine(script, { page: page.paperPage, of: pages.length }, places[k]!, height, type)}`
    addPage(pdf, pages[k]!, forms[k]!, ink, type)
  }
  await type.embed()
  return pdf.save({ addDefaultPage: false, updateFieldAppearances: false, objectsPerTick: Infinity })
}

/** The pages of a pack in the order in which they are printed. */
export function packPages(scripts: number, pages: number, twoSided: boolean): PackPage[] {
  const backs: null[] = twoSided && pages % 2 === 1 ? [null] : []
  return Array.from({ length: scripts }, (_, script) => [...Array.from({ length: pages }, (_, k): PackPage => ({ script, paperPage: k + 1 })), ...backs]).flat()
}

function addPage(pdf: PDFDocument, { width, height }: PaperPage, form: PDFRef | null, ink: string, type: Typesetter): void {
  const page = pdf.addPage([width, height])
  page.node.set(PDFName.of('Contents'), packed(pdf.context, `${form ? 'q /Blank Do Q\n' : ''}${ink}`))
  page.node.set(PDFName.of('Resources'), pdf.context.obj({ ...(form ? { XObject: { Blank: form } } : {}), Font: type.resources() }))
}
