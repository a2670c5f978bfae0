import { execFileSync } from 'node:child_process'
import sharp from 'sharp'
import { decodePage } from '@/lib/reading/decode-page'
import { openSheaf } from '@/lib/reading/open-sheaf'

const dpi = 100
/** Both are compared this wide, so that neither's way of scaling counts. */
const wide = 200

type Raw = Readonly<{ data: Uint8Array; width: number; height: number }>
async function reduced({ data, width, height }: Raw, turn: number, high: number): Promise<Buffer> {
  const upright = await sharp(data, { raw: { width, height, channels: 1 } }).rotate(turn).toColourspace('b-w').raw().toBuffer({ resolveWithObject: true })
  return sharp(upright.data, { raw: { width: upright.info.width, height: upright.info.height, channels: 1 } }).resize(wide, high, { fit: 'fill' }).toColourspace('b-w').raw().toBuffer()
}

/** A page as pdftoppm draws it, in grey. */
function drawn(file: string, index: number): Raw {
  const page = String(index + 1)
  const pgm = execFileSync('pdftoppm', ['-gray', '-cropbox', '-r', String(dpi), '-f', page, '-l', page, file], { maxBuffer: 1e9, stdio: ['ignore', 'pipe', 'ignore'] })
  const [, width, height] = /^P5\s+(\d+)\s+(\d+)\s+255\s/.exec(pgm.subarray(0, 40).toString('latin1'))!.map(Number) as [number, number, number]
  return { data: pgm.subarray(pgm.length - width * height), width, height }
}

/**
 * The mean difference in grey between a page as it is read, turned upright, and as pdftoppm draws it; `turned` is the same with ours
 * upside down, to show what a wrong page would give. And how it was read.
 */
export async function greyDifference(file: string, index = 0): Promise<{ off: number; turned: number; encoding: string; dpi: number }> {
  const sheaf = openSheaf(file)
  try {
    const { image, picture } = await decodePage(sheaf, index)
    const page = drawn(file, index)
    const high = Math.round((wide * page.height) / page.width)
    const theirs = await reduced(page, 0, high)
    const off = (ours: Buffer) => ours.reduce((sum, v, k) => sum + Math.abs(v - theirs[k]!), 0) / ours.length
    return { off: off(await reduced(picture, image.shownTurn, high)), turned: off(await reduced(picture, image.shownTurn + 180, high)), encoding: image.encoding, dpi: image.dpiX }
  } finally {
    sheaf.close()
  }
}
