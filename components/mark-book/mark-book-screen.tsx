'use client'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { MarkBook } from '@/lib/core/mark-book'
import { Alarm } from '@/components/ui/alarm'
import { ask, RefusedError } from '@/components/ui/ask'
import { KeyLine } from './key-line'
import styles from './mark-book.module.css'
import { MarkBookTable } from './mark-book-table'
import { NothingScanned } from './nothing-scanned'

// Marks others give show up within this time without a reload.
const freshEvery = 10_000

/** The live mark book of a paper. `first` is what the page was sent with. */
export function MarkBookScreen({ first }: { first: MarkBook }) {
  const [classSetId, setClassSetId] = useState(first.classSetId)
  const query = classSetId === null ? '' : `?classSet=${classSetId}`
  const { data, error } = useQuery({
    queryKey: ['mark-book', first.paperId, classSetId],
    queryFn: () => ask<MarkBook>(`/api/papers/${first.paperId}/mark-book${query}`),
    initialData: classSetId === first.classSetId ? first : undefined,
    placeholderData: keepPreviousData,
    refetchInterval: freshEvery,
  })
  const book = data ?? first
  const empty = book.rows.every(({ scriptId }) => scriptId === null)
  const left = book.rows.some(({ cells }) => cells.some((cell) => cell?.state === 'unmarked'))
  return (
    <main className="relative">
      <h1 className="vh">Mark book</h1>
      {error && <Alarm code={error instanceof RefusedError ? error.code : 'failed'} />}
      <div className={styles.wrap}><MarkBookTable book={book} onClassSet={setClassSetId} /></div>
      {empty && book.whole ? <NothingScanned book={book} /> : <KeyLine csv={book.whole ? `/api/papers/${book.paperId}/mark-book-csv${query}` : null} marking={left ? `/papers/${book.paperId}/mark` : null} />}
    </main>
  )
}
