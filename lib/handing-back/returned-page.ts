import { PDFArray, PDFContext, PDFDict, PDFName, PDFNumber, type PDFDocument, type PDFObject, type PDFPage } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import type { ImagePart } from '@/lib/core/leaf'
import { compose, turnOf, type Homography } from '@/lib/core/paper-space'
import { addAnnotations, type Signing } from './add-annotations'
import { readContent } from './content-reader'
import { ObjectCopier } from './object-copier'
import { packed } from '@/lib/typesetting/operators'
import { pageContent } from './own-resources'
import { paintInk, type Drawing } from './paint-ink'
import { pageBox, pixelsToPage, type ImageSize } from './picture-place'
import type { Shapes } from './shapes'
import type { Structure } from './structure'
import type { Typesetter } from '@/lib/typesetting/typesetter'

/** A page of a script as it came in and what was marked on it. */
export type ScriptPage = Readonly<{
  /** Which of the builder's sheaves, and the page in it, counted from 0. */
  sheaf: string
  index: number
  /** Set where two paper pages share one picture of the sheaf. */
  half?: 0 | 1 | undefined
  /** The page's own part of such a picture, in pixels; homography and image size speak of this part. Null where it is not known. */
  part?: ImagePart | null
  /** Paper points to pixels of the stored image; null for a page that carries no marks and reads as it lies. */
  homography: Homography | null
  image: ImageSize
  /** In paper points, in drawing order. */
  drawings: readonly Drawing[]
  /** The page and its marking in words, for readers who cannot see it. */
  words: string
}>

/** A file that is being built: what all its pages share. With `signing` the marking lies over the pages as annotations and is not drawn into them. */
export type FileInWork = Readonly<{ pdf: PDFDocument; type: Typesetter; shapes: Shapes; structure: Structure; signing: Signing | null }>

/**
 * Adds a page of a sheaf to a returned script: its own content and images untouched, byte for byte, the marking drawn over them, turned
 * so that the paper reads upright. Throws page_shared where the picture also shows another page, page_unreadable for content in a coding
 * that cannot be looked through.
 */
export function addReturnedPage({ pdf, type, shapes, structure, signing }: FileInWork, source: PDFDocument, page: ScriptPage, copier: ObjectCopier): void {
  if (page.half !== undefined) throw new AppError('page_shared', { page: page.index + 1 })
  const from = source.getPage(page.index)
  const content = readable(from, page.index)
  const to = pdf.addPage([from.getMediaBox().width, from.getMediaBox().height])
  copyFrame(from, to, copier)
  const resources = copier.copyResources(content, from.node.Resources())
  const toPage = page.homography && compose(pixelsToPage(from, content, page.image), page.homography)
  to.node.set(PDFName.of('Rotate'), PDFNumber.of(toPage ? uprightTurn(toPage) : from.getRotation().angle))
  const ink = toPage && !signing ? paintInk(page.drawings, toPage, { type, shapes }) : ''
  structure.within('Figure', () => drawOver(pdf, to, from, copier, content, ink, structure), page.words)
  if (toPage && signing) addAnnotations(pdf, to, page.drawings, toPage, { type, shapes }, signing)
  for (const [kind, added] of [['Font', type.resources()], ['XObject', shapes.resources()]] as const) {
    const own = resources.lookup(PDFName.of(kind))
    // A name that stands for two things would show the wrong one: such a page is one of our own files that came in as a scan.
    if (ink !== '' && own instanceof PDFDict && own.keys().some((name) => added.has(name))) throw new AppError('page_unreadable', { page: page.index + 1 })
    resources.set(PDFName.of(kind), withOwn(own, added))
  }
  to.node.set(PDFName.of('Resources'), resources)
}

/** Whether a page of a loaded sheaf can be taken over as it is, with all that it draws. */
export function canTakeOver(source: PDFDocument, index: number): boolean {
  try {
    const page = source.getPage(index)
    const scratch = PDFContext.create()
    new ObjectCopier(source.context, scratch).copyResources(pageContent(page.node.Contents()), page.node.Resources())
    return true
  } catch {
    return false
  }
}

function readable(page: PDFPage, index: number): Uint8Array {
  try {
    return pageContent(page.node.Contents())
  } catch {
    throw new AppError('page_unreadable', { page: index + 1 })
  }
}

/** The page's boxes and unit; boxes may be inherited, so they are set outright. */
function copyFrame(from: PDFPage, to: PDFPage, copier: ObjectCopier): void {
  const media = from.getMediaBox()
  to.setMediaBox(media.x, media.y, media.width, media.height)
  const box = pageBox(from)
  to.setCropBox(box.x, box.y, box.w, box.h)
  for (const name of ['UserUnit', 'Group']) {
    const value = from.node.get(PDFName.of(name))
    const copy = value && copier.copy(value)
    if (copy) to.node.set(PDFName.of(name), copy)
  }
}

/** The /Rotate that shows the paper's own top at the top: PDF's y runs up, so the map is turned over before it is asked. */
function uprightTurn(toPage: Homography): number {
  return turnOf(compose([[1, 0, 0], [0, -1, 0], [0, 0, 1]], toPage), { x: 250, y: 350 })
}

/** The page's own streams as they are, kept apart by q and Q, then the ink. */
function drawOver(pdf: PDFDocument, to: PDFPage, from: PDFPage, copier: ObjectCopier, content: Uint8Array, ink: string, structure: Structure): void {
  const { opened, missing } = balance(content)
  const opening = structure.opening(to)
  // A page with marked pieces of its own keeps their numbers, which mean nothing here; only the ink is a piece then.
  const inkOnly = Buffer.from(content).includes('/MCID')
  const before = packed(pdf.context, `${inkOnly ? '' : opening} ${'q '.repeat(1 + missing)}\n`)
  const after = packed(pdf.context, `\n${'Q '.repeat(1 + opened)}\n${inkOnly ? opening : ''} ${ink} EMC`)
  const streams = from.node.Contents()
  const originals = streams instanceof PDFArray ? streams.asArray() : [from.node.get(PDFName.of('Contents'))].filter((one) => one !== undefined)
  const copies = originals.flatMap((original) => copier.copy(original) ?? [])
  to.node.set(PDFName.of('Contents'), pdf.context.obj([before, ...copies, after]))
}

/** How many q a page leaves open, and how many Q it has too many. */
function balance(content: Uint8Array): { opened: number; missing: number } {
  let depth = 0
  let lowest = 0
  for (const { operator } of readContent(content)) {
    depth += operator === 'q' ? 1 : operator === 'Q' ? -1 : 0
    lowest = Math.min(lowest, depth)
  }
  return { opened: depth - lowest, missing: -lowest }
}

function withOwn(own: PDFObject | undefined, added: PDFDict): PDFDict {
  if (own instanceof PDFDict) for (const [name, value] of own.entries()) added.set(name, value)
  return added
}
