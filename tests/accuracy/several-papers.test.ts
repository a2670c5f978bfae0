import { mkdtemp, readFile, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFDocument } from 'pdf-lib'
import { expect, it } from 'vitest'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { ingestSheaf } from '@/lib/tasks/ingest-sheaf'
import { classSetFolder } from './class-set'

const sets = ['everyday', 'booklet'] as const

/** A sheaf of leaves of both class sets: A4 and Letter, grey and colour. */
async function mixedSheaf(leaves: readonly (readonly [set: 0 | 1, index: number])[]): Promise<string> {
  const from = await Promise.all(sets.map(async (name) => PDFDocument.load(await readFile(join(classSetFolder(name), 'scan.pdf')))))
  const to = await PDFDocument.create()
  for (const [set, index] of leaves) to.addPage((await to.copyPages(from[set]!, [index]))[0])
  const file = join(await mkdtemp(join(tmpdir(), 'sheafmark-papers-')), 'scan.pdf')
  await writeFile(file, await to.save())
  return file
}

it('matches each leaf of a mixed sheaf against every paper named, A4 and Letter together', async () => {
  const papers = await Promise.all(sets.map(async (name, paper) => (await openBlankPaper(await readFile(join(classSetFolder(name), 'paper.pdf')))).map((page) => ({ ...page, paper }))))
  const sheaf = await mixedSheaf([[0, 0], [0, 1], [1, 0], [1, 1], [1, 2], [1, 3], [0, 2], [0, 3]])
  const { findings } = await ingestSheaf({ sheaf, paper: papers.flat() })
  expect(findings.map(({ paper, script, paperPage }) => [paper, script, paperPage])).toEqual([[0, 1, 1], [0, 1, 2], [1, 2, 1], [1, 2, 2], [1, 2, 3], [1, 2, 4], [0, 3, 1], [0, 3, 2]])
})
