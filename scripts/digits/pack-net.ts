import { shapes, type DigitNet } from '@/lib/placing/digit-net'

/** Weights as whole numbers from -127 to 127 with one scale a layer, in base64: a quarter of their size, and reads as well. */
export function packNet(net: DigitNet): string {
  const layers = (Object.keys(shapes) as (keyof DigitNet)[]).map((layer) => {
    const scale = Math.max(...net[layer].map(Math.abs)) / 127
    const bytes = Int8Array.from(net[layer], (w) => Math.round(w / scale))
    return [layer, { scale: Number(scale.toPrecision(7)), bytes: Buffer.from(bytes.buffer).toString('base64') }] as const
  })
  return `${JSON.stringify(Object.fromEntries(layers), null, 1)}\n`
}
