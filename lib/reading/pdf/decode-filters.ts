import { inflateSync, inflateRawSync, constants } from 'node:zlib'
import { lzwDecode } from './lzw-decode'
import { unpredict } from './unpredict'
import { isDict, isList, Malformed, TooLarge, type PdfDict, type PdfValue } from './value'

/** One filter of a stream with its parameters. */
export type Filter = Readonly<{ name: string; parms: PdfDict | null }>

const shortNames: Readonly<Record<string, string>> = { A85: 'ASCII85Decode', AHx: 'ASCIIHexDecode', CCF: 'CCITTFaxDecode', DCT: 'DCTDecode', Fl: 'FlateDecode', LZW: 'LZWDecode', RL: 'RunLengthDecode' }

/** The filters of a stream, outermost first. `resolve` follows references. */
export function filtersOf(dict: PdfDict, resolve: (value: PdfValue | undefined) => PdfValue): Filter[] {
  const listed = (key: string, short: string): PdfValue[] => {
    const value = resolve(dict.get(key) ?? dict.get(short))
    return isList(value) ? value.map(resolve) : value === null ? [] : [value]
  }
  const parms = listed('DecodeParms', 'DP')
  return listed('Filter', 'F').map((name, k) => {
    const own = parms[k]
    return { name: typeof name === 'string' ? (shortNames[name] ?? name) : '', parms: isDict(own) ? new Map([...own].map(([key, value]) => [key, resolve(value)])) : null }
  })
}

/** Codings of pictures, which are undone elsewhere. */
export const pictureFilters: ReadonlySet<string> = new Set(['DCTDecode', 'CCITTFaxDecode', 'JBIG2Decode', 'JPXDecode'])

/**
 * Undoes filters, at most `most` bytes at any stage. A stream that breaks off gives what there is of it.
 * Throws TooLarge, or Malformed for a filter that is none of the general ones.
 */
export function decodeFilters(coded: Uint8Array, filters: readonly Filter[], most: number): Uint8Array {
  if (filters.length > 8) throw new TooLarge('filters')
  let bytes = coded
  for (const { name, parms } of filters) {
    bytes = decodeOne(bytes, name, parms, most)
    if (bytes.length > most) throw new TooLarge('decoded stream')
  }
  return bytes
}

function decodeOne(bytes: Uint8Array, name: string, parms: PdfDict | null, most: number): Uint8Array {
  if (name === 'FlateDecode') return unpredict(inflate(bytes, most), parms)
  if (name === 'LZWDecode') return unpredict(lzwDecode(bytes, parms?.get('EarlyChange') !== 0, most), parms)
  if (name === 'ASCIIHexDecode') return hexDecode(bytes)
  if (name === 'ASCII85Decode') return ascii85Decode(bytes)
  if (name === 'RunLengthDecode') return runLengthDecode(bytes, most)
  if (name === 'Crypt') return bytes
  throw new Malformed(`filter ${name}`)
}

function inflate(bytes: Uint8Array, most: number): Uint8Array {
  const options = { maxOutputLength: most, finishFlush: constants.Z_SYNC_FLUSH }
  const tooLarge = (error: unknown) => (error as { code?: string }).code === 'ERR_BUFFER_TOO_LARGE'
  try {
    return inflateSync(bytes, options)
  } catch (error) {
    if (tooLarge(error)) throw new TooLarge('inflated')
  }
  try {
    return inflateRawSync(bytes.subarray(2), options)
  } catch (error) {
    throw tooLarge(error) ? new TooLarge('inflated') : new Malformed('inflate')
  }
}

function hexDecode(bytes: Uint8Array): Uint8Array {
  const digits = Buffer.from(bytes).toString('latin1').split('>')[0]!.replace(/[^0-9a-fA-F]/g, '')
  return Buffer.from(digits.length % 2 ? `${digits}0` : digits, 'hex')
}

function ascii85Decode(bytes: Uint8Array): Uint8Array {
  // four bytes for every z, fewer for all else
  const out = new Uint8Array(bytes.length * 4 + 4)
  let size = 0
  let value = 0
  let count = 0
  const put = (n: number) => { for (let k = 0; k < n; k++) out[size++] = Math.floor(value / 2 ** (24 - 8 * k)) & 255 }
  for (const c of bytes) {
    if (c === 0x7e) break
    if (c === 0x7a && count === 0) size += 4
    if (c < 0x21 || c > 0x75) continue
    value = value * 85 + c - 0x21
    if (++count < 5) continue
    put(4)
    value = count = 0
  }
  if (count > 1) {
    for (let k = count; k < 5; k++) value = value * 85 + 84
    put(count - 1)
  }
  return out.subarray(0, size)
}

function runLengthDecode(bytes: Uint8Array, most: number): Uint8Array {
  const parts: Uint8Array[] = []
  let size = 0
  for (let at = 0; at < bytes.length && size <= most; ) {
    const n = bytes[at++]!
    if (n === 128) break
    const part = n < 128 ? bytes.subarray(at, at + n + 1) : new Uint8Array(257 - n).fill(bytes[at] ?? 0)
    at += n < 128 ? n + 1 : 1
    size += part.length
    parts.push(part)
  }
  return Buffer.concat(parts)
}
