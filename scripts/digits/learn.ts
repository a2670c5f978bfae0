import { classes, digitLogits, first, flat, hidden, makeScratch, shapes, side, type DigitNet, type Scratch } from '@/lib/placing/digit-net'
import type { Dice } from './dice'

type Layer = keyof DigitNet
const layers = Object.keys(shapes) as Layer[]
const half = side / 2

/** What is learnt from: one picture and what it is. */
export type Lesson = Readonly<{ ink: Float32Array; is: number }>

const empty = () => Object.fromEntries(layers.map((layer) => [layer, new Float32Array(shapes[layer])])) as DigitNet

/** A network that knows nothing: small random weights. */
export function newNet(dice: Dice): DigitNet {
  const net = empty()
  const inputs = { w1: 9, w2: first * 9, w3: flat, w4: hidden }
  for (const [layer, count] of Object.entries(inputs)) {
    const weights = net[layer as Layer]
    for (let k = 0; k < weights.length; k++) weights[k] = dice.bell(Math.sqrt(2 / count))
  }
  return net
}

/** Learns lesson by lesson (Adam, Kingma and Ba 2015; batches of 32). The answers are softened by 2 %, so that the network stays modest. */
export function makeLearner(net: DigitNet) {
  const scratch = makeScratch()
  const slope = empty()
  const [mean, square] = [empty(), empty()]
  let step = 0
  const learn = (batch: readonly Lesson[], rate: number): number => {
    for (const layer of layers) slope[layer].fill(0)
    let loss = 0
    for (const lesson of batch) loss += addSlope(net, lesson, scratch, slope)
    step++
    const [keep1, keep2] = [1 - 0.9 ** step, 1 - 0.999 ** step]
    for (const layer of layers) {
      const [w, g, m, v] = [net[layer], slope[layer], mean[layer], square[layer]]
      const decay = layer.startsWith('w') ? 0.02 : 0
      for (let k = 0; k < w.length; k++) {
        const by = g[k]! / batch.length
        m[k] = 0.9 * m[k]! + 0.1 * by
        v[k] = 0.999 * v[k]! + 0.001 * by * by
        w[k]! -= rate * ((m[k]! / keep1) / (Math.sqrt(v[k]! / keep2) + 1e-8) + decay * w[k]!)
      }
    }
    return loss / batch.length
  }
  return learn
}

function addSlope(net: DigitNet, { ink, is }: Lesson, scratch: Scratch, slope: DigitNet): number {
  const shares = softmax(digitLogits(net, ink, scratch))
  const wanted = (k: number) => (k === is ? 0.98 : 0) + 0.02 / classes
  const dLogits = shares.map((p, k) => p - wanted(k))
  const dDense = back(net.w4, scratch.dense, dLogits, slope.w4, slope.b4)
  for (let k = 0; k < hidden; k++) if (scratch.dense[k] === 0) dDense[k] = 0
  const dPooled = back(net.w3, scratch.pooled2, dDense, slope.w3, slope.b3)
  filterBack(net, scratch, dPooled, slope)
  return -Math.log(Math.max(1e-9, shares[is]!))
}

/** Through a dense layer: adds to its slopes and tells its inputs'. */
function back(weights: Float32Array, input: Float32Array, dOut: Float32Array, dWeights: Float32Array, dBias: Float32Array): Float32Array {
  const dIn = new Float32Array(input.length)
  for (let o = 0; o < dOut.length; o++) {
    const d = dOut[o]!
    if (d === 0) continue
    dBias[o]! += d
    const base = o * input.length
    for (let k = 0; k < input.length; k++) {
      dWeights[base + k]! += d * input[k]!
      dIn[k]! += d * weights[base + k]!
    }
  }
  return dIn
}

/** Through both filtered layers: only the places that won their maxima count. */
function filterBack(net: DigitNet, { input, pooled1, from1, from2 }: Scratch, dPooled: Float32Array, slope: DigitNet): void {
  const wide = half + 2
  const dPooled1 = new Float32Array(pooled1.length)
  for (let k = 0; k < flat; k++) {
    const [place, d] = [from2[k]!, dPooled[k]!]
    if (place < 0 || d === 0) continue
    const o = Math.floor(place / (half * half))
    const [y, x] = [Math.floor((place % (half * half)) / half), place % half]
    slope.b2[o]! += d
    for (let c = 0; c < first; c++) {
      const weight = (o * first + c) * 9
      const at = c * wide * wide + y * wide + x
      for (let j = 0; j < 3; j++)
        for (let i = 0; i < 3; i++) {
          slope.w2[weight + j * 3 + i]! += d * pooled1[at + j * wide + i]!
          dPooled1[at + j * wide + i]! += d * net.w2[weight + j * 3 + i]!
        }
    }
  }
  for (let k = 0; k < from1.length; k++) {
    const place = from1[k]!
    if (place < 0) continue
    const o = Math.floor(place / (side * side))
    const [y, x] = [Math.floor((place % (side * side)) / side), place % side]
    const d = dPooled1[o * wide * wide + ((y >> 1) + 1) * wide + (x >> 1) + 1]!
    if (d === 0) continue
    slope.b1[o]! += d
    const at = y * (side + 2) + x
    for (let j = 0; j < 3; j++) for (let i = 0; i < 3; i++) slope.w1[o * 9 + j * 3 + i]! += d * input[at + j * (side + 2) + i]!
  }
}

export function softmax(logits: Float32Array): Float32Array {
  const most = Math.max(...logits)
  const out = logits.map((v) => Math.exp(v - most))
  const sum = out.reduce((a, b) => a + b, 0)
  return out.map((v) => v / sum)
}
