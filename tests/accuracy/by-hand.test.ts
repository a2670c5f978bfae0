import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { ingestSheaf } from '@/lib/tasks/ingest-sheaf'
import { openLeaves } from '@/lib/tasks/read-leaves'
import { classSetFolder } from './class-set'

const folder = classSetFolder('booklet')
const foreignLeaf = 20

describe('a leaf placed by hand', () => {
  it('is registered to the page a person names, upside down or not, and refused where its print is not', async () => {
    const paper = await openBlankPaper(await readFile(join(folder, 'paper.pdf')))
    const truth = JSON.parse(await readFile(join(folder, 'truth.json'), 'utf8')) as { pages: { rotation: number; paper_page: number | null }[] }
    const reader = await openLeaves(join(folder, 'scan.pdf'), paper)
    try {
      expect(await reader.readOnto(14, { paperPage: 3 })).toMatchObject({ paperPage: 3, rotation: truth.pages[14]!.rotation })
      expect(await reader.readOnto(14, { paperPage: 2 })).toBeNull()
      expect(await reader.readOnto(foreignLeaf, { paperPage: 1 })).toBeNull()
    } finally {
      await reader.close()
    }
  })

  it('leaves are not read again when their readings are stored', async () => {
    const paper = await openBlankPaper(await readFile(join(folder, 'paper.pdf')))
    const sheaf = join(folder, 'scan.pdf')
    const reader = await openLeaves(sheaf, paper)
    const stored = (await Promise.all([0, 1, 2, 3].map((index) => reader.read(index))).finally(() => reader.close())).flat()
    const seen: number[] = []
    const { findings } = await ingestSheaf({ sheaf, paper, stored, onLeaf: (leaves) => void seen.push(leaves[0]!.index) })
    expect(Math.min(...seen)).toBe(4)
    expect(seen).toHaveLength(46)
    expect(findings.slice(0, 4).map(({ script, paperPage }) => [script, paperPage])).toEqual([[1, 1], [1, 2], [1, 3], [1, 4]])
  })
})
