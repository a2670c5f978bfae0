import type { Turn } from '@/lib/core/paper-space'
import { certainName, type LooseLeaf, type SortScript, type SortingTable } from '@/lib/core/sorting'

/** What a person has in hand, and how they look at it: nothing here is stored. */
export type SortingView = Readonly<{
  /** Left for later, in the order they were. */
  later: readonly string[]
  /** The page a person says a loose sheet is. */
  pages: Readonly<Record<string, number>>
  zoom: number
  asking: 'nothing' | 'place' | 'extra' | 'corners' | Readonly<{ nameOf: string }>
  /** A placed leaf a person looks at, and its script. */
  looking: Readonly<{ leafId: string; scriptId: string }> | null
}>

export const startView: SortingView = { later: [], pages: {}, zoom: 0, asking: 'nothing', looking: null }
export const zooms = [1, 1.4, 2, 2.8] as const

export type ViewEvent =
  | Readonly<{ type: 'later'; leafId: string }>
  | Readonly<{ type: 'page'; leafId: string; page: number }>
  | Readonly<{ type: 'zoom'; by: 1 | -1 }>
  | Readonly<{ type: 'ask'; for: SortingView['asking'] }>
  | Readonly<{ type: 'look'; at: SortingView['looking'] }>
  | Readonly<{ type: 'settled' }>

export function nextView(view: SortingView, event: ViewEvent): SortingView {
  switch (event.type) {
    case 'later': return { ...view, later: [...view.later.filter((id) => id !== event.leafId), event.leafId], asking: 'nothing', looking: null }
    case 'page': return { ...view, pages: { ...view.pages, [event.leafId]: event.page } }
    case 'zoom': return { ...view, zoom: Math.min(zooms.length - 1, Math.max(0, view.zoom + event.by)) }
    case 'ask': return { ...view, asking: event.for }
    case 'look': return { ...view, looking: event.at, asking: 'nothing' }
    case 'settled': return { ...view, asking: 'nothing', looking: null }
  }
}

/** The loose sheets in the order they are taken up: those left for later come last. */
export function looseOrder(loose: readonly LooseLeaf[], later: readonly string[]): LooseLeaf[] {
  return [...loose.filter(({ id }) => !later.includes(id)), ...later.flatMap((id) => loose.find((leaf) => leaf.id === id) ?? [])]
}

/** The page a sheet would be placed as: what a person says, else what its print says, else its likeliest page; the only page of a one-page paper. */
export function pageInHand(leaf: LooseLeaf, view: SortingView, pages: number): number | null {
  return view.pages[leaf.id] ?? leaf.paperPage ?? leaf.guesses[0]?.paperPage ?? (pages === 1 ? 1 : null)
}

/** Scripts without a name: those to be looked at one by one, then those whose numbers say it with certainty; each in the order of scanning. */
export function openNames(table: Pick<SortingTable, 'scripts'>): { unsure: SortScript[]; certain: SortScript[] } {
  const open = table.scripts.filter(({ studentId }) => studentId === null)
  return { unsure: open.filter((script) => !isCertain(script)), certain: open.filter(isCertain) }
}

function isCertain({ suggestedStudentId, suggestionCertainty }: SortScript): boolean {
  return suggestedStudentId !== null && (suggestionCertainty ?? 0) >= certainName
}

/** The leaf that shows a script's name box, or its first leaf. */
export function nameLeaf(script: SortScript, namePage: number | null): { leafId: string; hasBox: boolean } | null {
  const boxed = script.pages.find(({ paperPage, leafId }) => namePage !== null && paperPage === namePage && leafId !== null)
  const any = boxed ?? script.pages.find(({ leafId }) => leafId !== null)
  return any?.leafId ? { leafId: any.leafId, hasBox: boxed !== undefined } : null
}

/** A turn, a quarter further or back. */
export const turned = (turn: Turn, by: 90 | -90): Turn => ((turn + by + 360) % 360) as Turn
