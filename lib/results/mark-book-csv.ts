import Papa from 'papaparse'
import type { MarkBook, MarkBookCell } from '@/lib/core/mark-book'
import { marksOf } from '@/lib/core/marks'

const cellText = (cell: MarkBookCell | null) => (cell?.state !== 'marked' ? '' : cell.nothingWritten ? 'nr' : String(marksOf(cell.mark!)))

/**
 * The mark book as a file for a spreadsheet: marks as decimals (0.5), nothing where unmarked, `nr` for nothing written. Text that
 * a spreadsheet would take for a formula is quoted with an apostrophe. Begins with a byte order mark so that names keep their accents.
 */
export function markBookCsv(book: Pick<MarkBook, 'questions' | 'rows'>): string {
  const fields = ['candidate_number', 'family_name', 'given_name', 'attendance', ...book.questions.map(({ label }) => label), 'total', 'marks_to_come', 'maximum', 'grade']
  const data = book.rows.map((row) => [
    row.candidateNumber, row.familyName, row.givenName, row.attendance, ...row.cells.map(cellText),
    row.total ? String(marksOf(row.total.final)) : '', row.total ? String(row.total.toCome) : '', row.total ? String(marksOf(row.total.maximum)) : '', row.grade ?? '',
  ])
  return `\uFEFF${Papa.unparse({ fields, data }, { escapeFormulae: true, newline: '\r\n' })}\r\n`
}
