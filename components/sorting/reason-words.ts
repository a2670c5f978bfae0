import type { LeafReason } from '@/lib/core/leaf'
import type { LooseLeaf, SortScript, SortScriptPage } from '@/lib/core/sorting'

type Pages = readonly number[]
/** `loose`: why a sheet lies on the table. `placed`: what is said beside its script; null where it says nothing there. */
type Words = Readonly<{ loose: (missing: Pages) => string; placed: ((page: string) => string) | null }>

const listed = (pages: Pages): string => (pages.length < 2 ? `page ${pages[0] ?? ''}` : `pages ${pages.slice(0, -1).join(', ')} and ${pages.at(-1)}`)

/** Every reason the engine can give, in words; a new one does not compile before it has its own. */
const reasonWords: Record<LeafReason, Words> = {
  unreadable: { loose: () => 'its picture cannot be read', placed: null },
  unlike_paper: { loose: () => 'it does not look like this paper', placed: null },
  not_clear: { loose: () => 'its print does not say for certain which page it is', placed: null },
  duplicate_page: { loose: () => 'it shows the same writing as a sheet before it: perhaps scanned twice', placed: null },
  two_page_ones: { loose: () => 'two first pages lie together, and their writing does not tell them apart', placed: null },
  two_of_a_page: { loose: () => 'two sheets of the same page lie together', placed: null },
  page_missing: { loose: (missing) => (missing.length > 0 ? `${listed(missing)} of its script ${missing.length > 1 ? 'are' : 'is'} missing` : 'a page of its script is missing'), placed: null },
  order_unclear: { loose: () => 'the sheets around it can be put together in more than one way', placed: null },
  pages_swapped: { loose: () => 'the pages lie in another order than the paper', placed: () => 'pages lay in another order' },
  interleaved: { loose: () => 'its script lies page by page between another one', placed: () => 'lay between another script, told by the writing' },
  code_disagrees: { loose: () => 'its code is that of another page than its print shows', placed: null },
  code_unknown: { loose: () => 'its code was not printed for this paper here', placed: null },
  re_scan: { loose: () => 'it is a new scan of a page that lay here before', placed: (page) => `${page} scanned again later` },
  re_scan_unsure: { loose: () => 'it looks like a new scan of a page that is here, and not plainly of which', placed: null },
  late_page: { loose: () => 'it came later, and its script lacked this page', placed: (page) => `${page} came later` },
  late_unsure: { loose: () => 'it came later than the scripts, and it is not certain whose page it is', placed: null },
}

/** Why a sheet was left loose, as one sentence without a full stop. */
export function whyLoose({ reasons, problem, missing, number }: Pick<LooseLeaf, 'reasons' | 'problem' | 'missing' | 'number'>): string {
  if (problem === 'page_too_large') return `the picture of page ${number} of the file is too large to read: scan that sheet again at 300 dpi or less`
  if (problem === 'page_incomplete') return `a part of page ${number} of the file is missing: scan that sheet again`
  if (problem) return `page ${number} of the file cannot be read: scan that sheet again`
  if (reasons.length === 0) return 'it was put on the table by hand'
  return reasons.map((reason) => reasonWords[reason].loose(missing)).join('; ')
}

const named = ({ paperPage }: SortScriptPage): string => (paperPage === null ? 'an extra page' : `page ${paperPage}`)

/** What is to be known of a script and its pages, short: "page 2 missing", "page 1 scanned again later". */
export function scriptNotes({ pages, missing }: Pick<SortScript, 'pages' | 'missing'>): string[] {
  const said = pages.flatMap((page) => page.reasons.flatMap((reason) => reasonWords[reason].placed?.(named(page)) ?? []))
  const byHand = pages.filter(({ older, reasons }) => older > 0 && !reasons.includes('re_scan')).map((page) => `${named(page)} scanned more than once`)
  return [...(missing.length > 0 ? [`${listed(missing)} missing`] : []), ...new Set([...said, ...byHand])]
}
