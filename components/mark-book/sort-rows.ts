import type { MarkBookRow } from '@/lib/core/mark-book'

export type BookOrder = 'name' | 'number' | 'total'

const totalOfRow = ({ total }: MarkBookRow) => total?.final ?? -1

/** Rows as asked for; by name is the order they come in. The highest total first, who has none last. */
export function sortRows(rows: readonly MarkBookRow[], order: BookOrder): readonly MarkBookRow[] {
  if (order === 'name') return rows
  if (order === 'total') return [...rows].sort((a, b) => totalOfRow(b) - totalOfRow(a))
  return [...rows].sort((a, b) => a.candidateNumber.localeCompare(b.candidateNumber, 'en', { numeric: true }) || (a.scriptNumber ?? 0) - (b.scriptNumber ?? 0))
}
