import type { NumberReading } from '@/lib/core/digit-reading'
import type { PaperBox } from '@/lib/core/paper'
import { getPaper } from '@/db/papers'
import type { Db } from '@/db/knex'
import { getLeafEvidence } from '@/db/leaves'
import { listScriptPages } from '@/db/scripts'

/**
 * What each script of a paper shows in its candidate number's boxes, by script. Only where the scan that holds was read as that page and in
 * the boxes as they now stand.
 */
export async function readNumbers(db: Db, paperId: string): Promise<Map<string, NumberReading>> {
  const boxes = ((await getPaper(db, paperId))?.boxes ?? []).filter(({ kind }) => kind === 'number')
  const page = boxes[0]?.page
  const found = new Map<string, NumberReading>()
  if (page === undefined) return found
  const pages = (await listScriptPages(db, paperId)).filter((one) => one.paperPage === page && one.leafId !== null)
  const evidence = await getLeafEvidence(db, pages.map(({ leafId }) => leafId!))
  for (const { scriptId, leafId } of pages) {
    const reading = evidence.get(leafId!)?.reading
    if (reading?.number && reading.guesses[0]?.paperPage === page && sameBoxes(reading.number, boxes.filter((box) => box.page === page))) found.set(scriptId, reading.number)
  }
  return found
}

function sameBoxes(reading: NumberReading, boxes: readonly PaperBox[]): boolean {
  return reading.boxes.length === boxes.length && reading.boxes.every((was, k) => {
    const { x, y, w, h } = boxes[k]!.rect
    return Math.max(Math.abs(was.x - x), Math.abs(was.y - y), Math.abs(was.w - w), Math.abs(was.h - h)) < 1
  })
}
