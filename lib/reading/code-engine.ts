import { readFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { prepareZXingModule, readBarcodes } from 'zxing-wasm/reader'
import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PixelPoint } from '@/lib/core/paper-space'

/** A QR code as found in a picture: its text and the symbol's corners in pixels, clockwise from the symbol's own top left. */
export type FoundCode = Readonly<{ text: string; corners: readonly [PixelPoint, PixelPoint, PixelPoint, PixelPoint] }>

let loading: Promise<void> | null = null

/** Loads the code reader once a thread, from the installed package: left to itself it would fetch its program from the network. */
export function loadCodeEngine(): Promise<void> {
  loading ??= load()
  return loading
}

async function load(): Promise<void> {
  const path = createRequire(join(process.cwd(), 'package.json')).resolve('zxing-wasm/reader/zxing_reader.wasm')
  const bytes = await readFile(path)
  const wasmBinary = bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length)
  await prepareZXingModule({ overrides: { wasmBinary }, fireImmediately: true })
}

const most = 6

/** A part of a picture in whole pixels. */
export type Box = Readonly<{ left: number; top: number; width: number; height: number }>

// A thread looks at one part after another: new memory for each would cost more than the looking.
let scratch = new Uint32Array(0)
const grey = Uint32Array.from({ length: 256 }, (_, v) => 0xff000000 + v * 0x010101)

/** All QR codes in a part of a picture (the whole by default), their corners in pixels of the whole. The reader wants colours, so the grey goes in three times. */
export async function codesIn(picture: GreyPicture, { left, top, width, height }: Box = { left: 0, top: 0, width: picture.width, height: picture.height }): Promise<FoundCode[]> {
  await loadCodeEngine()
  if (scratch.length < width * height) scratch = new Uint32Array(width * height)
  const { data } = picture
  for (let y = 0, k = 0; y < height; y++) {
    const row = (top + y) * picture.width + left
    for (let x = 0; x < width; x++, k++) scratch[k] = grey[data[row + x]!]!
  }
  const image = { width, height, data: new Uint8ClampedArray(scratch.buffer, 0, 4 * width * height), colorSpace: 'srgb' } as unknown as ImageData
  const found = await readBarcodes(image, { formats: ['QRCode'], maxNumberOfSymbols: most, tryInvert: false })
  const at = ({ x, y }: PixelPoint): PixelPoint => ({ x: x + left, y: y + top })
  return found
    .filter(({ isValid, isMirrored }) => isValid && !isMirrored)
    .map(({ text, position: { topLeft, topRight, bottomRight, bottomLeft } }) => ({ text, corners: [at(topLeft), at(topRight), at(bottomRight), at(bottomLeft)] }))
}
