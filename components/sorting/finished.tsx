import Link from 'next/link'
import type { ReactNode } from 'react'
import type { SortingTable } from '@/lib/core/sorting'
import { fullName } from './sorting-words'
import style from './sorting.module.css'

/** Nothing is loose and every name is given: where to go next. */
export function Finished({ table }: { table: SortingTable }) {
  const away = table.students.filter(({ scriptId, attendance }) => scriptId === null && attendance === 'expected')
  if (table.scripts.length === 0) {
    return <ClearTable><h1>Nothing to sort yet</h1><p className="my-4">{table.reading > 0 ? 'A sheaf is being read. What is not certain will lie here.' : 'Sheets come here from the sheaf: scan the pile first.'}</p><Link className="btn lead" href={`/papers/${table.paperId}/scan`}>To the scan</Link></ClearTable>
  }
  return (
    <ClearTable>
      <h1>All sorted</h1>
      <p className="my-4">{table.scripts.length} scripts, every one with a name.{away.length > 0 ? ` ${away.length === 1 ? `${fullName(away[0]!)} has` : `${away.length} students have`} no script: absent, or a sheet is missing.` : ''}</p>
      <Link className="btn lead" href={`/papers/${table.paperId}`}>To the mark book</Link>
    </ClearTable>
  )
}

/** Nothing lies on the table. */
function ClearTable({ children }: { children: ReactNode }) {
  return <section className={style.finished} aria-label="The table is clear">{children}</section>
}
