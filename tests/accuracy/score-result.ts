import { mmPerPoint, toPaper, toPixels, type Homography, type PaperRect } from '@/lib/core/paper-space'

export type TruthPage = Readonly<{
  index: number
  half?: number
  kind: 'script' | 'blank' | 'foreign' | 'duplicate'
  candidate_number: string | null
  paper_page: number | null
  rotation: number
  homography: Homography | null
  width_px: number
}>
export type Truth = Readonly<{
  pages: readonly TruthPage[]
  questions: readonly Readonly<{ label?: string; page: number; region: PaperRect }>[]
  responses?: readonly Readonly<{ candidate_number: string; question: string; blank: boolean }>[]
}>
export type ResultPage = Readonly<{
  index: number
  half?: number
  kind: string
  script?: number | null
  candidate_number?: string | null
  paper_page: number | null
  rotation?: number | null
  homography: Homography | null
  confidence?: number
}>
type Pair = Readonly<{ truth: TruthPage; found: ResultPage | null }>

export type Score = Readonly<{
  pages: number
  scripts: number
  rightKind: number
  rightPage: number
  rightTurn: number
  wrong: number
  loose: number
  split: number
  good: number
  /** How far region corners land off, in mm on the paper, one number a corner. */
  errors: readonly number[]
  mark: number
}>

const expected = { script: 'script', blank: 'blank', foreign: 'loose', duplicate: 'loose' } as const
/** A region that lands further off than this is a page put in the wrong place, in mm. */
const far = 10

/**
 * What a result made of a class set. A page is wrongly placed if it is put as a script page and is none, is another page, stands
 * in a script that mostly holds another student's pages, or lands more than 10 mm off; good if all is right and every corner is within 1 mm.
 */
export function scoreResult(truth: Truth, result: readonly ResultPage[]): Score {
  const { pairs, strays } = paired(truth.pages, result)
  const kinds = settled(pairs)
  const { owner, split } = majorities(pairs)
  const n = { rightKind: 0, rightPage: 0, rightTurn: 0, wrong: strays, loose: 0, good: 0, scripts: 0 }
  const errors: number[] = []
  for (const pair of pairs) {
    const { truth: t, found } = pair
    const kind = kinds.get(t)!
    const rightKind = found?.kind === expected[kind]
    if (rightKind) n.rightKind++
    if (kind !== 'script') {
      if (placed(found) && !(kind === 'duplicate' && samePlace(t, found))) n.wrong++
      if (rightKind) n.good++
      continue
    }
    n.scripts++
    if (!placed(found)) {
      n.loose++
      continue
    }
    const rightPage = found.paper_page === t.paper_page
    const rightScript = found.candidate_number === undefined || found.candidate_number === null ? (owner.get(found.script!) ?? t.candidate_number) === t.candidate_number : found.candidate_number === t.candidate_number
    const rightTurn = typeof found.rotation === 'number' && found.rotation % 360 === t.rotation
    const off = rightPage && found.homography && t.homography ? cornerErrors(t.homography, found.homography, regions(truth, t.paper_page!)) : []
    const worst = Math.max(0, ...off)
    if (rightPage) n.rightPage++
    if (rightTurn) n.rightTurn++
    if (!rightPage || !rightScript || worst > far) n.wrong++
    if (rightPage && rightScript && rightTurn && off.length && worst <= 1) n.good++
    errors.push(...off)
  }
  return { ...n, pages: pairs.length, split, errors, mark: (100 * Math.max(0, n.good - 3 * n.wrong)) / Math.max(1, pairs.length) }
}

/** The p-th percentile as the nearest value above. */
export function percentile(values: readonly number[], p: number): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.min(sorted.length - 1, Math.floor((p / 100) * sorted.length))] ?? NaN
}

function placed(found: ResultPage | null): found is ResultPage {
  return found !== null && found.kind === 'script' && Boolean(found.paper_page)
}

/** A second copy put where the first belongs is untidy, not dangerous. */
function samePlace(t: TruthPage, found: ResultPage): boolean {
  const named = found.candidate_number ?? null
  return found.paper_page === t.paper_page && (named === null || named === t.candidate_number)
}

function regions(truth: Truth, page: number): PaperRect[] {
  const own = truth.questions.filter((q) => q.page === page).map((q) => q.region)
  return own.length ? own : [{ x: 60, y: 60, w: 400, h: 500 }]
}

function cornerErrors(truth: Homography, found: Homography, at: readonly PaperRect[]): number[] {
  return at.flatMap(({ x, y, w, h }) =>
    [x, x + w].flatMap((px) =>
      [y, y + h].map((py) => {
        const seen = toPaper(truth, toPixels(found, { x: px, y: py }))
        return Math.min(Math.hypot(seen.x - px, seen.y - py) * mmPerPoint, 999)
      }),
    ),
  )
}

/** Pairs each image's true pages with its found ones so that most agree; what is left over and placed is a stray. */
function paired(truths: readonly TruthPage[], founds: readonly ResultPage[]): { pairs: Pair[]; strays: number } {
  const pairs: Pair[] = []
  let strays = 0
  for (const index of new Set([...truths, ...founds].map((entry) => entry.index))) {
    const ts = truths.filter((t) => t.index === index)
    const fs = founds.filter((f) => f.index === index)
    const best = bestOrder(ts, fs)
    pairs.push(...best)
    strays += fs.filter((f) => placed(f) && !best.some(({ found }) => found === f)).length
  }
  return { pairs, strays }
}

function bestOrder(ts: readonly TruthPage[], fs: readonly ResultPage[]): Pair[] {
  if (ts.length === 0) return []
  const [t, ...rest] = ts as [TruthPage, ...TruthPage[]]
  const choices: (ResultPage | null)[] = fs.length < ts.length ? [...fs, null] : [...fs]
  const options = choices.map((found) => [{ truth: t, found }, ...bestOrder(rest, fs.filter((f) => f !== found))])
  const worth = (option: readonly Pair[]) => option.reduce((sum, pair) => sum + agreement(pair), 0)
  return options.reduce((a, b) => (worth(b) > worth(a) ? b : a))
}

function agreement({ truth: t, found }: Pair): number {
  if (!found) return 0
  let good = Number(found.paper_page === t.paper_page) + Number((found.candidate_number ?? null) === t.candidate_number)
  if (t.homography && found.homography) {
    const [a, b] = [toPixels(t.homography, { x: 300, y: 400 }), toPixels(found.homography, { x: 300, y: 400 })]
    good += Math.max(0, 1 - Math.hypot(a.x - b.x, a.y - b.y) / t.width_px)
  }
  return good
}

/** Of a page and its double, whichever was placed counts as the script's. */
function settled(pairs: readonly Pair[]): Map<TruthPage, TruthPage['kind']> {
  const kinds = new Map(pairs.map(({ truth: t }) => [t, t.kind]))
  const key = (t: TruthPage) => `${t.candidate_number} ${t.paper_page}`
  for (const double of new Set(pairs.filter(({ truth: t }) => t.kind === 'duplicate').map(({ truth: t }) => key(t)))) {
    const group = pairs.filter(({ truth: t }) => key(t) === double && t.paper_page)
    if (group.length < 2) continue
    const first = group.find(({ found }) => placed(found)) ?? group[0]!
    for (const pair of group) kinds.set(pair.truth, pair === first ? 'script' : 'duplicate')
  }
  return kinds
}

/** Whose pages each found script mostly holds, and how many students are spread over several scripts. */
function majorities(pairs: readonly Pair[]): { owner: Map<number, string>; split: number } {
  const held = new Map<number, string[]>()
  for (const { truth: t, found } of pairs) {
    if (!placed(found) || found.script === null || found.script === undefined || t.candidate_number === null) continue
    held.set(found.script, [...(held.get(found.script) ?? []), t.candidate_number])
  }
  const most = (all: readonly string[]) => all.reduce((a, b) => (count(all, b) > count(all, a) ? b : a))
  const owner = new Map([...held].map(([script, all]) => [script, most(all)]))
  return { owner, split: owner.size - new Set(owner.values()).size }
}
function count(all: readonly string[], one: string): number {
  return all.filter((value) => value === one).length
}
