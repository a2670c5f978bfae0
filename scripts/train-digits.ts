import { readFile, writeFile } from 'node:fs/promises'
import { parseArgs } from 'node:util'
import { loadNet } from '@/lib/placing/digit-weights'
import { makeDice } from './digits/dice'
import { makeLearner, newNet } from './digits/learn'
import { nextLesson, withLines } from './digits/lessons'
import { measure } from './digits/measure'
import { packNet } from './digits/pack-net'
import { packSamples } from './digits/pack-samples'
import { loadSamples } from './digits/samples'

// npm run train:digits [-- --lessons 240000]
// Teaches the reader of handwritten digits and writes lib/placing/digit-weights.json and the held-out sample of its test; then says how
// well it reads digits that neither the lessons nor the class sets used. With --lessons 0 it only measures what is there.

const { values } = parseArgs({ options: { lessons: { type: 'string', default: '240000' } } })
const lessons = Number(values.lessons)
const batch = 32
const sample = 'tests/fixtures/held-out-digits.bin'
const weights = 'lib/placing/digit-weights.json'

async function main(): Promise<void> {
  const { training, heldOut } = loadSamples()
  console.log(`${training.length} samples to learn from, ${heldOut.length} held out`)
  if (lessons > 0) {
    const known = withLines(training)
    const dice = makeDice(2026)
    const net = newNet(dice)
    const learn = makeLearner(net)
    const steps = Math.ceil(lessons / batch)
    for (let step = 0, loss = 0; step < steps; step++) {
      const rate = 0.002 * Math.min(1, (step + 1) / 200) * (0.5 + 0.5 * Math.cos((Math.PI * step) / steps)) + 1e-5
      loss += learn(Array.from({ length: batch }, () => nextLesson(known, dice)), rate)
      if ((step + 1) % 1000) continue
      console.log(`${(step + 1) * batch} lessons, loss ${(loss / 1000).toFixed(4)}`)
      loss = 0
    }
    await writeFile(weights, packNet(net))
    await writeFile(sample, packSamples(heldOut.filter((_, k) => k % 5 === 0)))
  }
  const net = loadNet(JSON.parse(await readFile(weights, 'utf8')))
  for (const line of measure(net, withLines(heldOut))) console.log(line)
}
await main()
