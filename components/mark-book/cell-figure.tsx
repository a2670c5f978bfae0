import type { MarkBookCell } from '@/lib/core/mark-book'
import { MarkFigure } from '@/components/ui/mark-figure'
import styles from './mark-book.module.css'

/** The flag someone raised: drawn, with its word. */
function Flag() {
  return <><svg className={styles.flag} viewBox="0 0 8 10" aria-hidden><path d="M1 .5v9M1 1h6L5.4 3.2 7 5.4H1" /></svg><span className="vh">, flagged</span></>
}

/** What a cell shows: a figure, nr, a heavy dot, or nothing; the words beside it are for who cannot see the signs. */
export function CellFigure({ cell }: { cell: MarkBookCell }) {
  return (
    <>
      {cell.flagged && <Flag />}
      {cell.state === 'hidden' && <span>–<span className="vh"> hidden until you have second-marked it</span></span>}
      {cell.state === 'missing' && <span className="vh">page missing</span>}
      {cell.state === 'unmarked' && <span className={styles.todo}><span aria-hidden>·</span><span className="vh">not marked</span></span>}
      {cell.state === 'marked' && cell.nothingWritten && <span className={styles.nr}><span aria-hidden>nr</span><span className="vh">nothing written, counts 0</span></span>}
      {cell.state === 'marked' && !cell.nothingWritten && <MarkFigure mark={cell.mark!} />}
      {cell.adjusted && <span className="vh">, adjusted</span>}
      {cell.agreed ? <span className="vh">, agreed</span> : cell.secondMarked && <span className="vh">, second-marked</span>}
    </>
  )
}
