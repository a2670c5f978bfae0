/**
 * A small convolutional network that reads one handwritten digit: two layers of 3 x 3 filters, each halved by taking maxima, and two
 * dense layers. Plain numbers and loops: a box takes well under a millisecond, and nothing has to be loaded but its weights.
 */
export const side = 28
/** Ten digits, and "none of these": letters, crossings out, half digits, two in one box. */
export const classes = 11
export const none = 10
export const first = 12
export const second = 24
export const hidden = 48

const half = side / 2
const quarter = half / 2
export const flat = second * quarter * quarter

/** Weights by layer. Filters: out channel, in channel, row, column. Dense: out, in. */
export type DigitNet = Readonly<Record<'w1' | 'b1' | 'w2' | 'b2' | 'w3' | 'b3' | 'w4' | 'b4', Float32Array>>
export const shapes: Readonly<Record<keyof DigitNet, number>> = {
  w1: first * 9, b1: first, w2: second * first * 9, b2: second, w3: hidden * flat, b3: hidden, w4: classes * hidden, b4: classes,
}

/** Room for one pass, so that many digits are read without asking for memory. Filtered layers have a rim of one pixel. */
export function makeScratch() {
  return {
    input: new Float32Array((side + 2) ** 2), full1: new Float32Array(first * side * side), pooled1: new Float32Array(first * (half + 2) ** 2), from1: new Int32Array(first * half * half),
    full2: new Float32Array(second * half * half), pooled2: new Float32Array(flat), from2: new Int32Array(flat), dense: new Float32Array(hidden), logits: new Float32Array(classes),
  }
}
export type Scratch = ReturnType<typeof makeScratch>

/** How much each class is spoken for (logits), from 28 x 28 of ink between 0 and 1. The answer lies in the scratch and is overwritten by the next. */
export function digitLogits(net: DigitNet, ink: Float32Array, scratch: Scratch): Float32Array {
  const { input, full1, pooled1, from1, full2, pooled2, from2, dense, logits } = scratch
  for (let y = 0; y < side; y++) input.set(ink.subarray(y * side, (y + 1) * side), (y + 1) * (side + 2) + 1)
  filter(input, 1, side, net.w1, net.b1, first, full1)
  pool(full1, first, side, pooled1, half + 2, from1)
  filter(pooled1, first, half, net.w2, net.b2, second, full2)
  pool(full2, second, half, pooled2, quarter, from2)
  connect(pooled2, net.w3, net.b3, dense)
  for (let k = 0; k < hidden; k++) if (dense[k]! < 0) dense[k] = 0
  connect(dense, net.w4, net.b4, logits)
  return logits
}

/** 3 x 3 filters over `channels` pictures of `size` with a rim of one pixel. The nine taps are written out: that is most of the work. */
function filter(input: Float32Array, channels: number, size: number, weights: Float32Array, bias: Float32Array, outs: number, output: Float32Array): void {
  const wide = size + 2
  for (let o = 0; o < outs; o++) {
    const base = o * size * size
    output.fill(bias[o]!, base, base + size * size)
    for (let c = 0; c < channels; c++) {
      const at = (o * channels + c) * 9
      const [a, b, d, e, f, g, h, i, j] = [weights[at]!, weights[at + 1]!, weights[at + 2]!, weights[at + 3]!, weights[at + 4]!, weights[at + 5]!, weights[at + 6]!, weights[at + 7]!, weights[at + 8]!]
      for (let y = 0; y < size; y++) {
        let upper = (c * wide + y) * wide
        let middle = upper + wide
        let lower = middle + wide
        const end = base + (y + 1) * size
        for (let to = base + y * size; to < end; to++, upper++, middle++, lower++)
          output[to] = output[to]! + a * input[upper]! + b * input[upper + 1]! + d * input[upper + 2]! + e * input[middle]! + f * input[middle + 1]! + g * input[middle + 2]! + h * input[lower]! + i * input[lower + 1]! + j * input[lower + 2]!
      }
    }
  }
}

/** The largest of each 2 x 2, at least 0, and where it stood (-1: nothing above 0). `wide` over half the size leaves a rim. */
function pool(input: Float32Array, channels: number, size: number, output: Float32Array, wide: number, from: Int32Array): void {
  const small = size / 2
  const rim = (wide - small) / 2
  for (let c = 0, k = 0; c < channels; c++)
    for (let y = 0; y < small; y++)
      for (let x = 0; x < small; x++, k++) {
        const at = c * size * size + 2 * y * size + 2 * x
        let best = 0
        let place = -1
        for (let corner = 0; corner < 4; corner++) {
          const near = at + (corner & 1) + (corner >> 1) * size
          if (input[near]! > best) {
            best = input[near]!
            place = near
          }
        }
        output[c * wide * wide + (y + rim) * wide + x + rim] = best
        from[k] = place
      }
}

function connect(input: Float32Array, weights: Float32Array, bias: Float32Array, output: Float32Array): void {
  for (let o = 0; o < output.length; o++) {
    let sum = bias[o]!
    const base = o * input.length
    for (let k = 0; k < input.length; k++) sum += weights[base + k]! * input[k]!
    output[o] = sum
  }
}
