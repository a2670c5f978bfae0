/** What a JPEG's own head says: its size in pixels, its colour components, and whether it comes in passes. */
export type JpegHead = Readonly<{ width: number; height: number; components: number; progressive: boolean }>

/** Finds the frame header of a JPEG; null when there is none. */
export function jpegHead(bytes: Uint8Array): JpegHead | null {
  let at = bytes.indexOf(0xff)
  if (at < 0 || bytes[at + 1] !== 0xd8) return null
  for (at += 2; at + 9 < bytes.length; ) {
    if (bytes[at] !== 0xff) return null
    const marker = bytes[at + 1]!
    if (marker === 0xff) at++
    else if (marker === 0x01 || (marker >= 0xd0 && marker <= 0xd8)) at += 2
    else if (marker >= 0xc0 && marker <= 0xcf && marker !== 0xc4 && marker !== 0xc8 && marker !== 0xcc)
      return { height: bytes[at + 5]! * 256 + bytes[at + 6]!, width: bytes[at + 7]! * 256 + bytes[at + 8]!, components: bytes[at + 9]!, progressive: marker === 0xc2 }
    else if (marker === 0xda || marker === 0xd9) return null
    else at += 2 + bytes[at + 2]! * 256 + bytes[at + 3]!
  }
  return null
}
