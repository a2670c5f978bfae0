import type { NumberReading } from './digit-reading'
import type { Homography, Turn } from './paper-space'

/**
 * How a page's scan picture is kept in the sheaf. `jpeg` and `g4` are one image stream of the file, decoded as it is;
 * `rendered` pages (strips, layers, forms, other codings) are drawn by a PDF engine.
 * Width and height are pixels of the *stored image*: the frame that homographies and rotations speak of. It is the image's
 * own pixels for a page that one image covers, however it is coded, and the page before its /Rotate otherwise, drawn at
 * the resolution of its images (strips: as if stacked). `shownTurn` is how far the PDF turns the stored image clockwise to show it.
 */
export type PageImage = Readonly<{
  encoding: 'jpeg' | 'g4' | 'rendered'
  width: number
  height: number
  dpiX: number
  dpiY: number
  shownTurn: Turn
}>

/** What keeps a leaf from being read at all; `page_incomplete`: a part of its picture is missing in the file. */
export type LeafProblem = 'page_unreadable' | 'page_too_large' | 'page_incomplete' | 'page_empty'

/** A page of the blank paper that a leaf may be, with how the leaf lies on it; `paper` counts from 0 where a sheaf may hold several. `confidence` runs from 0 to 1, alike for grey, colour and 1-bit scans. */
export type PageGuess = Readonly<{ paper?: number; paperPage: number; rotation: Turn; homography: Homography; confidence: number }>

/** A part of a stored image, in its pixels. */
export type ImagePart = Readonly<{ x: number; y: number; w: number; h: number }>

/**
 * A printed code seen on a leaf. `script` and `paperPage` are what it stands for, null for a code of another paper or school; `agrees` says
 * that the print of that page lies where the code says. Only then does the code place the leaf.
 */
export type LeafCode = Readonly<{ token: string; script: string | null; paperPage: number | null; agrees: boolean }>

/**
 * What one leaf shows by itself, whatever its neighbours are: stored leaf by leaf, so that reading can be taken up again.
 * `guesses` are best first. `clear` says that the first is certain: its print is there and no other page explains it as well.
 * `ink` is the writing on the first guess's page (see InkMap), for telling a second scan of a page from another student's;
 * `pen` is what it was written with; `number` what stands in the candidate number's boxes on that page, when it has any; `strokes`
 * where that page was written on.
 * An image that shows two pages side by side gives two readings with one index: `half` 0 is the left one as
 * they read, `part` is where it lies on the image. Homographies speak of the whole image all the same.
 */
export type LeafReading = Readonly<{
  index: number
  half?: 0 | 1
  part?: ImagePart
  image: PageImage | null
  empty: boolean
  guesses: readonly PageGuess[]
  clear: boolean
  ink: InkMap | null
  pen?: PenTrace | null
  number?: NumberReading | null
  strokes?: StrokeMap | null
  code?: LeafCode
  problem?: LeafProblem
}>

/** The reading of a leaf that shows nothing, and why. */
export function unread(index: number, problem: LeafProblem): LeafReading {
  return { index, image: null, empty: false, guesses: [], clear: false, ink: null, pen: null, problem }
}

/**
 * What a page was written with, as it looks: brightness of the strokes' middle (0 to 255, of levelled paper) and their width in pixels of
 * 100 dpi; and by what hand: how far upright strokes lean to the right for each pixel upwards, and the middle height of signs. Null where too little stands free.
 */
export type PenTrace = Readonly<{ core: number; width: number; slant?: number | null; height?: number | null }>

/** Where a pen went on a page, for telling answers from empty spaces: inked pixels of 100 dpi in each 1 mm square, row after row, deflated, as base64. */
export type StrokeMap = Readonly<{ columns: number; cells: string }>
export const strokeCellPoints = 72 / 25.4

/** How much was written in each 2 mm square of a page, 0 to 255, row after row, deflated, as base64. */
export type InkMap = string
export const inkCellPoints = (2 * 72) / 25.4

/** Why a leaf is where it is, in words for programs; the sorting table says them as sentences. */
export type LeafReason =
  | 'unreadable'
  | 'unlike_paper'
  | 'not_clear'
  | 'duplicate_page'
  | 'two_page_ones'
  | 'two_of_a_page'
  | 'page_missing'
  | 'order_unclear'
  | 'pages_swapped'
  | 'interleaved'
  | 'code_disagrees'
  | 'code_unknown'
  | 're_scan'
  | 're_scan_unsure'
  | 'late_page'
  | 'late_unsure'

/** Where a leaf goes. `script` is a running number from 1. `missing` names the pages that its script lacks. */
export type LeafFinding = Readonly<{
  index: number
  half?: 0 | 1
  kind: 'script' | 'blank' | 'loose'
  script: number | null
  /** The paper it belongs to, from 0, in a sheaf that may hold several; the likeliest for a loose leaf. */
  paper?: number
  /** The printed script that its code stands for. */
  printed?: string
  paperPage: number | null
  rotation: Turn
  homography: Homography | null
  confidence: number
  /** The likeliest pages, best first, at most three. */
  guesses: readonly PageGuess[]
  reasons: readonly LeafReason[]
  missing: readonly number[]
  /** Scripts of earlier sheaves that a leaf which came later may belong to, likeliest first. */
  candidates?: readonly string[]
  problem?: LeafProblem
}>
