/**
 * Puts the smallest TIFF header in front of a bare CCITT G4 stream, so that an image library can decode it.
 * `inverted` says that 1 bits are black (TIFF 6.0 PhotometricInterpretation 1 instead of 0).
 */
export function g4Tiff(stream: Uint8Array, width: number, height: number, inverted: boolean): Buffer {
  const long = 4
  const short = 3
  const entries = [
    [256, long, width], [257, long, height], [258, short, 1], [259, short, 4], [262, short, inverted ? 1 : 0],
    [273, long, 0], [277, short, 1], [278, long, height], [279, long, stream.length],
  ] as const
  const header = Buffer.alloc(8 + 2 + entries.length * 12 + 4)
  header.write('II*\0', 0, 'latin1')
  header.writeUInt32LE(8, 4)
  header.writeUInt16LE(entries.length, 8)
  entries.forEach(([tag, type, value], k) => {
    const at = 10 + k * 12
    header.writeUInt16LE(tag, at)
    header.writeUInt16LE(type, at + 2)
    header.writeUInt32LE(1, at + 4)
    header.writeUInt32LE(tag === 273 ? header.length : value, at + 8)
  })
  return Buffer.concat([header, stream])
}
