import { PDFDict, PDFName, PDFRawStream, type PDFContext, type PDFRef } from 'pdf-lib'
import { boundsOf, stepsOf, type FilledInk, type LineInk } from '@/lib/core/ink'
import { num, pack } from '@/lib/typesetting/operators'

type Packed = Readonly<{ bytes: Uint8Array; box: readonly number[] }>
type Kept = Readonly<{ name: string; ref: PDFRef }>

/** The design's outlines in one file: each lies in it once, and pages lay it where they need it. */
export class Shapes {
  private readonly kept = new Map<string, Map<string, Kept>>()

  constructor(private readonly context: PDFContext) {}

  /** The name under which an outline is laid, its origin at the ink's place; put into the file where it is new. */
  nameOf(ink: FilledInk | LineInk, data: string): string {
    const style = ink.kind === 'line' ? `${ink.width} ${ink.dash?.join(' ') ?? ''}` : ''
    const styles = this.kept.get(data) ?? new Map<string, Kept>()
    this.kept.set(data, styles)
    const known = styles.get(style)
    if (known) return known.name
    const name = `Sp${[...this.kept.values()].reduce((sum, { size }) => sum + size, 1)}`
    styles.set(style, { name, ref: this.put(packedOutline(ink, data, style)) })
    return name
  }

  /** The outlines used so far, as a page's resources name them. */
  resources(): PDFDict {
    const all = PDFDict.withContext(this.context)
    for (const styles of this.kept.values()) for (const { name, ref } of styles.values()) all.set(PDFName.of(name), ref)
    return all
  }

  private put({ bytes, box }: Packed): PDFRef {
    return this.context.register(PDFRawStream.of(this.context.obj({ Subtype: 'Form', BBox: [...box], Filter: 'FlateDecode', Length: bytes.length }), bytes))
  }
}

/** Outlines are of the design and few: each is packed once for the life of the process. */
const packed = new Map<string, Packed>()

function packedOutline(ink: FilledInk | LineInk, data: string, style: string): Packed {
  const known = packed.get(`${style} ${data}`)
  if (known) return known
  const steps = stepsOf(data, { x: 0, y: 0 })
  const path = steps.map(([letter, ...numbers]) => [...numbers.map(num), { M: 'm', L: 'l', C: 'c', Z: 'h' }[letter]].join(' ')).join(' ')
  const { x, y, w, h } = boundsOf([{ ...ink, path: steps }])!
  const operators = ink.kind === 'filled' ? `${path} f` : `${num(ink.width)} w ${ink.dash ? `[${ink.dash.map(num).join(' ')}] 0 d 0 J` : '1 J'} ${path} S`
  const found = { bytes: pack(operators), box: [x - 1, y - 1, x + w + 1, y + h + 1].map(Math.round) }
  packed.set(`${style} ${data}`, found)
  return found
}
