import { TooLarge } from './value'

const clear = 256
const end = 257

/** Undoes LZW as PDF has it: codes of 9 to 12 bits, high bit first. `early`: widths grow one code early, the usual way. Stops at what is no code. */
export function lzwDecode(bytes: Uint8Array, early: boolean, most: number): Uint8Array {
  const prefix = new Int32Array(4096)
  const last = new Uint8Array(4096)
  const length = new Int32Array(4096)
  for (let k = 0; k < 256; k++) [last[k], length[k], prefix[k]] = [k, 1, -1]
  let out = new Uint8Array(Math.min(most, bytes.length * 4) + 4096)
  let size = 0
  let [next, width, before] = [258, 9, -1]
  let [bits, have] = [0, 0]
  const write = (code: number): number => {
    const n = length[code]!
    if (size + n > most) throw new TooLarge('lzw')
    if (size + n > out.length) {
      const grown = new Uint8Array(out.length * 2 + n)
      grown.set(out)
      out = grown
    }
    let c = code
    for (let k = size + n - 1; k >= size; k--) {
      out[k] = last[c]!
      c = prefix[c]!
    }
    size += n
    return out[size - n]!
  }
  for (let at = 0; at < bytes.length; ) {
    while (have < width && at < bytes.length) {
      bits = ((bits << 8) | bytes[at++]!) & 0xffffff
      have += 8
    }
    if (have < width) break
    const code = (bits >> (have - width)) & ((1 << width) - 1)
    have -= width
    if (code === end) break
    if (code === clear) {
      ;[next, width, before] = [258, 9, -1]
      continue
    }
    if (code > next || (code === next && before < 0)) break
    if (before >= 0 && next < 4096) {
      prefix[next] = before
      length[next] = length[before]! + 1
      // the code being made just now stands for what came before and its own first byte
      let first = code === next ? before : code
      while (prefix[first]! >= 0) first = prefix[first]!
      last[next++] = last[first]!
    }
    write(code)
    before = code
    const reached = next + (early ? 1 : 0)
    width = reached >= 2048 ? 12 : reached >= 1024 ? 11 : reached >= 512 ? 10 : 9
  }
  return out.subarray(0, size)
}
