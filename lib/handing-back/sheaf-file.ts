import { randomUUID } from 'node:crypto'
import { PDFDocument, PDFRawStream } from 'pdf-lib'

/** A file that is read in pieces. */
export type PiecewiseFile = Readonly<{ size: number; read: (offset: number, length: number) => Buffer }>

/** Read at a time; dictionaries longer than `overlap` are not looked through. */
const window = 16 * 1024
const overlap = 4 * 1024
/** Streams shorter than this stay in memory. */
const worthwhile = 8 * 1024

type Picture = Readonly<{ lengthAt: number; lengthEnd: number; dataAt: number; length: number }>

/**
 * Loads a sheaf for building without its pictures: their bytes stay in the file and are read each time they are asked for, so that a
 * sheaf of any length takes little memory. The file has to stay open as long. Throws what pdf-lib throws on a file it cannot read.
 */
export async function loadSheafFile(file: PiecewiseFile): Promise<PDFDocument> {
  const left: { offset: number; length: number }[] = []
  const sign = randomUUID()
  const skeleton = withoutPictures(file, (picture) => `${sign}${String(left.push(picture) - 1).padStart(8, '0')}`)
  const pdf = await PDFDocument.load(skeleton, { updateMetadata: false, throwOnInvalidObject: false })
  for (const [, object] of pdf.context.enumerateIndirectObjects()) {
    if (!(object instanceof PDFRawStream) || object.contents.length !== sign.length + 8) continue
    const text = Buffer.from(object.contents).toString('latin1')
    const picture = text.startsWith(sign) ? left[Number(text.slice(sign.length))] : undefined
    if (picture) Object.defineProperty(object, 'contents', { get: () => file.read(picture.offset, picture.length) })
  }
  return pdf
}

/** The file with each large picture's bytes replaced by the words that `leave` gives for its place; everything else as it is. */
function withoutPictures(file: PiecewiseFile, leave: (picture: { offset: number; length: number }) => string): Uint8Array {
  const parts: Buffer[] = []
  let at = 0
  while (at < file.size) {
    const part = file.read(at, Math.min(window, file.size - at))
    const picture = firstPicture(part, (end) => endsAt(file, at + end))
    if (picture) {
      const words = leave({ offset: at + picture.dataAt, length: picture.length })
      parts.push(part.subarray(0, picture.lengthAt), Buffer.from(String(words.length)), part.subarray(picture.lengthEnd, picture.dataAt), Buffer.from(words, 'latin1'))
      at += picture.dataAt + picture.length
    } else {
      const taken = at + part.length < file.size ? part.length - overlap : part.length
      parts.push(part.subarray(0, taken))
      at += taken
    }
  }
  return Buffer.concat(parts)
}

/** The first image stream that begins in a piece of file, says its length and really ends there. */
function firstPicture(part: Buffer, ends: (at: number) => boolean): Picture | null {
  for (let at = part.indexOf('stream'); at >= 0; at = part.indexOf('stream', at + 6)) {
    const dictAt = part.lastIndexOf('obj', at)
    if (dictAt < 0 || at - dictAt > overlap || part.subarray(at - 3, at).toString('latin1') === 'end') continue
    const dict = part.toString('latin1', dictAt, at)
    const length = /\/Length\s+(\d+)(?!\d|\s+\d+\s+R)/.exec(dict)
    const line = part[at + 6] === 13 ? 2 : 1
    if (!length || Number(length[1]) < worthwhile || !/\/Subtype\s*\/Image\b/.test(dict) || part[at + 5 + line] !== 10) continue
    const dataAt = at + 6 + line
    if (!ends(dataAt + Number(length[1]))) continue
    const lengthEnd = dictAt + length.index + length[0].length
    return { lengthAt: lengthEnd - length[1]!.length, lengthEnd, dataAt, length: Number(length[1]) }
  }
  return null
}

function endsAt(file: PiecewiseFile, at: number): boolean {
  return at < file.size && /^\s*endstream/.test(file.read(at, Math.min(16, file.size - at)).toString('latin1'))
}
