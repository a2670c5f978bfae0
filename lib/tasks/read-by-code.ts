import type { GreyPicture } from '@/lib/core/grey-picture'
import type { LeafCode, LeafReading, PageImage } from '@/lib/core/leaf'
import { corners, homographyFrom, toPixels } from '@/lib/core/paper-space'
import { isToken, symbolCorners, type PrintedCodes } from '@/lib/core/printed-code'
import type { FoundCode } from '@/lib/reading/code-engine'
import { codeAnywhere, codeAt, codeInPlace, type CodeWindow } from '@/lib/reading/find-code'
import type { Cv } from '@/lib/registering/opencv'
import { registerByCode } from '@/lib/registering/register-leaf'
import type { Template } from '@/lib/registering/template'

/** What is known of codes before a sheaf is read. */
export type Coded = Readonly<{ templates: readonly Template[]; codes: PrintedCodes; windows: readonly CodeWindow[] }>

/** Places where codes were printed, each once. */
export function codeWindows(codes: PrintedCodes, templates: readonly Template[]): CodeWindow[] {
  const windows = new Map<string, CodeWindow>()
  for (const printed of codes.values()) {
    const page = templates.find((template) => isOf(template.page, printed))?.page
    const { rect, paperPage, paper = 0 } = printed
    if (page) windows.set(`${paper} ${paperPage} ${rect.x} ${rect.y} ${rect.w}`, { page: paperPage, paper, rect, pageWidth: page.widthPoints, pageHeight: page.heightPoints })
  }
  return [...windows.values()]
}

/** Whether a page of a paper, or one that a leaf is taken for, is the one that a code stands for. */
function isOf(one: Readonly<{ page: number; paper?: number }> | Readonly<{ paperPage: number; paper?: number }>, printed: Readonly<{ paperPage: number; paper?: number }> | undefined): boolean {
  return printed !== undefined && ('page' in one ? one.page : one.paperPage) === printed.paperPage && (one.paper ?? 0) === (printed.paper ?? 0)
}

type Leaf = Readonly<{ image: PageImage; picture: GreyPicture }>
type Seen = Omit<LeafReading, 'index'>

/**
 * Reads a leaf that may carry a code: first where codes were printed, and what is found there spares the search for the page. Failing that the
 * leaf is registered as any other (`register`); its print then says where its code must be, and last the whole leaf is looked over. An
 * empty leaf has none; `twoUp` says that the leaf may show two pages, each with its own.
 */
export async function readByCode(cv: Cv, leaf: Leaf, coded: Coded, register: () => readonly Seen[], twoUp: boolean): Promise<readonly Seen[]> {
  const { picture, image } = leaf
  const early = twoUp ? null : await codeInPlace(picture, image, coded.windows, isToken)
  const by = early && registered(cv, leaf, coded, early)
  if (by) return [by]
  const seen = await Promise.all(register().map((one) => withCodeByPrint(picture, one, coded)))
  const [only] = seen
  if (!only || seen.length > 1 || only.code || only.empty) return seen
  const found = early ?? (await codeAnywhere(picture, image, isToken, !only.clear))
  if (!found) return seen
  return [registered(cv, leaf, coded, found) ?? { ...only, code: codeOf(found.text, coded.codes, false) }]
}

/** A registered leaf with the code that stands where its page's code must be. */
async function withCodeByPrint(picture: GreyPicture, seen: Seen, { codes, windows }: Coded): Promise<Seen> {
  const [guess] = seen.guesses
  if (!seen.clear || !guess) return seen
  for (const { rect, page, paper } of windows) {
    const found = isOf(guess, { paperPage: page, paper }) ? await codeAt(picture, corners(rect).map((point) => toPixels(guess.homography, point)), isToken) : null
    if (found) return { ...seen, code: codeOf(found.text, codes, isOf(guess, codes.get(found.text))) }
  }
  return seen
}

/** The leaf registered to the page that its code stands for; null for a code of another paper, or where the print is not that page's. */
function registered(cv: Cv, { image, picture }: Leaf, { templates, codes }: Coded, { text, corners: symbol }: FoundCode): Seen | null {
  const printed = codes.get(text)
  const template = templates.find(({ page }) => isOf(page, printed))
  if (!printed || !template) return null
  const { rect } = printed
  const map = homographyFrom(symbolCorners(rect), symbol)
  const reading = map && registerByCode(cv, image, picture, template, map, { x: rect.x + rect.w / 2, y: rect.y + rect.h / 2 })
  return reading && { ...reading, code: codeOf(text, codes, true) }
}

function codeOf(token: string, codes: PrintedCodes, agrees: boolean): LeafCode {
  const printed = codes.get(token)
  return { token, script: printed?.script ?? null, paperPage: printed?.paperPage ?? null, agrees }
}
