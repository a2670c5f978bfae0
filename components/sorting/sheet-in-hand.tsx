import { Finished } from './finished'
import { LooseSide } from './loose-side'
import { PlacedSide } from './placed-side'
import { zooms } from './sorting-view'
import type { SortingDesk } from './use-sorting-desk'

/** The left of the table: the page looked at, else the loose sheet in hand, else the page whose name is open, else that all is done. */
export function SheetInHand({ desk }: { desk: SortingDesk }) {
  const { table, view, busy, leaf, page, looked, named, namedLeaf, refused, perform, send, turn, forgive } = desk
  const zoom = zooms[view.zoom]!
  const loosen = (leafId: string) => perform({ act: 'lay', leafId, to: 'loose' })
  if (looked && view.looking) {
    const { leafId } = view.looking
    return <PlacedSide leafId={leafId} script={looked} table={table} zoom={zoom} inHand={false} busy={busy} onOut={() => loosen(leafId)} onBack={() => send({ type: 'look', at: null })} />
  }
  if (leaf) {
    const failedPlace = refused?.act.act === 'place' && view.asking === 'corners' ? refused.act : null
    return <LooseSide leaf={leaf} page={page} zoom={zoom} cornersOf={failedPlace} busy={busy} onTurn={turn} onCorners={perform} onCancel={() => { forgive(); send({ type: 'ask', for: 'nothing' }) }} />
  }
  if (named && namedLeaf) return <PlacedSide leafId={namedLeaf.leafId} script={named} table={table} zoom={zoom} inHand busy={busy} onOut={() => loosen(namedLeaf.leafId)} onBack={null} />
  return <Finished table={table} />
}
