import { mkdtemp, readFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { expect, it } from 'vitest'
import { mmPerPoint, toPaper, toPixels, type Homography } from '@/lib/core/paper-space'
import { openBlankPaper } from '@/lib/reading/open-blank-paper'
import { ingestSheaf } from '@/lib/tasks/ingest-sheaf'
import { aTwoUpScan } from '@/tests/make/two-up'
import { classSetFolder } from './class-set'

type Truth = Readonly<{ pages: readonly Readonly<{ homography: Homography; width_px: number; height_px: number }>[] }>

it('cuts a scan with two pages side by side into them, each where it lies', async () => {
  const folder = classSetFolder('everyday')
  const paper = await openBlankPaper(await readFile(join(folder, 'paper.pdf')))
  const sheaf = join(await mkdtemp(join(tmpdir(), 'sheafmark-two-up-')), 'scan.pdf')
  await aTwoUpScan(sheaf, join(folder, 'scan.pdf'), [[0, 1], [2, 3], [4, null]])
  const { readings, findings } = await ingestSheaf({ sheaf, paper })
  expect(findings.map(({ index, half, kind, script, paperPage }) => [index, half, kind, script, paperPage])).toEqual([
    [0, 0, 'script', 1, 1], [0, 1, 'script', 1, 2], [1, 0, 'script', 2, 1], [1, 1, 'script', 2, 2], [2, 0, 'script', 3, 1], [2, 1, 'blank', null, null],
  ])
  const truth = (JSON.parse(await readFile(join(folder, 'truth.json'), 'utf8')) as Truth).pages
  const { image } = readings[0]!
  for (const [k, of] of [0, 1, 2, 3].entries()) {
    const { homography, width_px, height_px } = truth[of]!
    const at = toPixels(homography, { x: 400, y: 500 })
    const onSheet = { x: ((at.x / width_px + findings[k]!.half!) * image!.width) / 2, y: (at.y / height_px) * image!.height }
    const found = toPaper(findings[k]!.homography!, onSheet)
    expect(Math.hypot(found.x - 400, found.y - 500) * mmPerPoint).toBeLessThan(0.3)
  }
})
