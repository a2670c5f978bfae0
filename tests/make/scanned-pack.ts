import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFDocument } from 'pdf-lib'
import sharp from 'sharp'

/** A page of a pack (from 1) as it comes out of the copier, perhaps upside down. */
export type ScannedPage = Readonly<{ page: number; upsideDown?: boolean }>

/** Pictures of a PDF's pages in grey, as poppler draws them: PNG, in order. */
export function drawnPages(pdf: Uint8Array, dpi: number): Buffer[] {
  const folder = mkdtempSync(join(tmpdir(), 'sheafmark-pack-'))
  writeFileSync(join(folder, 'pack.pdf'), pdf)
  execFileSync('pdftoppm', ['-gray', '-png', '-r', String(dpi), join(folder, 'pack.pdf'), join(folder, 'page')])
  return readdirSync(folder).filter((name) => name.endsWith('.png')).sort().map((name) => readFileSync(join(folder, name)))
}

/** What zbarimg, a reader of no kin to ours, reads off one picture: the text of every QR code on it. */
export function codesByZbar(picture: Buffer): string[] {
  const file = join(mkdtempSync(join(tmpdir(), 'sheafmark-zbar-')), 'page.png')
  writeFileSync(file, picture)
  return execFileSync('zbarimg', ['-q', '--raw', '-Sdisable', '-Sqrcode.enable', file], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] }).trim().split('\n')
}

/** Printed pages with some writing on them, scanned askew in the given order: the path of the copier's PDF. */
export async function aScannedPack(pack: Uint8Array, pages: readonly ScannedPage[], dpi = 150): Promise<string> {
  const drawn = drawnPages(pack, dpi)
  const pdf = await PDFDocument.create()
  for (const [k, { page, upsideDown = false }] of pages.entries()) {
    const { width, height } = await sharp(drawn[page - 1]!).metadata()
    const marks = Array.from({ length: 12 }, (_, n) => `<path d="M${200 + 37 * ((page * 7 + n * 5) % 19)} ${260 + 70 * n} q 30 -40 50 0 t 60 10" fill="none" stroke="#333" stroke-width="4"/>`)
    const written = await sharp(drawn[page - 1]!).composite([{ input: Buffer.from(`<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}">${marks.join('')}</svg>`) }]).png().toBuffer()
    const turned = await sharp(written).rotate((upsideDown ? 180 : 0) + (((k * 7) % 5) - 2) * 0.4, { background: '#f4f4f4' }).toColourspace('b-w').jpeg({ quality: 70 }).toBuffer({ resolveWithObject: true })
    const image = await pdf.embedJpg(turned.data)
    pdf.addPage([(turned.info.width * 72) / dpi, (turned.info.height * 72) / dpi]).drawImage(image, { x: 0, y: 0, width: (turned.info.width * 72) / dpi, height: (turned.info.height * 72) / dpi })
  }
  const file = join(mkdtempSync(join(tmpdir(), 'sheafmark-scan-')), 'scan.pdf')
  writeFileSync(file, await pdf.save())
  return file
}
