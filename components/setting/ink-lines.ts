import type { SnapLines } from './snap'

/** A picture of a page in grey, 0 black to 255 white, row by row. */
export type GreyPage = Readonly<{ width: number; height: number; data: Uint8Array | Uint8ClampedArray }>

const dark = 150
/** A run of ink this share of the page's width, or of 14 points upright, is a printed line. */
const longRule = 0.18
const longStroke = 14
/** A box round print keeps clear of it, in points; on a printed rule or stroke it lies exactly. */
const clear = { x: 6, y: 4 }

/**
 * The lines of the print that a box may snap to, in points of a page `pageWidth` wide: just above and below lines of text, printed
 * rules, and just outside the edges where several lines of text begin or end.
 */
export function inkLines(page: GreyPage, pageWidth: number): SnapLines {
  const k = pageWidth / page.width
  const bands = bandsOf(page)
  const ys = [...bands.flatMap(({ top, bottom }) => [top * k - clear.y, (bottom + 1) * k + clear.y]), ...rulesOf(page).map((y) => y * k)]
  const left = recurring(bands.map((band) => band.left)).map((x) => x * k - clear.x)
  const right = recurring(bands.map((band) => band.right)).map((x) => (x + 1) * k + clear.x)
  return { xs: thinned([...left, ...right, ...strokesOf(page, longStroke / k).map((x) => x * k)]), ys: thinned(ys) }
}

type Band = { top: number; bottom: number; left: number; right: number }

function bandsOf({ width, height, data }: GreyPage): Band[] {
  const bands: Band[] = []
  let band: Band | null = null
  for (let y = 0; y < height; y++) {
    let left = -1
    let right = -1
    for (let x = 0; x < width; x++) {
      if (data[y * width + x]! >= dark) continue
      if (left < 0) left = x
      right = x
    }
    if (left < 0) band = null
    else if (band) Object.assign(band, { bottom: y, left: Math.min(band.left, left), right: Math.max(band.right, right) })
    else bands.push((band = { top: y, bottom: y, left, right }))
  }
  return bands
}

function rulesOf({ width, height, data }: GreyPage): number[] {
  const rows: number[] = []
  for (let y = 0; y < height; y++) {
    let run = 0
    let longest = 0
    for (let x = 0; x < width; x++) {
      run = data[y * width + x]! < dark ? run + 1 : 0
      longest = Math.max(longest, run)
    }
    if (longest > width * longRule) rows.push(y + 0.5)
  }
  return middles(rows)
}

function strokesOf({ width, height, data }: GreyPage, least: number): number[] {
  const columns: number[] = []
  for (let x = 0; x < width; x++) {
    let run = 0
    let longest = 0
    for (let y = 0; y < height; y++) {
      run = data[y * width + x]! < dark ? run + 1 : 0
      longest = Math.max(longest, run)
    }
    if (longest > least) columns.push(x + 0.5)
  }
  return middles(columns)
}

/** Neighbouring rows of one thick line are one line, at its middle. */
function middles(positions: readonly number[]): number[] {
  const groups: number[][] = []
  for (const at of positions) {
    const last = groups.at(-1)
    if (last && at - last.at(-1)! <= 1) last.push(at)
    else groups.push([at])
  }
  return groups.map((group) => (group[0]! + group.at(-1)!) / 2)
}

/** Positions where at least two lines of text agree, within two pixels. */
function recurring(positions: readonly number[]): number[] {
  return positions.filter((at, k) => positions.some((other, j) => j !== k && Math.abs(other - at) <= 2))
}

/** Lines nearer than a point to the one before are the same line. */
function thinned(lines: readonly number[]): number[] {
  const kept: number[] = []
  for (const line of [...lines].sort((a, b) => a - b)) if (kept.length === 0 || line - kept.at(-1)! >= 1) kept.push(line)
  return kept
}
