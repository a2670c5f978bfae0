import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { corners, mmPerPoint, toPaper, toPixels } from '@/lib/core/paper-space'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { openSheaf } from '@/lib/reading/open-sheaf'
import { openLeaves, type LeafReader } from '@/lib/tasks/read-leaves'
import { wrappedSheaf } from '@/tests/make/wrapped-leaf'
import { classSetFolder } from './class-set'
import type { Truth } from './score-result'

/** How far off a region's corner may land, in mm. */
const bar = 0.5
const sets = {
  'one-page': ['flate grey', 'print colours', 'jbig2', 'strips', 'background and mask', 'turned by its matrix, off the origin, in another unit', 'cropped and turned by /Rotate'],
  bitonal: ['jbig2 mmr', 'inline image'],
} as const

describe.each(Object.entries(sets))('pages of the set %s, wrapped as other copiers do,', (set, kinds) => {
  const folder = mkdtempSync(join(tmpdir(), 'wrapped-'))
  const truth = JSON.parse(readFileSync(join(classSetFolder(set), 'truth.json'), 'utf8')) as Truth
  let reader: LeafReader
  beforeAll(async () => {
    const source = openSheaf(join(classSetFolder(set), 'scan.pdf'))
    writeFileSync(join(folder, 'scan.pdf'), await wrappedSheaf(source, kinds.map((as, index) => ({ index, as }))))
    source.close()
    reader = await openLeaves(join(folder, 'scan.pdf'), await openBlankPaper(readFileSync(join(classSetFolder(set), 'paper.pdf'))))
  })
  afterAll(async () => {
    await reader.close()
    rmSync(folder, { recursive: true })
  })

  it.each(kinds.map((kind, index) => [kind, index] as const))('are placed to the half millimetre: %s', async (_, index) => {
    const [reading] = await reader.read(index)
    const page = truth.pages[index]!
    const guess = reading!.guesses[0]!
    expect([reading!.problem, guess?.paperPage, guess?.rotation]).toEqual([undefined, page.paper_page, page.rotation])
    const off = truth.questions.filter((question) => question.page === page.paper_page).flatMap(({ region }) => corners(region)).map((corner) => {
      const seen = toPaper(guess.homography, toPixels(page.homography!, corner))
      return Math.hypot(seen.x - corner.x, seen.y - corner.y) * mmPerPoint
    })
    expect(Math.max(...off)).toBeLessThan(bar)
  })
})
