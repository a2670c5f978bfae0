/**
 * The one coordinate system. Everything a person places lives in paper space: points (1/72 in), origin top left of the blank
 * paper's page, y down. A leaf carries one 3x3 homography from there to the pixels of its stored image, where (0, 0) is the
 * image's corner and the first pixel's centre is (0.5, 0.5). Nothing else converts coordinates.
 */

declare const space: unique symbol
/** A place on the blank paper, in points. */
export type PaperPoint = Readonly<{ x: number; y: number; readonly [space]?: 'paper' }>
/** A place on a stored scan image, in pixels. */
export type PixelPoint = Readonly<{ x: number; y: number; readonly [space]?: 'pixels' }>
/** A box on the blank paper, in points. */
export type PaperRect = Readonly<{ x: number; y: number; w: number; h: number }>
/** Row by row; maps paper points to pixels of the image as stored, before any turn. */
export type Homography = readonly [Row, Row, Row]
type Row = readonly [number, number, number]
/** Degrees clockwise that a stored image must be turned to read upright. */
export type Turn = 0 | 90 | 180 | 270

export const mmPerPoint = 25.4 / 72

/** Where a paper point falls on the stored image, in pixels. */
export function toPixels(h: Homography, { x, y }: PaperPoint): PixelPoint {
  return project(h, x, y) as PixelPoint
}

/** Where a pixel of the stored image lies on the paper, in points. */
export function toPaper(h: Homography, { x, y }: PixelPoint): PaperPoint {
  return project(inverse(h), x, y) as PaperPoint
}

function project([a, b, c]: Homography, x: number, y: number): { x: number; y: number } {
  const w = c[0] * x + c[1] * y + c[2]
  return { x: (a[0] * x + a[1] * y + a[2]) / w, y: (b[0] * x + b[1] * y + b[2]) / w }
}

/** The inverse, scaled so that its last entry is 1. */
export function inverse(h: Homography): Homography {
  const [[a, b, c], [d, e, f], [g, i, j]] = h
  const m: Homography = [
    [e * j - f * i, c * i - b * j, b * f - c * e],
    [f * g - d * j, a * j - c * g, c * d - a * f],
    [d * i - e * g, b * g - a * i, a * e - b * d],
  ]
  return scaled(m, 1 / m[2][2])
}

/** First `second`, then `first`: compose(a, b) maps p to a(b(p)). */
export function compose(first: Homography, second: Homography): Homography {
  const row = (r: Row): Row => [0, 1, 2].map((k) => r[0] * second[0][k]! + r[1] * second[1][k]! + r[2] * second[2][k]!) as unknown as Row
  return [row(first[0]), row(first[1]), row(first[2])]
}

/** Whether two maps are the very same. */
export function sameHomography(a: Homography, b: Homography): boolean {
  return a.every((row, k) => row.every((v, l) => v === b[k]![l]))
}

function scaled(h: Homography, by: number): Homography {
  const row = (r: Row): Row => [r[0] * by, r[1] * by, r[2] * by]
  return [row(h[0]), row(h[1]), row(h[2])]
}

/** Takes pixels of a stored image of the given size to pixels of the same image turned clockwise. */
export function turning(turn: Turn, width: number, height: number): Homography {
  if (turn === 90) return [[0, -1, height], [1, 0, 0], [0, 0, 1]]
  if (turn === 180) return [[-1, 0, width], [0, -1, height], [0, 0, 1]]
  if (turn === 270) return [[0, 1, 0], [-1, 0, width], [0, 0, 1]]
  return [[1, 0, 0], [0, 1, 0], [0, 0, 1]]
}

/** The turn that makes a leaf read upright, from its homography: where the paper's x axis points on the stored image. */
export function turnOf(h: Homography, at: PaperPoint): Turn {
  const from = toPixels(h, at)
  const to = toPixels(h, { x: at.x + 10, y: at.y })
  const degrees = (Math.atan2(to.y - from.y, to.x - from.x) * 180) / Math.PI
  return ((((Math.round(-degrees / 90) % 4) + 4) % 4) * 90) as Turn
}

/** The four corners of a box, clockwise from top left. */
export function corners({ x, y, w, h }: PaperRect): readonly [PaperPoint, PaperPoint, PaperPoint, PaperPoint] {
  return [{ x, y }, { x: x + w, y }, { x: x + w, y: y + h }, { x, y: y + h }]
}

/** The part of a paper (points) that a scan of `image` pixels shows: the largest upright box clear of the scan's slanted edges, nearly. */
export function shownPaper(h: Homography, image: Readonly<{ width: number; height: number }>, paper: Readonly<{ width: number; height: number }>): PaperRect {
  const edges = corners({ x: 0, y: 0, w: image.width, h: image.height }).map(({ x, y }) => toPaper(h, { x, y }))
  const xs = edges.map(({ x }) => x).sort((a, b) => a - b)
  const ys = edges.map(({ y }) => y).sort((a, b) => a - b)
  const [x, y] = [Math.max(0, xs[1]!), Math.max(0, ys[1]!)]
  return { x, y, w: Math.min(paper.width, xs[2]!) - x, h: Math.min(paper.height, ys[2]!) - y }
}

/** How far right, in points, a scan shows a paper at height `y`: the paper's edge, or where the scan's own slanted edge cuts it off. */
export function shownRight(h: Homography, image: Readonly<{ width: number; height: number }>, paper: Readonly<{ width: number; height: number }>, y: number): number {
  const { x, w } = shownPaper(h, image, paper)
  let [inside, outside] = [x + w, paper.width]
  for (let k = 0; k < 12; k++) {
    const middle = (inside + outside) / 2
    const at = toPixels(h, { x: middle, y })
    const shows = at.x >= 0 && at.y >= 0 && at.x <= image.width && at.y <= image.height
    if (shows) inside = middle
    else outside = middle
  }
  return inside
}

/** The homography that takes four paper points to four pixels (both clockwise from top left): eight linear equations. */
export function homographyFrom(paper: readonly PaperPoint[], pixels: readonly PixelPoint[]): Homography | null {
  const rows: number[][] = []
  for (let k = 0; k < 4; k++) {
    const { x, y } = paper[k]!
    const { x: u, y: v } = pixels[k]!
    rows.push([x, y, 1, 0, 0, 0, -u * x, -u * y, u], [0, 0, 0, x, y, 1, -v * x, -v * y, v])
  }
  const s = solve(rows)
  if (!s) return null
  return [[s[0]!, s[1]!, s[2]!], [s[3]!, s[4]!, s[5]!], [s[6]!, s[7]!, 1]]
}

/** Gauss with row exchange on an augmented matrix; null when the points do not span a plane. */
function solve(rows: number[][]): number[] | null {
  const n = rows.length
  for (let col = 0; col < n; col++) {
    let pivot = col
    for (let r = col + 1; r < n; r++) if (Math.abs(rows[r]![col]!) > Math.abs(rows[pivot]![col]!)) pivot = r
    if (Math.abs(rows[pivot]![col]!) < 1e-9) return null
    ;[rows[col], rows[pivot]] = [rows[pivot]!, rows[col]!]
    for (let r = 0; r < n; r++) {
      if (r === col) continue
      const by = rows[r]![col]! / rows[col]![col]!
      for (let c = col; c <= n; c++) rows[r]![c]! -= by * rows[col]![c]!
    }
  }
  return rows.map((row, k) => row[n]! / row[k]!)
}
