import { Malformed, type PdfDict } from './value'

/** Undoes the predictor that a Flate or LZW stream's parameters name (PNG rows, or TIFF's of 8-bit samples). */
export function unpredict(bytes: Uint8Array, parms: PdfDict | null): Uint8Array {
  const number = (key: string, otherwise: number): number => {
    const value = parms?.get(key)
    return typeof value === 'number' ? value : otherwise
  }
  const predictor = number('Predictor', 1)
  if (predictor <= 1) return bytes
  const [colours, bits, columns] = [number('Colors', 1), number('BitsPerComponent', 8), number('Columns', 1)]
  const step = Math.max(1, (colours * bits) >> 3)
  const row = Math.ceil((colours * bits * columns) / 8)
  if (!(row >= 1 && row < 1e8 && step <= 64)) throw new Malformed('predictor')
  return predictor === 2 ? leftToRight(bytes, row, step, bits) : pngRows(bytes, row, step)
}

function leftToRight(bytes: Uint8Array, row: number, step: number, bits: number): Uint8Array {
  if (bits !== 8) throw new Malformed('predictor depth')
  const out = Uint8Array.from(bytes)
  for (let at = 0; at < out.length; at++) if (at % row >= step) out[at]! += out[at - step]!
  return out
}

function pngRows(bytes: Uint8Array, row: number, step: number): Uint8Array {
  const rows = Math.ceil(bytes.length / (row + 1))
  const out = new Uint8Array(rows * row)
  for (let r = 0; r < rows; r++) {
    const from = r * (row + 1)
    const kind = bytes[from]!
    const [to, above] = [r * row, (r - 1) * row]
    for (let k = 0; k < row && from + 1 + k < bytes.length; k++) {
      const a = k >= step ? out[to + k - step]! : 0
      const b = r > 0 ? out[above + k]! : 0
      const c = r > 0 && k >= step ? out[above + k - step]! : 0
      out[to + k] = bytes[from + 1 + k]! + (kind === 1 ? a : kind === 2 ? b : kind === 3 ? (a + b) >> 1 : kind === 4 ? paeth(a, b, c) : 0)
    }
  }
  const whole = Math.floor(bytes.length / (row + 1)) * row
  const rest = bytes.length % (row + 1)
  return out.subarray(0, whole + Math.max(0, rest - 1))
}

function paeth(a: number, b: number, c: number): number {
  const p = a + b - c
  const [pa, pb, pc] = [Math.abs(p - a), Math.abs(p - b), Math.abs(p - c)]
  return pa <= pb && pa <= pc ? a : pb <= pc ? b : c
}
