import { PdfRef, isDict, isList, type PdfValue } from './value'

/** A value as it is written in a file. Streams are written by their holders. */
export function writeValue(value: PdfValue): Buffer {
  return Buffer.from(text(value), 'latin1')
}

function text(value: PdfValue): string {
  if (value instanceof PdfRef) return `${value.number} ${value.generation} R`
  if (value instanceof Uint8Array) return `<${Buffer.from(value).toString('hex')}>`
  if (isList(value)) return `[${value.map(text).join(' ')}]`
  if (isDict(value)) return `<<${[...value].map(([key, item]) => `${name(key)} ${text(item)}`).join('\n')}>>`
  if (typeof value === 'string') return name(value)
  if (typeof value === 'number') return number(value)
  return value === null || typeof value === 'object' ? 'null' : String(value)
}

function name(plain: string): string {
  return `/${plain.replace(/[^!$&'*+,\-.0-9:;=?@A-Z\\^_`a-z|~]/g, (c) => `#${c.charCodeAt(0).toString(16).padStart(2, '0')}`)}`
}

/** Never with an exponent, which no reader of PDF knows. */
function number(value: number): string {
  return Number.isInteger(value) && Math.abs(value) < 1e15 ? String(value) : value.toFixed(6)
}

/** A whole file, in pieces, of objects by number; 1 is the catalog. */
export function writePdf(objects: ReadonlyMap<number, readonly Uint8Array[]>): Uint8Array[] {
  const out: Uint8Array[] = []
  let size = 0
  const add = (part: Uint8Array) => {
    out.push(part)
    size += part.length
  }
  const line = (words: string) => add(Buffer.from(words, 'latin1'))
  const starts = new Map<number, number>()
  line('%PDF-1.7\n%\xe2\xe3\xcf\xd3\n')
  for (const [number, parts] of objects) {
    starts.set(number, size)
    line(`${number} 0 obj\n`)
    parts.forEach(add)
    line('\nendobj\n')
  }
  const last = Math.max(...starts.keys())
  const startxref = size
  const entries = Array.from({ length: last }, (_, k) => starts.has(k + 1) ? `${String(starts.get(k + 1)).padStart(10, '0')} 00000 n \n` : '0000000000 00000 f \n')
  line(`xref\n0 ${last + 1}\n0000000000 65535 f \n${entries.join('')}trailer\n<</Root 1 0 R /Size ${last + 1}>>\nstartxref\n${startxref}\n%%EOF\n`)
  return out
}
