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

/** All QR codes in a picture. The reader wants colours, so the grey goes in three times. */
export async function codesIn({ width, height, data }: GreyPicture): Promise<FoundCode[]> {
  await loadCodeEngine()
  const pixels = new Uint32Array(width * height)
  for (let k = 0; k < pixels.length; k++) pixels[k] = 0xff000000 | (data[k]! * 0x010101)
  const image = { width, height, data: new Uint8ClampedArray(pixels.buffer), colorSpace: 'srgb' } as ImageData
  const found = await readBarcodes(image, { formats: ['QRCode'], maxNumberOfSymbols: most, tryInvert: false })
  return found
    .filter(({ isValid, isMirrored }) => isValid && !isMirrored)
    .map(({ text, position: { topLeft, topRight, bottomRight, bottomLeft } }) => ({ text, corners: [topLeft, topRight, bottomRight, bottomLeft] }))
}
