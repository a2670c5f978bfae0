import { PDFHexString, PDFName, PDFString, type PDFDict, type PDFDocument, type PDFPage, type PDFRef } from 'pdf-lib'
import { boundsOf, penColour, pointsOn, type Ink } from '@/lib/core/ink'
import { corners, toPixels, type Homography } from '@/lib/core/paper-space'
import { num, packedForm } from '@/lib/typesetting/operators'
import { paintInk, type Drawing, type Drawn, type Painting } from './paint-ink'

/** Who put a drawing on the page, and when. */
export type Signing = (of: Drawn) => Readonly<{ author: string; at: Date }>

type Subtype = 'Stamp' | 'Ink' | 'FreeText'
type Box = readonly [number, number, number, number]
/** Print (ISO 32000-1, table 165). */
const printed = 4
/** Room round the ink, in points: type may be a little wider than the design's own widths say. */
const room = 3

const lines = new Set<Drawn['kind']>(['pen', 'underline', 'wavy', 'ring'])
const written = new Set<Drawn['kind']>(['note', 'code', 'caret', 'seen', 'nothing-written'])
const standing: Partial<Record<Drawn['kind'], string>> = { seen: 'seen', 'nothing-written': 'nr' }

/**
 * Lays the marking of a page over it as annotations (ISO 32000-1, 12.5.6: Stamp, Ink, FreeText), each with its own picture, author and
 * date. The pictures are drawn in the page's user space by the one painter of ink, so they lie exactly where drawn marking lies.
 * `toPage` takes paper points to user space.
 */
export function addAnnotations(pdf: PDFDocument, page: PDFPage, drawings: readonly Drawing[], toPage: Homography, painting: Painting, signing: Signing): void {
  const resources = pdf.context.nextRef()
  const annotations = drawings.flatMap(({ of, ...drawing }) => {
    const box = of && boxOf(drawing.inks, toPage)
    return box ? [annotation(pdf, page, { of, ...drawing }, { box, resources, toPage, painting, signing })] : []
  })
  pdf.context.assign(resources, pdf.context.obj({ Font: painting.type.resources(), XObject: painting.shapes.resources() }))
  page.node.set(PDFName.of('Annots'), pdf.context.obj(annotations))
}

type Laid = Readonly<{ box: Box; resources: PDFRef; toPage: Homography; painting: Painting; signing: Signing }>

function annotation({ context }: PDFDocument, page: PDFPage, { of, ...drawing }: Drawing & { of: Drawn }, { box, resources, toPage, painting, signing }: Laid): PDFRef {
  const { author, at } = signing(of)
  const subtype = subtypeOf(of)
  const look = packedForm(context, paintInk([drawing], toPage, painting), box, resources)
  const dict: PDFDict = context.obj({
    Type: 'Annot', Subtype: subtype, Rect: [...box], P: page.ref, F: printed, NM: PDFHexString.fromText(of.id), T: PDFHexString.fromText(author),
    Subj: PDFHexString.fromText(of.label === null ? 'Page' : `Question ${of.label}`), Contents: PDFHexString.fromText(subtype === 'FreeText' ? of.text || standing[of.kind] || of.says : of.says),
    M: PDFString.fromDate(at), CreationDate: PDFString.fromDate(at), C: rgb(penColour[drawing.pen]), Border: [0, 0, 0], AP: { N: look },
  })
  if (subtype === 'Stamp') dict.set(PDFName.of('Name'), PDFName.of(of.kind))
  if (subtype === 'Ink') dict.set(PDFName.of('InkList'), context.obj(inkList(drawing.inks, toPage)))
  if (subtype === 'FreeText') dict.set(PDFName.of('DA'), PDFString.of(`/Helv 10 Tf ${rgb(penColour[drawing.pen]).map(num).join(' ')} rg`))
  return context.register(dict)
}

/** Free text wherever there are words, ink for lines by hand, a stamp for everything else. */
function subtypeOf({ kind, text }: Drawn): Subtype {
  if (lines.has(kind)) return 'Ink'
  return written.has(kind) && (text !== '' || standing[kind] !== undefined) ? 'FreeText' : 'Stamp'
}

/** The box round some ink on the page: least x, least y, most x, most y in user space. */
function boxOf(inks: readonly Ink[], toPage: Homography): Box | null {
  const bounds = boundsOf(inks)
  if (!bounds) return null
  const at = corners(bounds).map((corner) => toPixels(toPage, corner))
  const xs = at.map(({ x }) => x)
  const ys = at.map(({ y }) => y)
  return [Math.min(...xs) - room, Math.min(...ys) - room, Math.max(...xs) + room, Math.max(...ys) + room]
}

function inkList(inks: readonly Ink[], toPage: Homography): number[][] {
  return inks.flatMap((ink) => (ink.kind === 'line' ? [pointsOn(ink.path).flatMap((point) => {
    const { x, y } = toPixels(toPage, point)
    return [x, y]
  })] : []))
}

function rgb(hex: string): number[] {
  return [1, 3, 5].map((at) => parseInt(hex.slice(at, at + 2), 16) / 255)
}
