'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import type { PrintView } from '@/lib/core/print-view'
import type { CodeSpot } from '@/lib/core/printed-code'
import { allSame, sayPlace, withSpot } from './code-spot-edits'
import { CodeSheet } from './code-sheet'
import { MakePack } from './make-pack'
import css from './printing.module.css'

export type PrintActs = Readonly<{ saveSpots: (raw: unknown) => Promise<Outcome<void>>; suggestSpots: (raw: unknown) => Promise<Outcome<CodeSpot[]>> }>
type PrintScreenProps = Readonly<{ view: PrintView; acts: PrintActs }>

/** The page with the code on it, and beside it what there is to say about the code and the pack. Places are saved as they are laid. */
export function PrintScreen({ view, acts }: PrintScreenProps) {
  const { pages, paperId } = view
  const [page, setPage] = useState(pages[0]?.page ?? 1)
  const [spots, setSpots] = useState(view.spots)
  const [same, setSame] = useState(view.spots.length > 0 && allSame(view.spots))
  const { busy, trouble, run } = useOutcome()
  const shown = pages.find((each) => each.page === page)
  const spot = spots.find((each) => each.page === page)
  if (!view.blank || !shown) return <NoBlank paperId={paperId} />

  async function lay(next: readonly CodeSpot[]) {
    setSpots(next)
    await run(acts.saveSpots({ paperId, spots: next }), () => undefined)
  }
  const find = () => run(acts.suggestSpots({ paperId, same }), async (found) => {
    setSame(found.length > 1 && allSame(found))
    await lay(found)
  })
  const missing = pages.filter((each) => !spots.some((one) => one.page === each.page))
  return (
    <main className={css.print}>
      <section className={css.desk} aria-label={`Blank paper, page ${page} of ${pages.length}`}>
        {pages.length > 1 && (
          <div className={`tabs ${css.pages}`} role="group" aria-label="Pages">
            {pages.map((each) => <button key={each.page} type="button" aria-current={each.page === page ? 'page' : undefined} onClick={() => setPage(each.page)}>{pages.length > 4 ? each.page : `Page ${each.page}`}</button>)}
          </div>
        )}
        <CodeSheet
          picture={`/api/papers/${paperId}/pages/${page}?v=${view.blank}`} page={shown} rect={spot?.rect ?? null} refused={trouble?.code === 'code_place_bad' && trouble.detail.page === page}
          spaces={view.spaces.filter((space) => space.page === page).map(({ rect }) => rect)} onPlace={(rect) => void lay(withSpot(spots, { page, rect }, pages, same))}
        />
      </section>
      <section className={css.side} aria-label="Codes and the pack">
        <h1>Print with codes</h1>
        <p className="soft mt-1">For papers that are printed from here. Each page gets its student’s name and a code, so the pile may come back from the copier in any order. The code itself says nothing of anyone.</p>
        <h2 className="cap mt-6">Where the code goes</h2>
        <p className="mt-3">{spot ? `Page ${page}: ${sayPlace(spot.rect, shown)}.` : `Page ${page} has no code yet. Press on the page where it should stand.`}</p>
        {pages.length > 1 && <label className="chk mt-2"><input type="checkbox" checked={same} onChange={(event) => { setSame(event.target.checked); if (event.target.checked && spot) void lay(withSpot(spots, spot, pages, true)) }} /> The same place on every page</label>}
        <p className="mt-3 flex flex-wrap items-center gap-3"><button type="button" className={`btn ${spots.length === 0 ? 'lead' : ''}`} disabled={busy} onClick={() => void find()}>Find a free place</button>{busy && <span className="soft" role="status">Looking at the page</span>}</p>
        {trouble && <div className="mt-3"><Alarm code={trouble.code} detail={trouble.detail} /></div>}
        <MakePack view={view} ready={missing.length === 0 && !trouble} missing={missing.map((each) => each.page)} />
      </section>
    </main>
  )
}

function NoBlank({ paperId }: { paperId: string }) {
  return (
    <main className="page">
      <div className="slip mx-auto mt-16">
        <h1>There is no blank paper yet</h1>
        <p className="mt-2 mb-4">Codes are printed onto the pages of the test: put its PDF in first.</p>
        <a className="btn lead" href={`/papers/${paperId}/details#blank`}>Choose the blank paper</a>
      </div>
    </main>
  )
}
