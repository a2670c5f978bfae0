import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { PrintView } from '@/lib/core/print-view'
import { listClassSetStudents, listSittingClasses } from '@/db/class-set-students'
import { listCodeSpots } from '@/db/code-spots'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { listPrintCounts } from '@/db/print-runs'
import { gatePaper } from './gate-paper'
import { spacesOf } from './page-grounds'

/** All that the page for printing with codes shows. */
export async function readPrintPage(actor: Actor, paperId: string): Promise<PrintView> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  if (!paper) throw new AppError('not_found')
  const classes = await listSittingClasses(db(), paperId)
  const students = await listClassSetStudents(db(), classes.map(({ classSetId }) => classSetId))
  const counts = await listPrintCounts(db(), paperId)
  return {
    paperId, title: paper.title, blank: paper.blankFileId, pages: paper.pages, spaces: spacesOf(paper), spots: await listCodeSpots(db(), paperId),
    classSets: classes.map(({ classSetId, className, satOn }) => {
      const printed = counts.find((count) => count.classSetId === classSetId)
      const expected = students.filter((student) => student.classSetId === classSetId && student.attendance === 'expected')
      return { id: classSetId, className, satOn, students: expected.length, runs: printed?.runs ?? 0, lastPrinted: printed?.last ?? null }
    }),
  }
}
