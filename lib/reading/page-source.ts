import type { Turn } from '@/lib/core/paper-space'
import type { PageEntry } from './page-tree'
import type { PdfFile } from './pdf/pdf-file'
import { Incomplete, PdfStream, TooLarge, type PdfDict, type PdfValue } from './pdf/value'
import type { PageBox } from './stored-frame'

/** A page with all that it draws and where. */
export type PageSource = Readonly<{ pdf: PdfFile; dict: PdfDict; resources: PdfDict; box: PageBox }>

/** A scan's page draws a picture or a few hundred; what is longer is no scan. */
const mostContent = 24 << 20
const letter = [0, 0, 612, 792] as const

/** A page's own source; null when the file has no such object. */
export function pageSource(pdf: PdfFile, { page, inherited }: PageEntry): PageSource | null {
  const own = pdf.dict(page)
  if (!own) return null
  const dict = new Map([...inherited, ...own])
  return { pdf, dict, resources: pdf.dict(dict.get('Resources')) ?? new Map(), box: boxOf(pdf, dict) }
}

/** A page's content, all its parts in one. Throws TooLarge, Incomplete, Malformed. */
export function contentOf({ pdf, dict }: PageSource): Uint8Array {
  const contents = pdf.get(dict.get('Contents'))
  const parts: Uint8Array[] = []
  let size = 0
  for (const part of contents instanceof PdfStream ? [contents] : pdf.list(contents)) {
    const stream = pdf.get(part)
    if (!(stream instanceof PdfStream)) continue
    if (stream.broken) throw new Incomplete('content')
    const bytes = pdf.decoded(stream, mostContent)
    size += bytes.length
    if (size > mostContent) throw new TooLarge('content')
    parts.push(bytes, new Uint8Array([10]))
  }
  return Buffer.concat(parts)
}

function boxOf(pdf: PdfFile, dict: PdfDict): PageBox {
  const media = rectangle(pdf, dict.get('MediaBox')) ?? [...letter]
  const crop = rectangle(pdf, dict.get('CropBox')) ?? media
  const shown = [Math.max(media[0]!, crop[0]!), Math.max(media[1]!, crop[1]!), Math.min(media[2]!, crop[2]!), Math.min(media[3]!, crop[3]!)] as const
  const [left, bottom, right, top] = shown[2] > shown[0] && shown[3] > shown[1] ? shown : (media as unknown as typeof shown)
  const unit = pdf.number(dict.get('UserUnit')) ?? 1
  const turn = Math.round((pdf.number(dict.get('Rotate')) ?? 0) / 90) * 90
  return { left, bottom, width: right - left, height: top - bottom, turn: (((turn % 360) + 360) % 360) as Turn, unit: unit > 0 && unit < 1000 ? unit : 1 }
}

function rectangle(pdf: PdfFile, value: PdfValue | undefined): number[] | null {
  const four = pdf.list(value).map((item) => pdf.number(item))
  const [a, b, c, d] = four
  if (four.length < 4 || a == null || b == null || c == null || d == null) return null
  const sorted = [Math.min(a, c), Math.min(b, d), Math.max(a, c), Math.max(b, d)]
  return sorted[2]! - sorted[0]! > 0 && sorted[3]! - sorted[1]! > 0 && sorted.every((v) => Math.abs(v) < 1e6) ? sorted : null
}
