import type { GreyPicture } from '@/lib/core/grey-picture'
import type { LeafReading, PageImage } from '@/lib/core/leaf'
import { homographyFrom } from '@/lib/core/paper-space'
import { isToken, symbolCorners, type PrintedCodes } from '@/lib/core/printed-code'
import { findCode, type CodeWindow } from '@/lib/reading/find-code'
import type { Cv } from '@/lib/registering/opencv'
import { registerByCode } from '@/lib/registering/register-leaf'
import type { Template } from '@/lib/registering/template'

/** What a leaf's code says: the leaf registered by it where its print agrees (`reading`), else the code alone. Null for a leaf without one of ours. */
export type CodeReading = Readonly<{ code: NonNullable<LeafReading['code']>; reading: Omit<LeafReading, 'index'> | null }>

/** Places where codes were printed, each once. */
export function codeWindows(codes: PrintedCodes, templates: readonly Template[]): CodeWindow[] {
  const windows = new Map<string, CodeWindow>()
  for (const { rect, paperPage } of codes.values()) {
    const page = templates.find((template) => template.page.page === paperPage)?.page
    if (page) windows.set(`${rect.x} ${rect.y} ${page.widthPoints}`, { rect, pageWidth: page.widthPoints, pageHeight: page.heightPoints })
  }
  return [...windows.values()]
}

/** Reads a leaf's code and, if it is one of this paper's, registers the leaf to the page it stands for. */
export async function readByCode(cv: Cv, image: PageImage, picture: GreyPicture, templates: readonly Template[], codes: PrintedCodes, windows: readonly CodeWindow[]): Promise<CodeReading | null> {
  const found = await findCode(picture, image, windows, isToken)
  if (!found) return null
  const printed = codes.get(found.text)
  const template = printed && templates.find(({ page }) => page.page === printed.paperPage)
  if (!printed || !template) return { code: { token: found.text, script: null, paperPage: null, agrees: false }, reading: null }
  const { rect, script, paperPage } = printed
  const map = homographyFrom(symbolCorners(rect), found.corners)
  const reading = map && registerByCode(cv, image, picture, template, map, { x: rect.x + rect.w / 2, y: rect.y + rect.h / 2 })
  return { code: { token: found.text, script, paperPage, agrees: reading !== null }, reading }
}
