import type { PrintedCodes, PrintedPage } from '@/lib/core/printed-code'
import type { Db } from '@/db/knex'
import { listPrintedPages, type PrintedFor } from '@/db/print-runs'

/**
 * All codes that may lie in a sheaf of these papers, its own first. Pages printed for one student are one script, whichever print run they come from: a lost
 * page printed anew joins the others. A spare script is its own.
 */
export async function printedCodesOf(db: Db, paperIds: readonly string[]): Promise<PrintedCodes> {
  const codes = new Map<string, PrintedPage>()
  for (const [paper, paperId] of paperIds.entries()) {
    const pages = await listPrintedPages(db, paperId)
    for (const { token, paperPage, rect, ...whose } of pages) codes.set(token, { script: keyOf(whose), paperPage, rect, paper })
  }
  return codes
}

function keyOf({ printedScriptId, classSetId, studentId }: PrintedFor): string {
  return studentId === null ? printedScriptId : `${classSetId}/${studentId}`
}

/** Whom a printed script is for, from its key. */
export function whoseIs(key: string): { classSetId: string; studentId: string } | { printedScriptId: string } {
  const [classSetId, studentId] = key.split('/')
  return studentId === undefined ? { printedScriptId: key } : { classSetId: classSetId!, studentId }
}
