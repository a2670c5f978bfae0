import Link from 'next/link'
import { KeyCap } from '@/components/ui/key-cap'
import styles from './mark-book.module.css'

/** What the signs of the mark book mean, its keys, and the way to the list of what is left to mark. */
export function KeyLine({ csv, marking }: { csv: string | null; marking: string | null }) {
  return (
    <footer className={styles.keys}>
      <span><b aria-hidden>·</b> not marked</span>
      <span><i>nr</i> nothing written, counts 0</span>
      <span><span className={styles.se}>2</span> second-marked</span>
      <span><span className={styles.ag}>1</span> agreed</span>
      <span><svg viewBox="0 0 8 10" aria-hidden><path d="M1 .5v9M1 1h6L5.4 3.2 7 5.4H1" /></svg> flagged</span>
      <span><span className={styles.box} /> page missing</span>
      <span>12 + more to come</span>
      {marking && <Link href={marking}>Go on marking</Link>}
      {csv && <a href={csv} download>Save as CSV</a>}
      <span className={styles.hint}>
        <KeyCap>←</KeyCap><KeyCap>→</KeyCap><KeyCap>↑</KeyCap><KeyCap>↓</KeyCap><span>move</span>
        <KeyCap>↵</KeyCap><span>open the answer</span><KeyCap>R</KeyCap><span>run this column</span>
      </span>
    </footer>
  )
}
