import { isPack } from './picture-pack'

/** Kinds of files that scans come in (`pack`: several pictures sent together), and one that phones make and is not read. */
export type FileKind = 'pdf' | 'jpeg' | 'png' | 'tiff' | 'pack' | 'heic'

/** How many bytes of a file tell its kind. */
export const kindBytes = 1024
const phonePictures = new Set(['heic', 'heix', 'heim', 'heis', 'hevc', 'hevx', 'mif1', 'msf1', 'avif'])
const tiffHeads = ['II*\0', 'MM\0*', 'II+\0', 'MM\0+']

/** Judges a file by its first bytes, never by its name; null for anything else. */
export function fileKind(head: Uint8Array): FileKind | null {
  const text = String.fromCharCode(...head.subarray(0, kindBytes))
  if (text.startsWith('\xff\xd8\xff')) return 'jpeg'
  if (text.startsWith('\x89PNG\r\n\x1a\n')) return 'png'
  if (tiffHeads.some((start) => text.startsWith(start))) return 'tiff'
  if (isPack(head)) return 'pack'
  if (text.slice(4, 8) === 'ftyp' && phonePictures.has(text.slice(8, 12))) return 'heic'
  // within the first kilobyte, as readers agree to accept it
  return text.includes('%PDF-') ? 'pdf' : null
}
