import type { LeafStub } from '@/lib/core/sorting'
import { sayLeaf } from './say-leaf'
import style from './sorting.module.css'

/** Leaves that are kept but not used; each can come back to the table. */
export function KeptLeaves({ title, says, leaves, busy, onBack }: { title: string; says: string; leaves: readonly LeafStub[]; busy: boolean; onBack: (leaf: LeafStub) => void }) {
  if (leaves.length === 0) return null
  return (
    <details className={style.fold}>
      <summary>{title} <small>{leaves.length}, {says}</small></summary>
      <div className={style.stubs}>
        {leaves.map((leaf) => (
          <figure key={leaf.id}>
            <img src={`/api/leaves/${leaf.id}/picture?width=240&turn=${leaf.turn}`} alt={`${sayLeaf(leaf)} of ${leaf.sheafName}`} loading="lazy" />
            <figcaption className="dense">{sayLeaf(leaf)} <button type="button" className={style.act} disabled={busy} onClick={() => onBack(leaf)} aria-label={`Bring ${sayLeaf(leaf)} back`}>bring back</button></figcaption>
          </figure>
        ))}
      </div>
    </details>
  )
}
