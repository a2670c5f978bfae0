import { closeSync, openSync, writeSync } from 'node:fs'
import type { PagePicture } from './page-picture'
import { paperDensity } from './paper-density'

/** How a page is turned to be shown, and the mirroring within it, for each EXIF orientation. */
const shown: Readonly<Record<number, { turn: number; mirror: boolean }>> = {
  1: { turn: 0, mirror: false }, 2: { turn: 0, mirror: true }, 3: { turn: 180, mirror: false }, 4: { turn: 180, mirror: true },
  5: { turn: 270, mirror: true }, 6: { turn: 90, mirror: false }, 7: { turn: 90, mirror: true }, 8: { turn: 270, mirror: false },
}

/**
 * Writes pictures as a PDF, one a page, as they come: only one is in memory. The same pictures give the same bytes. Returns how many pages.
 * @param most writing stops beyond this many pages
 */
export async function wrapPictures(pictures: AsyncIterable<PagePicture>, to: string, most: number): Promise<number> {
  const out = new PdfOut(to)
  try {
    const pages: number[] = []
    for await (const picture of pictures) {
      pages.push(addPage(out, picture))
      if (pages.length > most) break
    }
    out.add(1, '<</Type/Catalog/Pages 2 0 R>>')
    out.add(2, `<</Type/Pages/Count ${pages.length}/Kids[${pages.map((number) => `${number} 0 R`).join(' ')}]>>`)
    out.end()
    return pages.length
  } finally {
    out.close()
  }
}

function addPage(out: PdfOut, picture: PagePicture): number {
  const { dpiX, dpiY } = paperDensity(picture.width, picture.height, picture.dpiX, picture.dpiY)
  const [w, h] = [(picture.width * 72) / dpiX, (picture.height * 72) / dpiY]
  const { turn, mirror } = shown[picture.orientation] ?? shown[1]!
  const numbers = picture.parts.map(({ dict, data }) => out.add(out.take(), `<</Type/XObject/Subtype/Image${dict}/Length ${data.length}>>`, data))
  const draws = picture.parts.map(({ from, to }, k) => `q ${fixed(mirror ? -w : w)} 0 0 ${fixed(h * (to - from))} ${fixed(mirror ? w : 0)} ${fixed(h * (1 - to))} cm /I${k} Do Q`)
  const content = Buffer.from(draws.join('\n'))
  const contentAt = out.add(out.take(), `<</Length ${content.length}>>`, content)
  const names = numbers.map((number, k) => `/I${k} ${number} 0 R`).join('')
  return out.add(out.take(), `<</Type/Page/Parent 2 0 R/MediaBox[0 0 ${fixed(w)} ${fixed(h)}]/Rotate ${turn}/Contents ${contentAt} 0 R/Resources<</XObject<<${names}>>>>>>`)
}

function fixed(value: number): string {
  return String(Number(value.toFixed(4)))
}

/** A PDF on its way to the disk; of each object only its place is kept. */
class PdfOut {
  private readonly handle: number
  private readonly starts: number[] = []
  private size = 0
  private next = 3
  constructor(path: string) {
    this.handle = openSync(path, 'w')
    this.write(Buffer.from('%PDF-1.5\n%\xe2\xe3\xcf\xd3\n', 'latin1'))
  }

  /** The number of an object to come. */
  take(): number {
    return this.next++
  }

  add(number: number, text: string, stream?: Uint8Array): number {
    this.starts[number] = this.size
    this.write(Buffer.from(`${number} 0 obj\n${text}\n`, 'latin1'))
    if (stream) {
      this.write(Buffer.from('stream\n'))
      this.write(stream)
      this.write(Buffer.from('\nendstream\n'))
    }
    this.write(Buffer.from('endobj\n'))
    return number
  }

  end(): void {
    const at = this.size
    const table = Array.from({ length: this.next - 1 }, (_, k) => `${String(this.starts[k + 1] ?? 0).padStart(10, '0')} 00000 n \n`).join('')
    this.write(Buffer.from(`xref\n0 ${this.next}\n0000000000 65535 f \n${table}trailer\n<</Size ${this.next}/Root 1 0 R>>\nstartxref\n${at}\n%%EOF\n`))
  }

  close(): void {
    closeSync(this.handle)
  }

  private write(bytes: Uint8Array): void {
    for (let at = 0; at < bytes.length; ) at += writeSync(this.handle, bytes, at)
    this.size += bytes.length
  }
}
