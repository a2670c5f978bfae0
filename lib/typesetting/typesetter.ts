import { CustomFontSubsetEmbedder, PDFDict, type PDFContext, type PDFRef } from 'pdf-lib'
import { filesOf, fontOfFile, type Face, type FontFile } from './font-files'

/** A stretch of type from one font: its resource name, glyph codes in hex, its width at size 1, and the text where the glyphs do not say it. */
export type Run = Readonly<{ font: string; codes: string; width: number; means: string | null }>
type Used = Readonly<{ name: string; ref: PDFRef; embedder: CustomFontSubsetEmbedder }>
type Found = Readonly<{ file: FontFile; text: string; means: string | null }>

/** Shown for a letter that no face has. */
const unknownLetter = '□'
const lastFile = filesOf.sans.at(-1)!

/** Sets type in one PDF: finds a font for each letter, and at the end puts into the file the glyphs that were used and no others. */
export class Typesetter {
  private readonly used = new Map<FontFile, Used>()
  private readonly widths = new Map<string, number>()

  private constructor(
    private readonly context: PDFContext,
    private readonly embedders: ReadonlyMap<FontFile, CustomFontSubsetEmbedder>,
  ) {}

  static async for(context: PDFContext): Promise<Typesetter> {
    const embedders = new Map<FontFile, CustomFontSubsetEmbedder>()
    for (const file of new Set(Object.values(filesOf).flat())) {
      const font = fontOfFile(file)
      embedders.set(file, await CustomFontSubsetEmbedder.for({ create: () => font }, new Uint8Array(), `${subsetTag(embedders.size)}+${font.postscriptName}`))
    }
    return new Typesetter(context, embedders)
  }

  /** The runs of a text, drawn one after another. Never throws: what no face has becomes a box that still reads as the letter. */
  runs(text: string, face: Face): Run[] {
    return this.stretches(text, face).map(({ file, text, means }) => {
      const { name, embedder } = this.use(file)
      const codes = embedder.encodeText(text).toString().slice(1, -1)
      return { font: name, codes, width: this.stretchWidth(file, text), means }
    })
  }

  /** The width of a text in points. */
  width(text: string, face: Face, size: number): number {
    const key = `${face} ${text}`
    const known = this.widths.get(key)
    if (known !== undefined) return known * size
    const width = this.stretches(text, face).reduce((sum, { file, text }) => sum + this.stretchWidth(file, text), 0)
    this.widths.set(key, width)
    return width * size
  }

  /** Breaks a text at spaces into lines no wider than `room` points, and inside a word only where it is wider than that. */
  lines(text: string, face: Face, size: number, room: number): string[] {
    const lines: string[] = []
    let line = ''
    for (const word of text.trim().split(/\s+/).flatMap((word) => this.pieces(word, face, size, room))) {
      const longer = line === '' ? word : `${line} ${word}`
      const full = line !== '' && this.width(longer, face, size) > room
      if (full) lines.push(line)
      line = full ? word : longer
    }
    return line === '' ? lines : [...lines, line]
  }

  /** The fonts used so far, as a page's resources name them. */
  resources(): PDFDict {
    const fonts = PDFDict.withContext(this.context)
    for (const { name, ref } of this.used.values()) fonts.set(this.context.obj(name), ref)
    return fonts
  }

  /** Puts the used glyphs into the file. Call once, after the last run. */
  async embed(): Promise<void> {
    for (const { embedder, ref } of this.used.values()) await embedder.embedIntoContext(this.context, ref)
  }

  private pieces(word: string, face: Face, size: number, room: number): string[] {
    if (this.width(word, face, size) <= room) return [word]
    const cut: string[] = ['']
    for (const letter of word) {
      if (cut.at(-1) !== '' && this.width(cut.at(-1) + letter, face, size) > room) cut.push('')
      cut.push(cut.pop() + letter)
    }
    return cut
  }

  private use(file: FontFile): Used {
    const known = this.used.get(file)
    if (known) return known
    const used = { name: `Sf${this.used.size + 1}`, ref: this.context.nextRef(), embedder: this.embedders.get(file)! }
    this.used.set(file, used)
    return used
  }

  private stretchWidth(file: FontFile, text: string): number {
    return this.embedders.get(file)!.widthOfTextAtSize(text, 1)
  }

  /** Letters that share a font, together. A letter spelt with parts is put together first, and taken apart when no face has it whole. */
  private stretches(text: string, face: Face): Found[] {
    const stretches: Found[] = []
    for (const letter of text.normalize('NFC').replace(/\s/g, ' ').replace(/\p{Cc}/gu, '')) {
      const found = find(letter, face)
      const last = stretches.at(-1)
      if (last && last.file === found.file && last.means === null && found.means === null) {
        stretches[stretches.length - 1] = { ...last, text: last.text + found.text }
      } else stretches.push(found)
    }
    return stretches
  }
}

/** The six capitals that mark a font name as a subset's, different for each font of a file. */
function subsetTag(k: number): string {
  return `SHEAF${String.fromCharCode(65 + k)}`
}

const places = new Map<string, Found>()

function find(letter: string, face: Face): Found {
  const key = `${face} ${letter}`
  const known = places.get(key)
  if (known) return known
  const found = inOneFile(letter, letter, face) ?? inOneFile(letter.normalize('NFKC'), letter, face) ?? { file: lastFile, text: unknownLetter, means: letter }
  // Only for letters that have a font: their number is bounded by the fonts, what people type is not.
  if (found.text !== unknownLetter) places.set(key, found)
  return found
}

function inOneFile(text: string, letter: string, face: Face): Found | null {
  const file = filesOf[face].find((file) => [...text].every((part) => fontOfFile(file).hasGlyphForCodePoint(part.codePointAt(0)!)))
  return file ? { file, text, means: text === letter ? null : letter } : null
}
