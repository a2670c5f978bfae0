import type { InkMap, LeafFinding, LeafReading, LeafReason, PenTrace } from '@/lib/core/leaf'
import { penCost } from './pen-cost'
import { inkOf, likeness, sameness } from './same-ink'

/** A page of a script that lies there already, from another sheaf. */
export type EarlierPage = Readonly<{ paperPage: number; ink: InkMap | null; pen: PenTrace | null }>
/** A script that was there before this sheaf; `number` is the candidate number of the student whose name it certainly bears. */
export type EarlierScript = Readonly<{ id: string; number: string | null; pages: readonly EarlierPage[] }>
/** What becomes of a leaf that came later than the scripts: it joins one, or a person has to say. Leaves not named start scripts of their own. */
export type LateVerdict = Readonly<{ kind: 'join'; scriptId: string; reason: LeafReason } | { kind: 'loose'; reason: LeafReason; /** Scripts it may belong to, likeliest first. */ candidates: readonly string[] }>

/** The second likeliest page of all must be so much unlike it, as two students' are: boxes ticked alike look alike. */
const clearlyOther = 0.76
/** Every digit at least so sure. */
const sureDigit = 0.97

type Late = Readonly<{ k: number; page: number; reading: LeafReading }>

/**
 * Where leaves go that came in a later sheaf, group by group as placeLeaves holds them for one student's. A group joins a script when one of its leaves
 * is plainly a new scan of a page there, when it bears the number of a script that lacks its pages, or when one script alone lacks them
 * and every student has one. Part of a script never starts a new one while others lack those pages: a person says whose it is.
 * @param without how many students that were expected have no script yet
 */
export function joinLate(readings: readonly LeafReading[], findings: readonly LeafFinding[], scripts: readonly EarlierScript[], without: number): Map<number, LateVerdict> {
  const groups = new Map<string, Late[]>()
  for (const [k, finding] of findings.entries()) {
    const reading = readings[k]!
    const page = reading.clear ? reading.guesses[0]!.paperPage : null
    if (page === null || finding.kind === 'blank') continue
    const group = finding.kind === 'script' ? `${finding.script}` : `loose ${k}`
    groups.set(group, [...(groups.get(group) ?? []), { k, page, reading }])
  }
  const library = new Library(scripts)
  const verdicts = new Map<number, LateVerdict>()
  for (const leaves of groups.values()) {
    const first = findings[leaves[0]!.k]!
    const whole = first.kind === 'script' && first.missing.length === 0
    const verdict = library.again(leaves) ?? (whole ? null : library.lacking(leaves, without))
    if (verdict) for (const leaf of leaves) verdicts.set(leaf.k, forLeaf(verdict, leaf, scripts))
  }
  return inTheirOrder(onePageEach(verdicts, readings), readings, scripts)
}

/** A leaf of a group that joins a script replaces a page there, or is one that it lacked. */
function forLeaf(verdict: LateVerdict, { page }: Late, scripts: readonly EarlierScript[]): LateVerdict {
  if (verdict.kind === 'loose') return verdict
  const there = scripts.find(({ id }) => id === verdict.scriptId)?.pages.some(({ paperPage }) => paperPage === page)
  return { ...verdict, reason: there ? 're_scan' : 'late_page' }
}

/** Two leaves of a sheaf for one place: neither goes there by itself. */
function onePageEach(verdicts: Map<number, LateVerdict>, readings: readonly LeafReading[]): Map<number, LateVerdict> {
  const places = new Map<string, number[]>()
  for (const [k, verdict] of verdicts) {
    if (verdict.kind !== 'join') continue
    const place = `${verdict.scriptId} ${readings[k]!.guesses[0]!.paperPage}`
    places.set(place, [...(places.get(place) ?? []), k])
  }
  for (const [place, leaves] of places) if (leaves.length > 1) for (const k of leaves) verdicts.set(k, { kind: 'loose', reason: 'late_unsure', candidates: [place.split(' ')[0]!] })
  return verdicts
}

/** As many leaves of a page as scripts that lack it were likely put on the copier in the same order: the one of the same rank comes first. */
function inTheirOrder(verdicts: Map<number, LateVerdict>, readings: readonly LeafReading[], scripts: readonly EarlierScript[]): Map<number, LateVerdict> {
  const unsure = [...verdicts].filter(([, verdict]) => verdict.kind === 'loose' && verdict.reason === 'late_unsure').map(([k]) => ({ k, page: readings[k]!.guesses[0]!.paperPage }))
  for (const { k, page } of unsure) {
    const alike = unsure.filter((other) => other.page === page).map((other) => other.k)
    const verdict = verdicts.get(k) as Extract<LateVerdict, { kind: 'loose' }>
    const lacking = scripts.flatMap(({ id }) => (verdict.candidates.includes(id) ? id : []))
    if (alike.length < 2 || lacking.length !== alike.length) continue
    const first = lacking[alike.indexOf(k)]!
    verdicts.set(k, { ...verdict, candidates: [first, ...verdict.candidates.filter((id) => id !== first)] })
  }
  return verdicts
}

class Library {
  private readonly inks = new Map<EarlierPage, Float32Array | null>()
  constructor(private readonly scripts: readonly EarlierScript[]) {}

  private inkOf(page: EarlierPage): Float32Array | null {
    if (!this.inks.has(page)) this.inks.set(page, inkOf(page.ink))
    return this.inks.get(page)!
  }

  /** The script of which these leaves are a new scan; loose when that is likely and not plain; null when nothing speaks for it. */
  again(leaves: readonly Late[]): LateVerdict | null {
    const found = leaves.map((leaf) => this.sameWriting(leaf))
    const candidates = [...new Set(found.flatMap((one) => one?.likely ?? []))]
    const sure = new Set(found.flatMap((one) => one?.sure ?? []))
    if (sure.size === 0) return candidates.length > 0 ? { kind: 'loose', reason: 're_scan_unsure', candidates } : null
    const [scriptId] = sure
    const script = this.scripts.find(({ id }) => id === scriptId)!
    const agree = sure.size === 1 && !leaves.some((leaf) => this.differs(leaf, script))
    return agree ? { kind: 'join', scriptId: script.id, reason: 're_scan' } : { kind: 'loose', reason: 're_scan_unsure', candidates }
  }

  /** The scripts whose page carries the same writing; one is sure when no other page is like it. */
  private sameWriting({ page, reading }: Late): { sure: string | null; likely: string[] } | null {
    const ink = inkOf(reading.ink)
    if (!ink) return null
    const alike = this.pagesLike(page).flatMap(({ script, own }) => {
      const other = this.inkOf(own)
      return other ? [{ id: script.id, like: likeness(other, ink), same: sameness(other, ink) === 'same' }] : []
    }).sort((a, b) => b.like - a.like)
    if (!alike[0]?.same) return null
    return { sure: (alike[1]?.like ?? -1) <= clearlyOther ? alike[0].id : null, likely: alike.filter(({ same }) => same).map(({ id }) => id) }
  }

  /** Whether a leaf shows other writing than that page of the script. */
  private differs({ page, reading }: Late, script: EarlierScript): boolean {
    const own = script.pages.find(({ paperPage }) => paperPage === page)
    return own !== undefined && sameness(this.inkOf(own), inkOf(reading.ink)) === 'different'
  }

  private pagesLike(page: number): { script: EarlierScript; own: EarlierPage }[] {
    return this.scripts.flatMap((script) => script.pages.filter(({ paperPage }) => paperPage === page).map((own) => ({ script, own })))
  }

  /** The script that lacks just these pages and can alone be meant. */
  lacking(leaves: readonly Late[], without: number): LateVerdict | null {
    const lacks = this.scripts.filter(({ pages }) => pages.length > 0 && !pages.some(({ paperPage }) => leaves.some(({ page }) => page === paperPage)))
    const number = leaves.map(({ reading }) => plainNumber(reading)).find((read) => read !== null) ?? null
    const named = number === null ? [] : lacks.filter((script) => script.number === number)
    if (named.length === 1) return { kind: 'join', scriptId: named[0]!.id, reason: 'late_page' }
    if (lacks.length === 0) return without > 0 ? null : { kind: 'loose', reason: 'late_unsure', candidates: [] }
    const [only] = lacks
    const fits = lacks.length === 1 && without === 0 && number === null && penDifference(leaves, only!) <= 0.5
    if (fits) return { kind: 'join', scriptId: only!.id, reason: 'late_page' }
    // Pens of the same kind are many: only those that differ plainly go to the end.
    const other = (script: EarlierScript): number => Number(penDifference(leaves, script) > 0.5)
    return { kind: 'loose', reason: 'late_unsure', candidates: lacks.toSorted((a, b) => other(a) - other(b)).map(({ id }) => id) }
  }
}

/** How much their pens speak against leaves and a script being one student's; 0 when nothing is known. */
export function penDifference(leaves: readonly Readonly<{ reading: Pick<LeafReading, 'pen'> }>[], script: Pick<EarlierScript, 'pages'>): number {
  const costs = leaves.flatMap(({ reading }) => script.pages.map(({ pen }) => penCost(reading.pen, pen)))
  return costs.length === 0 ? 0 : costs.reduce((sum, cost) => sum + cost, 0) / costs.length
}

/** The candidate number on a leaf when every digit is plain. */
function plainNumber({ number }: LeafReading): string | null {
  if (!number || number.shares.some((box) => box === null)) return null
  const digits = number.shares.map((box) => ({ digit: box!.indexOf(Math.max(...box!)), share: Math.max(...box!) }))
  return digits.length > 0 && digits.every(({ share }) => share >= sureDigit) ? digits.map(({ digit }) => digit).join('') : null
}
