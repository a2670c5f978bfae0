import type { GreyPicture } from '@/lib/core/grey-picture'
import type { ImagePart, LeafReading, PageGuess, PageImage } from '@/lib/core/leaf'
import { compose, toPixels, type Homography, type Turn } from '@/lib/core/paper-space'
import type { Cv } from './opencv'
import { registerLeaf, registerToPage } from './register-leaf'
import type { Template } from './template'
import { halvesOf, type Halves } from './two-up'

type Seen = Omit<LeafReading, 'index'>

/** A page lies in its half when no corner is further outside than this share of the half. */
const outside = 0.12

/**
 * What one image of a sheaf shows: a leaf, or two pages side by side. Two pages are believed when the print of one is found within its
 * half and the other half does not speak against it; where the sheet's shape alone suggests it, a single page is looked for first.
 */
export function registerSheet(cv: Cv, image: PageImage, picture: GreyPicture, paper: readonly Template[]): Seen[] {
  const halves = halvesOf(image, paper.map(({ page }) => page))
  if (!halves) return [registerLeaf(cv, image, picture, paper)]
  const whole = halves.plain ? null : registerLeaf(cv, image, picture, paper)
  if (whole && (whole.clear || whole.empty)) return [whole]
  const pair = halves.parts.map((part) => readPart(cv, image, halves, part, picture, paper))
  return believed(pair, halves.plain) ? ordered(pair) : [whole ?? registerLeaf(cv, image, picture, paper)]
}

/** Whether an image is as large as two pages of the paper side by side. */
export function mayBeTwoUp(image: PageImage, paper: readonly Template[]): boolean {
  return halvesOf(image, paper.map(({ page }) => page))?.plain ?? false
}

/** Registers a leaf to the page a person says it is: the whole image, or a part of it. Null when its print cannot be found there. */
export function registerPartToPage(cv: Cv, image: PageImage, picture: GreyPicture, page: Template, part?: ImagePart): PageGuess | null {
  if (!part) return registerToPage(cv, image, picture, page)
  const halves = halvesOf(image, [page.page])
  const guess = registerToPage(cv, { ...image, ...(halves && { dpiX: halves.dpiX, dpiY: halves.dpiY }), width: part.w, height: part.h }, cutOut(picture, part), page)
  return guess && { ...guess, homography: shifted(guess.homography, part) }
}

function readPart(cv: Cv, image: PageImage, { dpiX, dpiY }: Halves, part: ImagePart, picture: GreyPicture, paper: readonly Template[]): Seen {
  const own = registerLeaf(cv, { ...image, width: part.w, height: part.h, dpiX, dpiY }, cutOut(picture, part), paper)
  const guesses = own.guesses.map((guess) => ({ ...guess, homography: shifted(guess.homography, part) }))
  const best = guesses[0]
  return { ...own, image, part, guesses, clear: own.clear && best !== undefined && liesIn(best, part, paper) }
}

/** The part of a picture, its rows copied. */
function cutOut({ width, data }: GreyPicture, { x, y, w, h }: ImagePart): GreyPicture {
  const out = new Uint8Array(w * h)
  for (let row = 0; row < h; row++) out.set(data.subarray((y + row) * width + x, (y + row) * width + x + w), row * w)
  return { width: w, height: h, data: out }
}

function shifted(homography: Homography, { x, y }: ImagePart): Homography {
  return compose([[1, 0, x], [0, 1, y], [0, 0, 1]], homography)
}

function liesIn({ homography, paper: own, paperPage }: PageGuess, { x, y, w, h }: ImagePart, paper: readonly Template[]): boolean {
  const page = paper.find((template) => template.page.page === paperPage && template.page.paper === own)?.page
  if (!page) return false
  const [across, down] = [outside * w, outside * h]
  return [[0, 0], [page.widthPoints, 0], [page.widthPoints, page.heightPoints], [0, page.heightPoints]].every(([px, py]) => {
    const at = toPixels(homography, { x: px!, y: py! })
    return at.x > x - across && at.x < x + w + across && at.y > y - down && at.y < y + h + down
  })
}

function believed(pair: readonly Seen[], plain: boolean): boolean {
  const clear = pair.filter((half) => half.clear).length
  return clear === 2 || (clear === 1 && (plain || pair.some((half) => half.empty)))
}

/** The left page first, as they read: on a sheet that lies upside down the halves change places. */
function ordered(pair: readonly Seen[]): Seen[] {
  const turn: Turn = pair.find((half) => half.clear)!.guesses[0]!.rotation
  const [first, second] = pair as [Seen, Seen]
  const across = first.part!.y === second.part!.y
  const swapped = across ? turn === 180 || turn === 270 : turn === 180 || turn === 90
  return (swapped ? [second, first] : [first, second]).map((half, k) => ({ ...half, half: k as 0 | 1 }))
}
