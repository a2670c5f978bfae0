import { CustomFontSubsetEmbedder, PDFDict, type PDFContext, type PDFRef } from 'pdf-lib'
import { filesOf, fontOfFile, type Face, type FontFile } from './font-files'
import { packWithNode } from './operators'

/** A stretch of type from one font: its resource name, glyph codes in hex, its width at size 1, and the text where the glyphs do not say it. */
export type Run = Readonly<{ font: string; codes: string; width: number; means: string | null }>
type Used = Readonly<{ name: string; ref: PDFRef; embedder: CustomFontSubsetEmbedder }>
/** A letter or stretch in one font: its width at size 1. */
type Found = Readonly<{ file: FontFile; text: string; width: number; means: string | null }>

/** Shown for a letter that no face has. */
const unknownLetter = '□'
const lastFile = filesOf.sans.at(-1)!
const allFiles = [...new Set(Object.values(filesOf).flat())]
// The library's own way to one waits for fonts that are read elsewhere; these are read already, and only those that are used.
const Embedder = CustomFontSubsetEmbedder as unknown as new (font: ReturnType<typeof fontOfFile>, data: Uint8Array, name: string) => CustomFontSubsetEmbedder

/** Sets type in one PDF: finds a font for each letter, and at the end puts into the file the glyphs that were used and no others. */
export class Typesetter {
  private readonly used = new Map<FontFile, Used>()

  private constructor(private readonly context: PDFContext) {}

  static async for(context: PDFContext): Promise<Typesetter> {
    packWithNode(context)
    return new Typesetter(context)
  }

  /** The runs of a text, drawn one after another. Never throws: what no face has becomes a box that still reads as the letter. */
  runs(text: string, face: Face): Run[] {
    return stretches(text, face).map(({ file, text, width, means }) => {
      const { name, embedder } = this.use(file)
      return { font: name, codes: embedder.encodeText(text).toString().slice(1, -1), width, means }
    })
  }

  /** The width of a text in points. */
  width(text: string, face: Face, size: number): number {
    const known = widths[face].get(text)
    if (known !== undefined) return known * size
    const width = stretches(text, face).reduce((sum, { width }) => sum + width, 0)
    if (widths[face].size >= mostWidths) widths[face].clear()
    widths[face].set(text, width)
    return width * size
  }

  /** Breaks a text at spaces into lines no wider than `room` points, and inside a word only where it is wider than that. */
  lines(text: string, face: Face, size: number, room: number): string[] {
    const lines: string[] = []
    let line = ''
    let end = 0
    const space = this.width(' ', face, size)
    for (const word of text.trim().split(/\s+/).flatMap((word) => this.pieces(word, face, size, room))) {
      const width = this.width(word, face, size)
      // Letters are set one by one, so a line is as wide as its words and spaces together.
      const full = line !== '' && end + space + width > room
      if (full) lines.push(line)
      end = full || line === '' ? width : end + space + width
      line = full || line === '' ? word : `${line} ${word}`
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
    const font = fontOfFile(file)
    const embedder = new Embedder(font, new Uint8Array(), `${subsetTag(allFiles.indexOf(file))}+${font.postscriptName}`)
    const used = { name: `Sf${this.used.size + 1}`, ref: this.context.nextRef(), embedder }
    this.used.set(file, used)
    return used
  }
}

/** Letters that share a font, together. A letter spelt with parts is put together first, and taken apart when no face has it whole. */
function stretches(text: string, face: Face): Found[] {
  const stretches: { file: FontFile; text: string; width: number; means: string | null }[] = []
  for (const letter of text.normalize('NFC').replace(/\s/g, ' ').replace(/\p{Cc}/gu, '')) {
    const found = find(letter, face)
    const last = stretches.at(-1)
    if (last && last.file === found.file && last.means === null && found.means === null) {
      last.text += found.text
      last.width += found.width
    } else stretches.push({ ...found })
  }
  return stretches
}

/** The six capitals that mark a font name as a subset's, different for each font of a file. */
function subsetTag(k: number): string {
  return `SHEAF${String.fromCharCode(65 + k)}`
}

const byFace = <T>(): Readonly<Record<Face, Map<string, T>>> => ({ sans: new Map(), 'sans-strong': new Map(), 'sans-bold': new Map(), book: new Map(), 'book-italic': new Map() })
const places = byFace<Found>()
/** Widths at size 1: a class's summaries are made of the same words. Emptied when full, for people may type anything. */
const widths = byFace<number>()
const mostWidths = 5000

function find(letter: string, face: Face): Found {
  const known = places[face].get(letter)
  if (known) return known
  const found = inOneFile(letter, letter, face) ?? inOneFile(letter.normalize('NFKC'), letter, face) ?? inFile(lastFile, unknownLetter, letter)
  // Only for letters that have a font: their number is bounded by the fonts, what people type is not.
  if (found.text !== unknownLetter) places[face].set(letter, found)
  return found
}

function inOneFile(text: string, letter: string, face: Face): Found | null {
  const file = filesOf[face].find((file) => [...text].every((part) => fontOfFile(file).hasGlyphForCodePoint(part.codePointAt(0)!)))
  return file ? inFile(file, text, letter) : null
}

function inFile(file: FontFile, text: string, letter: string): Found {
  const font = fontOfFile(file)
  const width = [...text].reduce((sum, part) => sum + font.glyphForCodePoint(part.codePointAt(0)!).advanceWidth, 0) / font.unitsPerEm
  return { file, text, width, means: text === letter ? null : letter }
}
