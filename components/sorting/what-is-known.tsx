import type { LooseLeaf, SortingTable } from '@/lib/core/sorting'
import { NameBoxes } from './name-boxes'
import { whyLoose } from './reason-words'
import { sayLeaf } from './say-leaf'
import { howSure, sayNeighbour } from './sorting-words'
import style from './sorting.module.css'

type WhatIsKnownProps = Readonly<{ leaf: LooseLeaf; table: SortingTable; page: number | null; onPage: (page: number) => void }>

/** What the sheet in hand shows, what lies beside it, and why it is loose. */
export function WhatIsKnown({ leaf, table, page, onPage }: WhatIsKnownProps) {
  const readable = leaf.guesses.length > 0
  const named = page !== null && page === table.namePage && readable
  return (
    <section aria-label="What is known">
      <h2>What is known</h2>
      <dl className={style.known}>
        <dt>Page</dt>
        <dd>
          {table.pages.length > 1 && (
            <span className={style.pages} role="radiogroup" aria-label="Page of the paper">
              {table.pages.map((one) => <label key={one.page}><input type="radio" name={`page-${leaf.id}`} checked={one.page === page} onChange={() => onPage(one.page)} aria-label={`Page ${one.page}`} />{one.page}</label>)}
            </span>
          )}
          {howSure(leaf, page)}
        </dd>
        {readable && <><dt>The hand</dt><dd><span className={style.hand}><img src={`/api/leaves/${leaf.id}/crop?box=hand`} alt="writing on this sheet" /></span></dd></>}
        <dt>Name, number</dt>
        <dd>{named ? <NameBoxes leafId={leaf.id} boxes={table.nameBoxes} of={sayLeaf(leaf)} /> : noName(table.namePage, page)}</dd>
        <dt>Before it</dt><dd>{sayNeighbour(leaf.before, table)}</dd>
        <dt>After it</dt><dd>{sayNeighbour(leaf.after, table)}</dd>
        <dt>Why it is loose</dt><dd>{whyLoose(leaf)}</dd>
      </dl>
    </section>
  )
}

function noName(namePage: number | null, page: number | null): string {
  if (namePage === null) return 'the paper has no name box'
  if (page === null) return 'not known yet'
  return page === namePage ? 'not found on it' : `none: page ${page} has no name box`
}
