import { decodeFilters, filtersOf } from './decode-filters'
import type { FileWindow } from './file-window'
import { parseAt, readObject } from './read-object'
import { Malformed, PdfStream, isDict, isList, type PdfDict, type PdfValue } from './value'
import type { ValueParser } from './value-parser'
import { XrefTable } from './xref-table'

const mostTables = 1000
const mostBytes = 64 << 20

/** Reads the table of the file's objects as it is written: tables, streams, both, and all that lie before them. Throws Malformed. */
export function readXref(file: FileWindow): XrefTable {
  const table = new XrefTable()
  const shift = headerAt(file)
  const waiting = [startOf(file)]
  const seen = new Set<number>()
  for (let at = waiting.shift(); at !== undefined; at = waiting.shift()) {
    if (seen.has(at) || seen.size > mostTables) continue
    seen.add(at)
    const trailer = readOne(file, at + shift, table, shift)
    table.addTrailer(trailer)
    // what a hybrid file's stream says comes before older tables
    for (const key of ['XRefStm', 'Prev']) {
      const next = trailer.get(key)
      if (typeof next === 'number') waiting.push(next)
    }
  }
  if (!table.trailer.has('Root')) throw new Malformed('no root')
  return table
}

/** Some files have bytes before their header, and count from the header on. */
function headerAt(file: FileWindow): number {
  return Math.max(0, file.read(0, 1024).indexOf('%PDF-'))
}

function startOf(file: FileWindow): number {
  const from = Math.max(0, file.size - 2048)
  const tail = file.read(from, 2048).toString('latin1')
  const found = /startxref\s+(\d{1,15})/.exec(tail.slice(Math.max(0, tail.lastIndexOf('startxref'))))
  if (!found) throw new Malformed('no startxref')
  return Number(found[1])
}

function readOne(file: FileWindow, at: number, table: XrefTable, shift: number): PdfDict {
  const isTable = /^\s*xref\b/.test(file.read(at, 64).toString('latin1'))
  if (isTable) return parseAt(file, at, (parser) => readClassic(parser, table, shift))
  const { value } = readObject(file, at, { length: () => null })
  if (!(value instanceof PdfStream)) throw new Malformed('no table')
  readStream(file, value, table, shift)
  return value.dict
}

function readClassic(parser: ValueParser, table: XrefTable, shift: number): PdfDict {
  parser.expect('xref')
  const found: [number, number, number][] = []
  for (;;) {
    parser.skipSpace()
    if (parser.bytes[parser.at] === 0x74) break
    const first = parser.whole()
    const count = parser.whole()
    for (let k = 0; k < count; k++) {
      const at = parser.whole()
      const generation = parser.whole()
      parser.skipSpace()
      if (parser.word() === 'n') found.push([first + k, at, generation])
    }
  }
  parser.expect('trailer')
  const trailer = parser.value()
  if (!isDict(trailer)) throw new Malformed('no trailer')
  for (const [number, at, generation] of found) table.set(number, at > 0 ? { at: at + shift, generation } : null)
  return trailer
}

function readStream(file: FileWindow, stream: PdfStream, table: XrefTable, shift: number): void {
  const plain = (value: PdfValue | undefined): PdfValue => value ?? null
  if (stream.length > mostBytes) throw new Malformed('table too long')
  const bytes = decodeFilters(file.read(stream.at, stream.length), filtersOf(stream.dict, plain), mostBytes)
  const widths = numbersOf(stream.dict.get('W'))
  const [w0 = 0, w1 = 0, w2 = 0] = widths
  const size = stream.dict.get('Size')
  const index = stream.dict.has('Index') ? numbersOf(stream.dict.get('Index')) : [0, typeof size === 'number' ? size : 0]
  if (widths.length < 3 || widths.some((w) => w < 0 || w > 8) || w0 + w1 + w2 === 0) throw new Malformed('table widths')
  let at = 0
  const field = (width: number, otherwise: number): number => {
    if (width === 0) return otherwise
    let value = 0
    for (let k = 0; k < width; k++) value = value * 256 + bytes[at++]!
    return value
  }
  for (let k = 0; k + 1 < index.length; k += 2) {
    for (let number = index[k]!; number < index[k]! + index[k + 1]! && at + w0 + w1 + w2 <= bytes.length; number++) {
      const kind = field(w0, 1)
      const [a, b] = [field(w1, 0), field(w2, 0)]
      if (kind === 1) table.set(number, { at: a + shift, generation: b })
      else table.set(number, kind === 2 ? { inside: a, nth: b } : null)
    }
  }
}

function numbersOf(value: PdfValue | undefined): number[] {
  return isList(value) ? value.filter((item) => typeof item === 'number') : []
}
