import { contentTokens } from './content-tokens'
import { imagePixels } from './image-pixels'
import { contentOf, type PageSource } from './page-source'
import { decodeFilters, pictureFilters } from './pdf/decode-filters'
import type { PdfFile } from './pdf/pdf-file'
import { Incomplete, PdfRef, PdfStream, TooLarge, isDict, isList, type PdfDict, type PdfValue } from './pdf/value'
import { writePdf, writeValue } from './pdf/write-pdf'
import { mostPixels } from './sheaf-page'

const mostBytes = 300 << 20
const mostObjects = 30_000
const mostDecoded = 64 << 20
/** Operators run, pictures counted by their pixels, through all forms. A page of 600 dpi strips costs half a million. */
const mostWork = 20_000_000
const pixelsAnOperator = 100
const mostTiles = 1_000_000
const leftOut = new Set(['Metadata', 'PieceInfo', 'StructParent', 'StructParents', 'AF', 'OPI', 'Parent', 'LastModified', 'Alternates'])
const coding = new Set(['Filter', 'F', 'DecodeParms', 'DP', 'Length', 'DL', 'FFilter', 'FDecodeParms'])
const resourceKinds = new Set(['XObject', 'Font', 'Pattern', 'ColorSpace', 'ExtGState', 'Shading', 'Properties'])

/**
 * One page as a PDF of its own, in pieces: what its content draws and nothing else of the sheaf (no scripts, notes or attachments).
 * Its box is the shown one. Throws TooLarge when drawing it would take more than a page may, Incomplete where the file ends within
 * what it draws, Malformed when its content cannot be read.
 */
export function pageAlone(source: PageSource): Uint8Array[] {
  return new PageCopier(source).copy()
}

class PageCopier {
  private readonly numbers = new Map<number, number>()
  private readonly waiting: { value: PdfValue; number: number }[] = []
  private readonly objects = new Map<number, Uint8Array[]>()
  private readonly work = new Map<number, number>()
  private readonly pdf: PdfFile
  private next = 3
  private size = 0
  constructor(private readonly source: PageSource) {
    this.pdf = source.pdf
  }

  copy(): Uint8Array[] {
    const { resources, box, dict } = this.source
    const content = contentOf(this.source)
    const names = new Set<string>()
    if (this.workOf(content, resources, names, 0) > mostWork) throw new TooLarge('work')
    const contentAt = this.next++
    this.put(contentAt, [writeValue(new Map([['Length', content.length]])), streamWord, content, endWord])
    const page = new Map<string, PdfValue>([
      ['Type', 'Page'], ['Parent', new PdfRef(2, 0)], ['MediaBox', [box.left, box.bottom, box.left + box.width, box.bottom + box.height]], ['Rotate', box.turn],
      ['Contents', new PdfRef(contentAt, 0)], ['Resources', this.copied(this.used(resources, names))], ['Group', this.copied(dict.get('Group') ?? null)],
    ])
    const pageAt = this.next++
    this.put(pageAt, [writeValue(page)])
    this.put(2, [writeValue(new Map<string, PdfValue>([['Type', 'Pages'], ['Count', 1], ['Kids', [new PdfRef(pageAt, 0)]]]))])
    const root = this.pdf.dict(this.pdf.trailer.get('Root'))
    this.put(1, [writeValue(new Map<string, PdfValue>([['Type', 'Catalog'], ['Pages', new PdfRef(2, 0)], ['OCProperties', this.copied(this.pdf.get(root?.get('OCProperties')))]]))])
    for (let one = this.waiting.pop(); one; one = this.waiting.pop()) this.put(one.number, this.written(one.value))
    return writePdf(this.objects)
  }

  /** How much drawing a content costs, and by the way the names it uses. A form inside itself draws nothing. */
  private workOf(content: Uint8Array, resources: PdfDict, names: Set<string>, depth: number): number {
    const objects = this.pdf.dict(resources.get('XObject'))
    let total = 0
    let last = ''
    for (const token of contentTokens(content)) {
      if (token.kind === 'name') names.add((last = token.value))
      else if (token.kind === 'operator') total += token.value === 'Do' ? 1 + this.workOfObject(objects?.get(last), resources, names, depth) : 1
    }
    return total
  }

  private workOfObject(value: PdfValue | undefined, outer: PdfDict, names: Set<string>, depth: number): number {
    const stream = this.pdf.get(value)
    if (!(stream instanceof PdfStream)) return 0
    const known = this.work.get(stream.number)
    if (known !== undefined) return known
    this.work.set(stream.number, 0)
    const work = this.freshWork(stream, outer, names, depth)
    this.work.set(stream.number, work)
    return work
  }

  private freshWork(stream: PdfStream, outer: PdfDict, names: Set<string>, depth: number): number {
    if (stream.dict.get('Subtype') === 'Image') return this.pixelsOf(stream) / pixelsAnOperator
    if (stream.dict.get('Subtype') !== 'Form' || depth > 30) return 0
    const own = this.pdf.dict(stream.dict.get('Resources'))
    // a form without resources looks its names up on the page
    return this.workOf(this.decoded(stream), own ?? outer, own ? new Set() : names, depth + 1)
  }

  private pixelsOf(stream: PdfStream): number {
    const pixels = imagePixels(this.pdf, stream)
    if (pixels > mostPixels) throw new TooLarge('pixels')
    return pixels
  }

  private decoded(stream: PdfStream): Uint8Array {
    return this.pdf.decoded(stream, mostDecoded)
  }

  /** Of resources only what is named. */
  private used(resources: PdfDict, names: ReadonlySet<string>): PdfDict {
    return new Map([...resources].filter(([kind]) => resourceKinds.has(kind)).map(([kind, value]) => {
      const entries = this.pdf.dict(value)
      return [kind, entries ? new Map([...entries].filter(([name]) => names.has(name))) : null]
    }))
  }

  private copied(value: PdfValue): PdfValue {
    if (value instanceof PdfRef) return this.reference(value)
    if (isList(value)) return value.map((item) => this.copied(item))
    if (isDict(value)) return ['Page', 'Pages', 'Catalog'].includes(String(value.get('Type'))) ? null : new Map([...value].filter(([key]) => !leftOut.has(key)).map(([key, item]) => [key, this.copied(item)]))
    return value instanceof PdfStream ? null : value
  }

  private reference(ref: PdfRef): PdfValue {
    const known = this.numbers.get(ref.number)
    if (known !== undefined) return new PdfRef(known, 0)
    const value = this.pdf.get(ref)
    if (!(isDict(value) || isList(value) || value instanceof PdfStream)) return value
    const number = this.next++
    if (number > mostObjects) throw new TooLarge('objects')
    this.numbers.set(ref.number, number)
    this.waiting.push({ value, number })
    return new PdfRef(number, 0)
  }

  private written(value: PdfValue): Uint8Array[] {
    return value instanceof PdfStream ? this.stream(value) : [writeValue(this.copied(value))]
  }

  private stream(stream: PdfStream): Uint8Array[] {
    const { dict } = stream
    const isImage = dict.get('Subtype') === 'Image'
    if (stream.broken) throw new Incomplete('stream')
    if (isImage) this.pixelsOf(stream)
    if (dict.has('PatternType') && this.tiles(dict) > mostTiles) throw new TooLarge('tiles')
    const { bytes, filter } = isImage ? this.picture(stream) : { bytes: this.decoded(stream), filter: [] }
    const kept = [...dict].filter(([key]) => !leftOut.has(key) && !coding.has(key) && key !== 'Resources')
    const own = this.pdf.dict(dict.get('Resources'))
    const entries: [string, PdfValue][] = [...kept.map(([key, value]): [string, PdfValue] => [key, this.copied(value)]), ...filter, ['Length', bytes.length]]
    if (own) {
      const names = new Set<string>()
      this.workOf(bytes, own, names, 0)
      entries.push(['Resources', this.copied(dict.has('CharProcs') ? own : this.used(own, names))])
    }
    return [writeValue(new Map(entries)), streamWord, bytes, endWord]
  }

  /** How often a pattern may have to be laid to cover the page. One that says no step is without end to the engine. */
  private tiles(pattern: PdfDict): number {
    const [a = 1, b = 0, c = 0, d = 1] = this.pdf.list(pattern.get('Matrix')).map((value) => this.pdf.number(value) ?? 0)
    const step = ['XStep', 'YStep'].map((key) => this.pdf.number(pattern.get(key)) ?? 0)
    const { width, height } = this.source.box
    return (width * height) / Math.max(1e-9, Math.abs(step[0]! * step[1]! * (a * d - b * c)))
  }

  /** An image's bytes as they are coded, without general filters around a picture's own. */
  private picture(stream: PdfStream): { bytes: Uint8Array; filter: [string, PdfValue][] } {
    const filters = this.pdf.filters(stream.dict)
    const last = filters.at(-1)
    if (!last) return { bytes: this.pdf.coded(stream), filter: [] }
    const outer = filters.slice(0, -1)
    const bytes = outer.length > 0 ? decodeFilters(this.pdf.coded(stream), outer, mostBytes) : this.pdf.coded(stream)
    const known = pictureFilters.has(last.name) || last.name === 'FlateDecode' || last.name === 'RunLengthDecode' || last.name === 'LZWDecode'
    if (!known) return { bytes: decodeFilters(bytes, [last], mostBytes), filter: [] }
    const parms = last.parms ? this.parms(stream, filters.length) : null
    return { bytes, filter: [['Filter', last.name], ...(parms ? [['DecodeParms', this.copied(parms)] as [string, PdfValue]] : [])] }
  }

  /** The last filter's parameters as written, references and all: shared symbols of JBIG2 are a stream. */
  private parms(stream: PdfStream, count: number): PdfDict | null {
    const value = this.pdf.get(stream.dict.get('DecodeParms') ?? stream.dict.get('DP'))
    return this.pdf.dict(isList(value) ? value[count - 1] : value)
  }

  private put(number: number, parts: Uint8Array[]): void {
    for (const part of parts) this.size += part.length
    if (this.size > mostBytes) throw new TooLarge('page')
    this.objects.set(number, parts)
  }
}

const streamWord = Buffer.from('\nstream\n')
const endWord = Buffer.from('\nendstream')
