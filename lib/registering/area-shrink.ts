import type { GreyPicture } from '@/lib/core/grey-picture'

/** Shares are counted in 256ths. */
const whole = 256
const half = (whole * whole) / 2

/** A picture made smaller to any size: each new pixel is the mean of the area it covers. Both sides must not grow. */
export function areaShrink({ width, height, data }: GreyPicture, w: number, h: number, out: Uint8Array): GreyPicture {
  const across = shares(width, w)
  const down = shares(height, h)
  const line = new Int32Array(width)
  for (let y = 0; y < h; y++) {
    gather(data, width, down.starts[y]!, down, y, line)
    spread(line, across, out, y * w, w)
  }
  return { width: w, height: h, data: out }
}

type Shares = Readonly<{ taps: number; starts: Int32Array; share: Int32Array }>

/** For each of `to` pixels: the first of the `from` pixels under it, and how much of it each of `taps` pixels is. They add up to one whole. */
function shares(from: number, to: number): Shares {
  const by = from / to
  const taps = Math.min(from, mostUnder(by, to))
  const starts = new Int32Array(to)
  const share = new Int32Array(to * taps)
  for (let k = 0; k < to; k++) {
    const [left, right] = [k * by, (k + 1) * by]
    const start = Math.min(Math.floor(left + 1e-6), from - taps)
    starts[k] = start
    let given = 0
    for (let tap = 0; tap < taps; tap++) {
      const until = Math.max(0, Math.min(start + tap + 1, right) - left)
      const sum = Math.round((Math.min(until, by) / by) * whole)
      share[k * taps + tap] = sum - given
      given = sum
    }
  }
  return { taps, starts, share }
}

/** How many old pixels lie at most under a new one. */
function mostUnder(by: number, to: number): number {
  let most = 1
  for (let k = 0; k < to; k++) most = Math.max(most, Math.ceil((k + 1) * by - 1e-6) - Math.floor(k * by + 1e-6))
  return most
}

/** The weighted sum of the rows under one new row. */
function gather(data: Uint8Array, width: number, start: number, { taps, share }: Shares, y: number, line: Int32Array): void {
  const a = start * width
  const b = taps > 1 ? a + width : a
  const [p, q] = [share[y * taps]!, taps > 1 ? share[y * taps + 1]! : 0]
  for (let x = 0; x < width; x++) line[x] = data[a + x]! * p + data[b + x]! * q
  for (let tap = 2; tap < taps; tap++) {
    const part = share[y * taps + tap]!
    if (part === 0) continue
    const at = (start + tap) * width
    for (let x = 0; x < width; x++) line[x]! += data[at + x]! * part
  }
}

function spread(line: Int32Array, { taps, starts, share }: Shares, out: Uint8Array, to: number, w: number): void {
  if (taps === 2) for (let x = 0, k = 0; x < w; x++, k += 2) out[to + x] = (line[starts[x]!]! * share[k]! + line[starts[x]! + 1]! * share[k + 1]! + half) >> 16
  else
    for (let x = 0, k = 0; x < w; x++) {
      let sum = half
      for (let at = starts[x]!, end = at + taps; at < end; at++, k++) sum += line[at]! * share[k]!
      out[to + x] = sum >> 16
    }
}
