import type { NumberReading } from '@/lib/core/digit-reading'
import type { PaperBox } from '@/lib/core/paper'
import { getPaper } from '@/db/papers'
import type { Db } from '@/db/knex'
import { getSeenWriting } from '@/db/leaves'
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
  const seen = await getSeenWriting(db, pages.map(({ leafId }) => leafId!), 'number')
  for (const { scriptId, leafId } of pages) {
    const read = seen.get(leafId!)
    if (read?.paperPage === page && sameBoxes(read.seen, boxes.filter((box) => box.page === page))) found.set(scriptId, read.seen)
  }
  return found
}

function sameBoxes(reading: NumberReading, boxes: readonly PaperBox[]): boolean {
  return reading.boxes.length === boxes.length && reading.boxes.every((was, k) => {
    const { x, y, w, h } = boxes[k]!.rect
    return Math.max(Math.abs(was.x - x), Math.abs(was.y - y), Math.abs(was.w - w), Math.abs(was.h - h)) < 1
  })
}
