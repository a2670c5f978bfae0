/** Kinds of segments (ITU-T T.88, 7.3): what a page is, its regions, and what ends it. */
const pageInformation = 48
const genericRegions = new Set([36, 38, 39])
const ends = new Set([49, 50, 51, 62])
const unknownLength = 0xffffffff

/**
 * Some copiers put a G4 stream into JBIG2's wrapping, which the PDF engine does not read. The bare G4 stream of such a picture;
 * null for any other JBIG2.
 */
export function jbig2Mmr(bytes: Uint8Array, width: number, height: number): Uint8Array | null {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.length)
  let found: Uint8Array | null = null
  for (let at = 0; at + 11 <= bytes.length; ) {
    const flags = bytes[at + 4]!
    // none of these segments refers to another one
    if (bytes[at + 5] !== 0) return null
    const data = at + (flags & 0x40 ? 10 : 7) + 4
    if (data > bytes.length) return null
    const said = view.getUint32(data - 4)
    const length = said === unknownLength ? bytes.length - data : said
    const kind = flags & 63
    if (genericRegions.has(kind)) {
      if (found || data + 18 > bytes.length || !wholePage(view, data, width, height)) return null
      found = bytes.subarray(data + 18, data + length)
    } else if (kind !== pageInformation && !ends.has(kind)) return null
    at = data + length
  }
  return found
}

/** A region as large as the picture, from its corner, coded as G4. */
function wholePage(view: DataView, at: number, width: number, height: number): boolean {
  const [w, h, x, y] = [0, 4, 8, 12].map((k) => view.getUint32(at + k))
  return w === width && h === height && x === 0 && y === 0 && (view.getUint8(at + 17) & 1) === 1
}
