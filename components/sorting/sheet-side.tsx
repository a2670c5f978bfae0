import type { ReactNode } from 'react'
import type { LooseLeaf, SortScript, SortingTable } from '@/lib/core/sorting'
import type { Turn } from '@/lib/core/paper-space'
import type { SortingAct } from '@/lib/core/sorting-act'
import { KeyCap } from '@/components/ui/key-cap'
import { FourCorners } from './four-corners'
import { LeafPicture } from './leaf-picture'
import { whose } from './sorting-words'
import style from './sorting.module.css'

export const turned = (turn: Turn, by: 90 | -90): Turn => ((turn + by + 360) % 360) as Turn

type LooseSideProps = Readonly<{ leaf: LooseLeaf; page: number | null; zoom: number; cornersOf: Extract<SortingAct, { act: 'place' }> | null; busy: boolean; onTurn: (by: 90 | -90) => void; onCorners: (act: SortingAct) => void; onCancel: () => void }>

/** The loose sheet in hand, large. */
export function LooseSide({ leaf, page, zoom, cornersOf, busy, onTurn, onCorners, onCancel }: LooseSideProps) {
  const says = page === null ? 'which page is not known' : leaf.paperPage === page ? `page ${page} of the paper` : `perhaps page ${page} of the paper`
  return (
    <section className={style.sheetSide} aria-label="Loose sheet">
      <div className={style.top}>
        <h1><span className="swipe">Leaf {leaf.number}</span></h1><span>{says}</span>
        <div className={style.tools}>
          <span className="soft dense">of sheaf {leaf.sheafName}</span>
          <button type="button" className={style.act} disabled={busy} onClick={() => onTurn(-90)}><KeyCap>[</KeyCap> turn left</button>
          <button type="button" className={style.act} disabled={busy} onClick={() => onTurn(90)}><KeyCap>]</KeyCap> turn right</button>
        </div>
      </div>
      <LeafPicture key={leaf.id} leafId={leaf.id} turn={leaf.turn} zoom={zoom} alt={`Loose sheet, leaf ${leaf.number}: ${says}, as scanned`}>
        {cornersOf && leaf.width !== null && leaf.height !== null && (
          <FourCorners key={leaf.turn} width={leaf.width} height={leaf.height} turn={leaf.turn} busy={busy} onCancel={onCancel} onDone={(corners) => onCorners({ ...cornersOf, corners: corners.map(({ x, y }) => ({ x, y })) })} />
        )}
      </LeafPicture>
    </section>
  )
}

type PlacedSideProps = Readonly<{ leafId: string; script: SortScript; table: SortingTable; zoom: number; inHand: boolean; busy: boolean; onOut: () => void; onBack: (() => void) | null }>

/** A leaf that lies in a script: the one whose name is in hand, or one a person wants to look at. */
export function PlacedSide({ leafId, script, table, zoom, inHand, busy, onOut, onBack }: PlacedSideProps) {
  const page = script.pages.find((one) => one.leafId === leafId)
  const { name, number, sure } = whose(script, table)
  return (
    <section className={style.sheetSide} aria-label={`Script ${script.number}`}>
      <div className={style.top}>
        <h1>{inHand ? <span className="swipe">Script {script.number}</span> : `Script ${script.number}`}</h1>
        <span>{page?.paperPage ? `page ${page.paperPage}` : 'extra page'}{number && `, ${sure ? '' : 'perhaps '}${name} ${number}`}</span>
        <div className={style.tools}>
          <button type="button" className={style.act} disabled={busy} onClick={onOut}>take this page out</button>
          {onBack && <button type="button" className={style.act} onClick={onBack}><KeyCap>Esc</KeyCap> back</button>}
        </div>
      </div>
      <LeafPicture key={leafId} leafId={leafId} turn={page?.turn ?? 0} zoom={zoom} alt={`Page of script ${script.number}, as scanned`} />
    </section>
  )
}

/** Nothing lies on the table. */
export function ClearTable({ children }: { children: ReactNode }) {
  return <section className={style.finished} aria-label="The table is clear">{children}</section>
}
