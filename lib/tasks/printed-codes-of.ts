import type { PrintedCodes, PrintedPage } from '@/lib/core/printed-code'
import type { Db } from '@/db/knex'
import { listPrintedPages, type PrintedFor } from '@/db/print-runs'

/**
 * All codes that may lie in a sheaf of a paper. Pages printed for one student are one script, whichever print run they come from: a lost
 * page printed anew joins the others. A spare script is its own.
 */
export async function printedCodesOf(db: Db, paperId: string): Promise<PrintedCodes> {
  const pages = await listPrintedPages(db, paperId)
  return new Map(pages.map(({ token, paperPage, rect, ...whose }): [string, PrintedPage] => [token, { script: keyOf(whose), paperPage, rect }]))
}

function keyOf({ printedScriptId, classSetId, studentId }: PrintedFor): string {
  return studentId === null ? printedScriptId : `${classSetId}/${studentId}`
}

/** Whom a printed script is for, from its key. */
export function whoseIs(key: string): { classSetId: string; studentId: string } | { printedScriptId: string } {
  const [classSetId, studentId] = key.split('/')
  return studentId === undefined ? { printedScriptId: key } : { classSetId: classSetId!, studentId }
}
