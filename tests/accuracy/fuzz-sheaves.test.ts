import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { AppError } from '@/lib/core/errors'
import { fileKind } from '@/lib/core/file-kind'
import { decodePage } from '@/lib/reading/decode-page'
import { openSheaf } from '@/lib/reading/open-sheaf'
import { wrapScan } from '@/lib/reading/pictures/wrap-scan'
import { mutate, seeded } from '@/tests/make/mutate'
import { smallSheaves } from '@/tests/make/small-sheaves'

// A few hundred broken files with a fixed seed. For longer: FUZZ_CASES=20000 FUZZ_SEED=7 npx vitest run -c tests/vitest.config.ts tests/accuracy/fuzz-sheaves.test.ts
const cases = Number(process.env['FUZZ_CASES'] ?? 300)
const firstSeed = Number(process.env['FUZZ_SEED'] ?? 1)
/** No small file takes longer than this, in milliseconds, on a machine that has other things to do as well. */
const longest = 20_000
const mostPages = 4

let folder = ''
const rejected: unknown[] = []
const note = (error: unknown) => { rejected.push(error) }
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'fuzz-'))
  process.on('unhandledRejection', note)
})
afterAll(() => {
  process.off('unhandledRejection', note)
  rmSync(folder, { recursive: true })
})

/** What a file comes to; anything thrown that is no AppError goes through. */
async function comesTo(bytes: Buffer): Promise<string> {
  const path = join(folder, 'file.pdf')
  writeFileSync(path, bytes)
  try {
    const kind = fileKind(bytes)
    if (kind !== 'pdf') await wrapScan([path], join(folder, 'wrapped.pdf'))
    const sheaf = openSheaf(kind === 'pdf' ? path : join(folder, 'wrapped.pdf'))
    try {
      for (let index = 0; index < Math.min(mostPages, sheaf.pageCount); index++) await decodePage(sheaf, index).catch(expected)
      return 'opened'
    } finally {
      sheaf.close()
    }
  } catch (error) {
    return expected(error)
  }
}
function expected(error: unknown): string {
  if (error instanceof AppError) return error.code
  throw error
}

it(`${cases} broken files come to an end each: read, or turned down with a reason`, { timeout: 60_000 + cases * 1000 }, async () => {
  const sheaves = Object.entries(await smallSheaves())
  for (const [name, bytes] of sheaves) expect([name, await comesTo(bytes)]).toEqual([name, 'opened'])
  const found: Record<string, number> = {}
  for (let k = 0; k < cases; k++) {
    const seed = firstSeed * 1_000_003 + k
    const [name, bytes] = sheaves[k % sheaves.length]!
    const started = performance.now()
    const outcome = await comesTo(mutate(bytes, seeded(seed))).catch((error: unknown) => {
      throw new Error(`seed ${seed} of ${name}`, { cause: error })
    })
    if (performance.now() - started > longest) throw new Error(`seed ${seed} of ${name} takes ${Math.round(performance.now() - started)} ms`)
    found[outcome] = (found[outcome] ?? 0) + 1
  }
  console.log(`fuzz: ${JSON.stringify(found)}`)
  expect(rejected).toEqual([])
  // most faults leave something to be read
  expect(found['opened']).toBeGreaterThan(cases / 3)
})
