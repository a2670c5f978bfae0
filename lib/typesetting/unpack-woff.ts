import { inflateSync } from 'node:zlib'

type Tables = Map<string, Buffer>

/**
 * The plain TrueType font inside a WOFF 1.0 wrapper, ready for subsetting: tables inflated (a font library that reads the wrapper itself
 * inflates the glyph table once for each glyph) and glyphs padded to even lengths (the subsetter's short index counts in twos, so that
 * after an odd glyph it would point into the next).
 */
export function unpackWoff(woff: Buffer): Buffer {
  const tables: Tables = new Map()
  for (let k = 0; k < woff.readUInt16BE(12); k++) {
    const at = 44 + 20 * k
    const [offset, packed, length] = [woff.readUInt32BE(at + 4), woff.readUInt32BE(at + 8), woff.readUInt32BE(at + 12)]
    const bytes = woff.subarray(offset, offset + packed)
    tables.set(woff.toString('latin1', at, at + 4), packed < length ? inflateSync(bytes) : Buffer.from(bytes))
  }
  padGlyphs(tables)
  return layOut(tables, woff.readUInt32BE(4))
}

/** Rewrites glyf with every glyph at an even offset, and loca with long offsets to match. */
function padGlyphs(tables: Tables): void {
  const [head, loca, glyf] = [tables.get('head'), tables.get('loca'), tables.get('glyf')]
  if (!head || !loca || !glyf) return
  const long = head.readInt16BE(50) === 1
  const count = loca.length / (long ? 4 : 2)
  const offsetOf = (k: number): number => (long ? loca.readUInt32BE(4 * k) : 2 * loca.readUInt16BE(2 * k))
  const offsets = Buffer.alloc(4 * count)
  const glyphs: Buffer[] = []
  let offset = 0
  for (let k = 0; k + 1 < count; k++) {
    const glyph = glyf.subarray(offsetOf(k), offsetOf(k + 1))
    glyphs.push(glyph, Buffer.alloc(glyph.length % 2))
    offset += glyph.length + (glyph.length % 2)
    offsets.writeUInt32BE(offset, 4 * (k + 1))
  }
  head.writeInt16BE(1, 50)
  tables.set('loca', offsets).set('glyf', Buffer.concat(glyphs))
}

/** A font file of these tables. Check sums stay nought: nothing here reads them, and no file keeps this font whole. */
function layOut(tables: Tables, flavour: number): Buffer {
  const head = Buffer.alloc(12 + 16 * tables.size)
  head.writeUInt32BE(flavour, 0)
  head.writeUInt16BE(tables.size, 4)
  let at = 12
  let offset = head.length
  const bodies: Buffer[] = []
  for (const [tag, bytes] of tables) {
    head.write(tag, at, 'latin1')
    head.writeUInt32BE(offset, at + 8)
    head.writeUInt32BE(bytes.length, at + 12)
    at += 16
    bodies.push(bytes, Buffer.alloc((4 - (bytes.length % 4)) % 4))
    offset += bytes.length + ((4 - (bytes.length % 4)) % 4)
  }
  return Buffer.concat([head, ...bodies])
}
