import { PDFName, type PDFDocument, type PDFPage } from 'pdf-lib'
import type { Homography } from '@/lib/core/paper-space'
import type { Face } from '@/lib/typesetting/font-files'
import { actualText, colour, num, packed, place } from '@/lib/typesetting/operators'
import { paintInk, type Drawing } from './paint-ink'
import type { Shapes } from './shapes'
import { Structure } from './structure'
import type { Typesetter } from '@/lib/typesetting/typesetter'

/** A4 in points. */
export const sheetSize = { width: 595.28, height: 841.89 }
/** The design's inks on paper. */
export const ink = { text: '#17233F', soft: '#4B5771', rule: '#C6D2E0', edge: '#76849C' } as const

/** How type is set: face, size in points, colour. */
export type Style = Readonly<{ face: Face; size: number; colour: string }>

/** What sheets of one file are drawn with. */
export type SheetFile = Readonly<{ pdf: PDFDocument; type: Typesetter; shapes: Shapes; structure: Structure }>

/** One page that is drawn from the top left, y down, in points. Finish it once all is drawn. */
export class Sheet {
  readonly page: PDFPage
  private readonly operators: string[] = []

  constructor(private readonly file: SheetFile) {
    this.page = file.pdf.addPage([sheetSize.width, sheetSize.height])
  }

  get type(): Typesetter {
    return this.file.type
  }

  get structure(): Structure {
    return this.file.structure
  }

  /** One line of type as a piece of the open element. Returns its width. */
  line(words: string, x: number, baseline: number, style: Style, anchor: 'start' | 'end' = 'start'): number {
    const width = this.type.width(words, style.face, style.size)
    if (words !== '') this.operators.push(this.structure.piece(this.page, this.typed(words, anchor === 'end' ? x - width : x, baseline, style)))
    return width
  }

  /** A line of type that is no part of the reading order. */
  aside(words: string, x: number, baseline: number, style: Style, anchor: 'start' | 'end' = 'start'): void {
    const left = anchor === 'end' ? x - this.type.width(words, style.face, style.size) : x
    this.operators.push(Structure.decoration(this.typed(words, left, baseline, style)))
  }

  rule(x: number, y: number, toX: number, toY: number, hex: string, width = 0.75): void {
    this.operators.push(Structure.decoration(`${colour(hex, 'line')} [] 0 d 0 J ${num(width)} w ${this.at(x, y)} m ${this.at(toX, toY)} l S`))
  }

  /** A small open circle about a point, read as `says`. */
  circle(x: number, y: number, radius: number, says: string): void {
    const k = 0.5523 * radius
    const arc = (x1: number, y1: number, x2: number, y2: number, x3: number, y3: number): string => `${this.at(x + x1, y + y1)} ${this.at(x + x2, y + y2)} ${this.at(x + x3, y + y3)} c`
    const path = [arc(radius, k, k, radius, 0, radius), arc(-k, radius, -radius, k, -radius, 0), arc(-radius, -k, -k, -radius, 0, -radius), arc(k, -radius, radius, -k, radius, 0)]
    const shown = `${colour(ink.soft, 'line')} 1 w ${this.at(x + radius, y)} m ${path.join(' ')} S`
    this.operators.push(this.structure.piece(this.page, actualText(says, shown)))
  }

  /** Stamps as on a script, `scale` times their size, their origin at (x, y), read as `says`. */
  stamps(drawings: readonly Drawing[], x: number, y: number, scale: number, says: string): void {
    const map: Homography = [[scale, 0, x], [0, -scale, sheetSize.height - y], [0, 0, 1]]
    this.operators.push(this.structure.piece(this.page, actualText(says, paintInk(drawings, map, this.file))))
  }

  /** Writes the page. */
  finish(): void {
    const { context } = this.file.pdf
    this.page.node.set(PDFName.of('Contents'), packed(context, this.operators.join('\n')))
    this.page.node.set(PDFName.of('Resources'), context.obj({ Font: this.type.resources(), XObject: this.file.shapes.resources() }))
    this.page.node.set(PDFName.of('Tabs'), PDFName.of('S'))
  }

  private typed(words: string, x: number, baseline: number, { face, size, colour: hex }: Style): string {
    let left = x
    const parts = this.type.runs(words, face).map(({ font, codes, width, means }) => {
      const shown = `/${font} ${num(size)} Tf 1 0 0 1 ${this.at(left, baseline)} Tm <${codes}> Tj`
      left += width * size
      return actualText(means, shown)
    })
    return `${colour(hex, 'fill')} BT ${parts.join(' ')} ET`
  }

  private at(x: number, y: number): string {
    return `${place(x)} ${place(sheetSize.height - y)}`
  }
}
