import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { openSheaf } from '@/lib/reading/open-sheaf'
import { classSetFile } from '@/tests/make/class-set'
import { wrappedSheaf } from '@/tests/make/wrapped-leaf'

let folder = ''
beforeAll(() => { folder = mkdtempSync(join(tmpdir(), 'command-')) })
afterAll(() => rmSync(folder, { recursive: true }))

function ingest(bytes: Uint8Array): { status: number | null; said: string; result: () => { pages: { index: number; kind: string; problem?: string }[] } } {
  const sheaf = join(folder, 'scan.pdf')
  const out = join(folder, 'result.json')
  writeFileSync(sheaf, bytes)
  const { status, stderr } = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/ingest.ts', '--paper', join(classSetFile('one-page', '.')), '--sheaf', sheaf, '--out', out], { encoding: 'utf8' })
  return { status, said: stderr, result: () => JSON.parse(readFileSync(out, 'utf8')) as ReturnType<ReturnType<typeof ingest>['result']> }
}

it('the command turns a file down in one line that says what to do', { timeout: 180_000 }, () => {
  const faults: [Uint8Array, RegExp][] = [
    [Buffer.from('\0\0\0\x18ftypheic and so on'), /HEIC.*save it as JPEG or PDF/],
    [Buffer.from('PK a document'), /neither a PDF nor a picture/],
    [Buffer.from('%PDF-1.7\nnothing of one follows'), /damaged.*scan or send it again/],
    [new Uint8Array(), /is empty/],
  ]
  for (const [bytes, words] of faults) {
    const { status, said } = ingest(bytes)
    expect([status, said.trimEnd().split('\n').length]).toEqual([2, 1])
    expect(said).toMatch(words)
  }
})

it('the command keeps the good pages of a damaged sheaf and names the bad one', { timeout: 180_000 }, async () => {
  const source = openSheaf(classSetFile('one-page', 'scan.pdf'))
  const whole = await wrappedSheaf(source, [0, 1, 2].map((index) => ({ index, as: 'strips' })))
  source.close()
  // the end is lost, and with it the tree, the table and a part of the last page
  const { status, said, result } = ingest(whole.subarray(0, whole.lastIndexOf('/Type/Page/') - 4000))
  expect([status, said]).toEqual([0, ''])
  const { pages } = result()
  expect(pages.map(({ index, kind, problem }) => [index, kind, problem])).toEqual([[0, 'script', undefined], [1, 'script', undefined], [2, 'loose', 'page_unreadable']])
})
