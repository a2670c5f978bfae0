import type { GreyPicture } from '@/lib/core/grey-picture'

const plain = 225

/** Marks (1) where a levelled blank page has no print within so many pixels. */
export function clearOfPrint({ width, height, data }: GreyPicture, reach = 4): Uint8Array {
  const across = spread(data, width, height, 1, width, reach, (v) => v < plain)
  const both = spread(across, height, width, width, 1, reach, (v) => v === 1)
  return both.map((v) => 1 - v)
}

/** 1 where `hit` holds within so many steps along a line. */
function spread(data: Uint8Array, length: number, lines: number, along: number, between: number, reach: number, hit: (v: number) => boolean): Uint8Array {
  const out = new Uint8Array(data.length)
  for (let line = 0; line < lines; line++)
    for (let k = 0, until = -1; k < length + reach; k++) {
      if (k < length && hit(data[line * between + k * along]!)) until = k + 2 * reach
      if (k >= reach && k <= until) out[line * between + (k - reach) * along] = 1
    }
  return out
}
