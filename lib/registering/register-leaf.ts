import type { GreyPicture } from '@/lib/core/grey-picture'
import type { LeafReading, PageGuess, PageImage } from '@/lib/core/leaf'
import { turnOf, type Homography, type PaperPoint } from '@/lib/core/paper-space'
import { blockFit } from './block-fit'
import { coarsePlaces, type Candidate } from './coarse'
import { printFound, shareFound } from './confirm'
import { isEmpty } from './is-empty'
import { fineFit } from './fine-fit'
import { level, type Levelled } from './level'
import { reused } from './memory'
import type { Cv } from './opencv'
import { placeByCode, turnedAbout } from './place-by-code'
import { scanDensity } from './scan-density'
import { boxShrink, shrinkTo, type Shrunk } from './shrink'
import { skews } from './skews'
import type { Template } from './template'
import { confidences, type Rival } from './weigh'
import { writingOf } from './writing-of'

/** A leaf made ready for being compared: levelled at 100 dpi. */
export type Ready = Readonly<{ shrunk: Shrunk; levelled: Levelled; half: GreyPicture; ink12: GreyPicture }>

/** A share of print found from which no further look is needed, when no other page comes near. */
const plainlyFound = 0.5
const rivalLikeness = 0.6
const mostTried = 4

/**
 * A print is believed from this confidence: by the rule of the bench's calibration, two tenths above the last tenth in which a leaf of the sets tried
 * was taken for a page that it is not (0.62, an A5 page askew on an A4 glass); nearly all right ones lie above it.
 */
export const clearFrom = 0.9
/** So much of a page's print has to lie where its code says before the two are believed. */
const provenShare = 0.25

/** A thread registers one leaf at a time, and none of its pictures outlives that. */
const memory = reused()

/**
 * What one leaf shows by itself: which page of the paper it is, how it lies, whether it is empty.
 * Tries every page both ways up (and sideways when its shape asks for it), no printed marks needed.
 */
export function registerLeaf(cv: Cv, image: PageImage, picture: GreyPicture, paper: readonly Template[]): Omit<LeafReading, 'index'> {
  const ready = prepare(cv, image, picture, paper)
  const empty = isEmpty(ready.levelled.ink)
  let rivals = empty ? [] : tryCandidates(cv, ready, paper, skewsOf(ready))
  if (!empty && (rivals[0]?.share ?? 0) < 0.35) rivals = [...rivals, ...tryCandidates(cv, ready, paper, () => [-3, -1.5, 0, 1.5, 3])].sort((a, b) => b.share - a.share)
  const weighed = confidences(rivals, ready.levelled.white)
  const guesses = weighed.slice(0, 3).map((rival) => guessOf(rival, ready))
  const best = weighed[0]
  return {
    image, empty: empty && !best, guesses, clear: best !== undefined && best.confidence >= clearFrom,
    ...(best && best.share >= 0.3 ? writingOf(ready.levelled.white, best.template, best.map, memory) : { ink: null, pen: null, strokes: null }),
  }
}

/** Registers a leaf to the page a person says it is. Null when its print cannot be found there. */
export function registerToPage(cv: Cv, image: PageImage, picture: GreyPicture, page: Template): PageGuess | null {
  const ready = prepare(cv, image, picture, [page])
  const tries = [skewsOf(ready), () => [-4, -2.5, -1, 0, 1, 2.5, 4]]
  for (const degrees of tries) {
    const best = tryCandidates(cv, ready, [page], degrees)[0]
    if (best && best.share >= 0.2) return guessOf({ ...best, confidence: Math.min(1, best.share * 1.5) }, ready)
  }
  return null
}

/**
 * Registers a leaf to the page whose code it carries: the code says which page, which way up and nearly where, so nothing is searched for.
 * `code` takes the paper's points to the leaf's pixels, exactly at the symbol and roughly elsewhere; `at` is the symbol's middle in paper points.
 * Null when the page's print is not found there: then the code and the print do not belong together.
 */
export function registerByCode(cv: Cv, image: PageImage, picture: GreyPicture, template: Template, code: Homography, at: PaperPoint): Omit<LeafReading, 'index'> | null {
  const ready = prepare(cv, image, picture, [template])
  const place = placeByCode(ready, template, code, at)
  for (const off of [0, -0.7, 0.7]) {
    const best = fitExactly(cv, ready, turnedAbout(place, template, at, off))
    if (!best || best.share < provenShare) continue
    const guess = guessOf({ ...best, confidence: Math.min(1, best.share * 1.6) }, ready)
    // How it was written tells students apart; here the code does.
    return { image, empty: false, guesses: [guess], clear: true, ...writingOf(ready.levelled.white, template, best.map, memory), pen: null }
  }
  return null
}

function prepare(cv: Cv, image: PageImage, picture: GreyPicture, paper: readonly Template[]): Ready {
  const { dpiX, dpiY } = scanDensity(image, paper.map((t) => t.page))
  const shrunk = shrinkTo(cv, { ...picture, data: plainBytes(picture.data) }, dpiX, dpiY, 100, memory)
  const levelled = level(shrunk.picture, memory)
  return { shrunk, levelled, half: boxShrink(levelled.white, 2, memory, 'half'), ink12: boxShrink(levelled.ink, 2, memory, 'ink12') }
}

/** The same bytes, never as a Buffer: loops that meet both kinds of array run several times slower on either. */
function plainBytes({ buffer, byteOffset, length }: Uint8Array): Uint8Array {
  return new Uint8Array(buffer, byteOffset, length)
}

function skewsOf({ levelled }: Ready): (sideways: boolean) => number[] {
  return (sideways) => skews(levelled.ink, sideways, memory)
}

/** Looks for every page in every likely turn, then fits the likeliest exactly. Best first. */
function tryCandidates(cv: Cv, ready: Ready, paper: readonly Template[], degrees: (sideways: boolean) => readonly number[]): Rival[] {
  const candidates = [false, true].flatMap((sideways) => {
    const fitting = paper.filter((template) => fits(ready.ink12, template, sideways))
    return fitting.length ? coarsePlaces(ready.ink12, fitting, sideways, degrees(sideways), memory) : []
  })
  candidates.sort((a, b) => b.likeness - a.likeness)
  const rivals: Rival[] = []
  for (const candidate of candidates.slice(0, mostTried)) {
    const enough = rivals.length > 0 && Math.max(...rivals.map((r) => r.share)) >= plainlyFound
    if (enough && candidate.likeness < rivalLikeness * candidates[0]!.likeness) break
    const rival = fitExactly(cv, ready, candidate)
    if (rival) rivals.push(rival)
  }
  return rivals.sort((a, b) => b.share - a.share)
}

/** A leaf is looked at sideways only when it is shaped that way; a square one both ways. */
function fits(ink: GreyPicture, { ink12 }: Template, sideways: boolean): boolean {
  const leaf = ink.width / ink.height
  const page = ink12.width / ink12.height
  const upright = Math.abs(Math.log(leaf / page))
  const turned = Math.abs(Math.log(leaf * page))
  return sideways ? turned < upright + 0.12 : upright < turned + 0.12
}

function fitExactly(cv: Cv, { levelled, half }: Ready, { template, ...place }: Candidate): Rival | null {
  const near = blockFit(levelled.ink, template.ink25, template.blocks25, place, memory)
  const map = fineFit(cv, levelled.white, half, template, near)
  if (!map) return null
  const found = printFound(levelled.white, template, map)
  return { template, map, found, share: shareFound(found) }
}

/** From pixels of 100 dpi on both sides to paper points and pixels of the stored image. */
function guessOf({ template, map, confidence }: Rival & { confidence: number }, { shrunk }: Ready): PageGuess {
  const { widthPoints, heightPoints, page, paper } = template.page
  const k = 100 / 72
  const by = [shrunk.byX, shrunk.byY, 1]
  const rows = map.map(([a, b, c], row) => [a * k * by[row]!, b * k * by[row]!, c * by[row]!] as const)
  const homography = rows.map((row) => row.map((v) => v / rows[2]![2]!)) as unknown as Homography
  const rotation = turnOf(homography, { x: widthPoints / 2, y: heightPoints / 2 })
  return { ...(paper === undefined ? {} : { paper }), paperPage: page, rotation, homography, confidence }
}
