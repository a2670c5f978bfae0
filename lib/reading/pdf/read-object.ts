import type { FileWindow } from './file-window'
import { Malformed, PdfRef, PdfStream, isDict, type PdfDict, type PdfValue } from './value'
import { RanOut, ValueParser } from './value-parser'

const windows = [2048, 64 << 10, 2 << 20, 32 << 20]
const lineEnd = Buffer.from('\n')

/** An object as it stands in the file. */
export type FileObject = Readonly<{ number: number; generation: number; value: PdfValue }>
export type ReadOptions = Readonly<{
  /** Follows a reference to a stream's length. */
  length: (ref: PdfRef) => PdfValue
  /** Deciphers strings. */
  clear?: (bytes: Uint8Array, number: number, generation: number) => Uint8Array
}>

/** Calls `parse` with a parser at `at`, on more and more of the file as long as it runs out of bytes. Throws Malformed. */
export function parseAt<T>(file: FileWindow, at: number, parse: (parser: ValueParser) => T, clear?: (bytes: Uint8Array) => Uint8Array): T {
  if (!(at >= 0 && at < file.size)) throw new Malformed('outside the file')
  for (const length of windows) {
    const bytes = file.read(at, length)
    const last = at + bytes.length >= file.size
    try {
      return parse(new ValueParser(last ? Buffer.concat([bytes, lineEnd]) : bytes, 0, clear))
    } catch (error) {
      if (!(error instanceof RanOut) || last) throw error
    }
  }
  throw new Malformed('too long')
}

/** Reads the object that begins at `at` (its number first). A stream's bytes are not read. Throws Malformed. */
export function readObject(file: FileWindow, at: number, { length, clear }: ReadOptions): FileObject {
  let [number, generation] = [0, 0]
  return parseAt(file, at, (parser) => {
    number = parser.whole()
    generation = parser.whole()
    parser.expect('obj')
    const value = parser.value()
    if (!isDict(value)) return { number, generation, value }
    parser.skipSpace()
    const data = streamStart(parser)
    return { number, generation, value: data === null ? value : streamOf(file, value, number, generation, at + data, length) }
  }, clear && ((bytes) => clear(bytes, number, generation)))
}

/** Where a stream's bytes begin, in the parser's bytes; null when no stream follows. */
function streamStart(parser: ValueParser): number | null {
  const { bytes } = parser
  if (bytes[parser.at] !== 0x73) return null
  parser.expect('stream')
  if (parser.at + 1 >= bytes.length) throw new RanOut()
  if (bytes[parser.at] === 13) return bytes[parser.at + 1] === 10 ? parser.at + 2 : parser.at + 1
  return bytes[parser.at] === 10 ? parser.at + 1 : parser.at
}

function streamOf(file: FileWindow, dict: PdfDict, number: number, generation: number, at: number, follow: ReadOptions['length']): PdfStream {
  const said = dict.get('Length')
  const length = said instanceof PdfRef ? follow(said) : said
  if (typeof length === 'number' && length >= 0 && at + length <= file.size && endsAt(file, at + length)) return new PdfStream(dict, number, generation, at, Math.floor(length))
  // the length said is wrong or lost: up to the word that ends it, or what is left of the file
  const end = file.find('endstream', at)
  return new PdfStream(dict, number, generation, at, (end < 0 ? file.size : withoutLineEnd(file, end)) - at, end < 0)
}

function endsAt(file: FileWindow, at: number): boolean {
  return /^\s*endstream/.test(file.read(at, 16).toString('latin1'))
}
function withoutLineEnd(file: FileWindow, end: number): number {
  const [a, b] = file.read(end - 2, 2)
  return b === 10 ? end - (a === 13 ? 2 : 1) : b === 13 ? end - 1 : end
}
