/** RC4, which the crypto library no longer has; the older copiers' PDFs are enciphered with it. */
export function rc4(key: Uint8Array, bytes: Uint8Array): Uint8Array {
  const state = Uint8Array.from({ length: 256 }, (_, k) => k)
  let j = 0
  const swap = (a: number, b: number) => {
    const kept = state[a]!
    state[a] = state[b]!
    state[b] = kept
  }
  for (let i = 0; i < 256; i++) {
    j = (j + state[i]! + key[i % key.length]!) & 255
    swap(i, j)
  }
  const out = new Uint8Array(bytes.length)
  j = 0
  for (let n = 0, i = 0; n < bytes.length; n++) {
    i = (i + 1) & 255
    j = (j + state[i]!) & 255
    swap(i, j)
    out[n] = bytes[n]! ^ state[(state[i]! + state[j]!) & 255]!
  }
  return out
}
