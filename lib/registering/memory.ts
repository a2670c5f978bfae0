/** Gives memory for a use by name; what was in it before is not cleared. */
export type Memory = (use: string, length: number) => Uint8Array

/** New memory every time, for what is kept. */
export const fresh: Memory = (_use, length) => new Uint8Array(length)

/**
 * The same memory again and again for the same use, for pictures that are done with before the next leaf: a leaf's many
 * megabytes would otherwise make the collector run time and again. What it gives must never be handed out or kept.
 */
export function reused(): Memory {
  const kept = new Map<string, Uint8Array>()
  return (use, length) => {
    const at = kept.get(use)
    if (at && at.length >= length) return at.length === length ? at : at.subarray(0, length)
    const made = new Uint8Array(length)
    kept.set(use, made)
    return made
  }
}

/** Numbers of 32 bits from such memory. */
export function words(memory: Memory, use: string, count: number): Uint32Array {
  const { buffer, byteOffset } = memory(use, count * 4)
  return new Uint32Array(buffer, byteOffset, count)
}
