import { KeyCap } from '@/components/ui/key-cap'
import type { SortScript, SortingTable } from '@/lib/core/sorting'
import { LeafPicture } from './leaf-picture'
import { whose } from './sorting-words'
import style from './sorting.module.css'

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
