import { shapes, type DigitNet } from './digit-net'
import packed from './digit-weights.json'

type PackedNet = Readonly<Record<keyof DigitNet, Readonly<{ scale: number; bytes: string }>>>

/** The network's weights as `npm run train:digits` left them: whole numbers with one scale a layer. */
export function loadNet(from: PackedNet = packed): DigitNet {
  const layers = (Object.keys(shapes) as (keyof DigitNet)[]).map((layer) => {
    const { scale, bytes } = from[layer]
    return [layer, Float32Array.from(new Int8Array(Buffer.from(bytes, 'base64')), (v) => v * scale)] as const
  })
  return Object.fromEntries(layers) as DigitNet
}
