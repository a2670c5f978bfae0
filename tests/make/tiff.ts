export type TiffPage = Readonly<{ width: number; height: number; /** G4 coded. */ strips: readonly Uint8Array[]; blackIsZero: boolean; backwards?: boolean }>

const dpi = 300
const turnedByte = (byte: number): number => Number.parseInt(byte.toString(2).padStart(8, '0').split('').reverse().join(''), 2)

/** A TIFF of G4 pages at 300 dpi, as fax-minded copiers write it: big-endian, one directory after each page's strips. */
export function tiffOf(pages: readonly TiffPage[]): Buffer {
  const parts: Buffer[] = [Buffer.from('MM\0*\0\0\0\0', 'latin1')]
  let size = 8
  let link = { part: 0, at: 4 }
  const add = (part: Buffer) => {
    parts.push(part)
    size += part.length
    return size - part.length
  }
  for (const { width, height, strips, blackIsZero, backwards = false } of pages) {
    const starts = strips.map((strip) => add(Buffer.from(backwards ? strip.map(turnedByte) : strip)))
    if (size % 2) add(Buffer.alloc(1))
    const fraction = Buffer.alloc(8)
    fraction.writeUInt32BE(dpi, 0)
    fraction.writeUInt32BE(1, 4)
    const resolution = add(fraction)
    const list = (values: readonly number[]) => (values.length === 1 ? values[0]! : add(longs(values)))
    const fields: [number, number, number, number][] = [
      [256, 4, 1, width], [257, 4, 1, height], [258, 3, 1, 1], [259, 3, 1, 4], [262, 3, 1, blackIsZero ? 1 : 0], [266, 3, 1, backwards ? 2 : 1],
      [273, 4, strips.length, list(starts)], [277, 3, 1, 1], [278, 4, 1, Math.ceil(height / strips.length)], [279, 4, strips.length, list(strips.map((strip) => strip.length))],
      [282, 5, 1, resolution], [283, 5, 1, resolution], [296, 3, 1, 2],
    ]
    const directory = Buffer.alloc(2 + fields.length * 12 + 4)
    directory.writeUInt16BE(fields.length, 0)
    fields.forEach(([tag, type, count, value], k) => {
      const at = 2 + k * 12
      directory.writeUInt16BE(tag, at)
      directory.writeUInt16BE(type, at + 2)
      directory.writeUInt32BE(count, at + 4)
      if (type === 3) directory.writeUInt16BE(value, at + 8)
      else directory.writeUInt32BE(value, at + 8)
    })
    const at = add(directory)
    parts[link.part]!.writeUInt32BE(at, link.at)
    link = { part: parts.length - 1, at: directory.length - 4 }
  }
  return Buffer.concat(parts)
}

function longs(values: readonly number[]): Buffer {
  const bytes = Buffer.alloc(values.length * 4)
  values.forEach((value, k) => bytes.writeUInt32BE(value, k * 4))
  return bytes
}
