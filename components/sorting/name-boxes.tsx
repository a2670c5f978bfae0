import type { SortScript, SortingTable } from '@/lib/core/sorting'
import { nameLeaf } from './sorting-view'
import style from './sorting.module.css'

/** Name and candidate number as written, side by side. */
export function NameBoxes({ leafId, boxes, of }: { leafId: string; boxes: readonly ('name' | 'number')[]; of: string }) {
  return (
    <span className={style.boxes}>
      {boxes.map((box) => <img key={box} className={style[box]} src={`/api/leaves/${leafId}/crop?box=${box}`} alt={`${box === 'name' ? 'name' : 'candidate number'} as written, ${of}`} loading="lazy" />)}
    </span>
  )
}

/** The name boxes of a script; pressed, its page is looked at large. */
export function NameBox({ script, table, onLook }: { script: SortScript; table: SortingTable; onLook: (leafId: string) => void }) {
  const leaf = nameLeaf(script, table.namePage)
  if (!leaf) return <span className="soft">no page is left in it</span>
  return (
    <button type="button" className={style.look} onClick={() => onLook(leaf.leafId)} aria-label={`Look at script ${script.number}`}>
      {leaf.hasBox ? <NameBoxes leafId={leaf.leafId} boxes={table.nameBoxes} of={`script ${script.number}`} /> : <span className="soft underline">script {script.number} has no page with the name: look at what there is</span>}
    </button>
  )
}
