import type { Actor } from '@/lib/core/actor'
import { db } from '@/db/knex'
import { addAuditLine } from '@/db/audit'
import { markBookCsv } from '@/lib/results/mark-book-csv'
import { gatePaper } from './gate-paper'
import { readMarkBook } from './read-mark-book'

/** The mark book of a class set as CSV, with a name for the file; owners only. Leaves an audit line, since marks leave the school's machine. */
export async function exportMarkBook(actor: Actor, paperId: string, classSetId?: string): Promise<{ name: string; csv: string }> {
  await gatePaper(db(), actor, 'change', paperId)
  const book = await readMarkBook(actor, paperId, classSetId)
  const className = book.classSets.find(({ id }) => id === book.classSetId)?.className ?? ''
  await addAuditLine(db(), actor, { act: 'mark_book.exported', objectKind: 'class_set', objectId: book.classSetId ?? '', paperId })
  return { name: `${className} ${book.title}, mark book.csv`.trim(), csv: markBookCsv(book) }
}
