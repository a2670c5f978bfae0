import { KeyCap } from '@/components/ui/key-cap'
import type { LooseLeaf } from '@/lib/core/sorting'
import type { SortingAct } from '@/lib/core/sorting-act'
import { FourCorners } from './four-corners'
import { LeafPicture } from './leaf-picture'
import { sayLeaf, sayLeafFirst } from './say-leaf'
import style from './sorting.module.css'

type LooseSideProps = Readonly<{ leaf: LooseLeaf; page: number | null; zoom: number; cornersOf: Extract<SortingAct, { act: 'place' }> | null; busy: boolean; onTurn: (by: 90 | -90) => void; onCorners: (act: SortingAct) => void; onCancel: () => void }>

/** The loose sheet in hand, large. */
export function LooseSide({ leaf, page, zoom, cornersOf, busy, onTurn, onCorners, onCancel }: LooseSideProps) {
  const says = page === null ? 'which page is not known' : leaf.paperPage === page ? `page ${page} of the paper` : `perhaps page ${page} of the paper`
  return (
    <section className={style.sheetSide} aria-label="Loose sheet">
      <div className={style.top}>
        <h1><span className="swipe">{sayLeafFirst(leaf)}</span></h1><span>{says}</span>
        <div className={style.tools}>
          <span className="soft dense">of sheaf {leaf.sheafName}</span>
          <button type="button" className={style.act} disabled={busy} onClick={() => onTurn(-90)}><KeyCap>[</KeyCap> turn left</button>
          <button type="button" className={style.act} disabled={busy} onClick={() => onTurn(90)}><KeyCap>]</KeyCap> turn right</button>
        </div>
      </div>
      <LeafPicture key={leaf.id} leafId={leaf.id} turn={leaf.turn} zoom={zoom} alt={`Loose sheet, ${sayLeaf(leaf)}: ${says}, as scanned`}>
        {cornersOf && leaf.width !== null && leaf.height !== null && (
          <FourCorners key={leaf.turn} width={leaf.width} height={leaf.height} turn={leaf.turn} busy={busy} onCancel={onCancel} onDone={(corners) => onCorners({ ...cornersOf, corners: corners.map(({ x, y }) => ({ x, y })) })} />
        )}
      </LeafPicture>
    </section>
  )
}
