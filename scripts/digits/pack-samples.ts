import { deflateRawSync, inflateRawSync } from 'node:zlib'
import type { Sample } from './samples'

const size = 1 + 28 * 28

/** Samples as one small file: the digit and its picture, one after the other, deflated. */
export function packSamples(samples: readonly Sample[]): Buffer {
  return deflateRawSync(Buffer.concat(samples.map(({ digit, ink }) => Buffer.concat([Buffer.from([digit]), ink]))), { level: 9 })
}

export function unpackSamples(packed: Uint8Array): Sample[] {
  const bytes = inflateRawSync(packed)
  return Array.from({ length: bytes.length / size }, (_, k) => ({ digit: bytes[k * size]!, ink: bytes.subarray(k * size + 1, (k + 1) * size) }))
}
