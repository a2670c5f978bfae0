import type { PdfFile } from './pdf/pdf-file'
import { PdfRef, PdfStream, isDict, type PdfDict, type PdfValue } from './pdf/value'

/** A page of the file: its dictionary (looked up when its turn comes) and what the tree above gives it. */
export type PageEntry = Readonly<{ page: PdfRef | PdfDict; inherited: PdfDict }>

const inheritable = ['Resources', 'MediaBox', 'CropBox', 'Rotate']
const deepest = 60
/** Counting stops here: far more than any sheaf may have. */
const mostCounted = 20_000

/**
 * Lists the pages of a file in order. A tree that cannot be followed is tried again with the file's objects found one by one; where
 * the tree is lost, the page objects themselves are taken in the order they lie in the file. Null when there is no trace of pages at all.
 */
export function listPages(pdf: PdfFile): PageEntry[] | null {
  const first = walk(pdf)
  if (first?.whole) return first.pages
  if (!pdf.rebuild()) return first?.pages ?? loosePages(pdf)
  const second = walk(pdf)
  if (second?.whole) return second.pages
  const loose = loosePages(pdf) ?? []
  const best = [second?.pages ?? [], first?.pages ?? [], loose].sort((a, b) => readable(pdf, b) - readable(pdf, a))[0]!
  return best.length > 0 ? best : null
}

type Walked = { pages: PageEntry[]; /** Every branch could be followed to a page. */ whole: boolean }

function walk(pdf: PdfFile): Walked | null {
  const root = pdf.dict(pdf.trailer.get('Root')) ?? lostRoot(pdf)
  const top = root?.get('Pages')
  if (!pdf.dict(top)) return null
  const walked: Walked = { pages: [], whole: true }
  const seen = new Set<number>()
  const step = (at: PdfValue, inherited: PdfDict, depth: number): void => {
    if (walked.pages.length >= mostCounted) return
    const dict = pdf.dict(at)
    if (!dict || depth > deepest) {
      walked.whole = false
      // a page that the tree names and the file has not: it keeps its place and is reported
      if (at instanceof PdfRef && depth > 0) walked.pages.push({ page: at, inherited })
      return
    }
    const kids = pdf.get(dict.get('Kids'))
    if (!Array.isArray(kids)) {
      if (pdf.name(dict.get('Type')) === 'Pages' && depth === 0) return
      walked.pages.push({ page: at instanceof PdfRef ? at : dict, inherited })
      return
    }
    // a branch is followed once, or a loop would have no end
    if (at instanceof PdfRef && seen.has(at.number)) return
    if (at instanceof PdfRef) seen.add(at.number)
    const given = new Map([...inherited, ...inheritable.filter((key) => dict.has(key)).map((key) => [key, dict.get(key)!] as const)])
    for (const kid of kids) step(kid, given, depth + 1)
  }
  step(top!, new Map(), 0)
  return walked
}

/** The catalog of a file whose trailer is lost: the last one in it. */
function lostRoot(pdf: PdfFile): PdfDict | null {
  let found: PdfDict | null = null
  for (const number of pdf.numbers()) {
    const value = pdf.get(new PdfRef(number, 0))
    if (isDict(value) && value.get('Type') === 'Catalog') found = value
  }
  return found
}

function readable(pdf: PdfFile, pages: readonly PageEntry[]): number {
  return pages.filter(({ page }) => pdf.dict(page) !== null).length
}

function loosePages(pdf: PdfFile): PageEntry[] | null {
  const pages: PageEntry[] = []
  for (const number of pdf.numbers()) {
    const ref = new PdfRef(number, 0)
    const value = pdf.get(ref)
    if (!isDict(value) || value.get('Type') !== 'Page') continue
    pages.push({ page: ref, inherited: fromParents(pdf, value) })
    if (pages.length >= mostCounted) break
  }
  if (pages.length > 0 && breaksOffBeyond(pdf, pages.at(-1)!)) pages.push({ page: lostPage, inherited: new Map() })
  return pages.length > 0 ? pages : null
}

/** Stands for a page of which only a part of a picture is left. */
const lostPage = new PdfRef(0, 65535)

/** Whether the file ends within a picture that its last page does not draw: one page more was there. */
function breaksOffBeyond(pdf: PdfFile, { page, inherited }: PageEntry): boolean {
  const last = pdf.get(new PdfRef([...pdf.numbers()].at(-1) ?? 0, 0))
  if (!(last instanceof PdfStream) || !last.broken || last.dict.get('Subtype') !== 'Image') return false
  const resources = pdf.dict(pdf.dict(page)?.get('Resources') ?? inherited.get('Resources'))
  const drawn = [...(pdf.dict(resources?.get('XObject')) ?? new Map<string, PdfValue>()).values()]
  return !drawn.some((value) => value instanceof PdfRef && value.number === last.number)
}

/** What a page gets from above, by its own way up. */
function fromParents(pdf: PdfFile, page: PdfDict): PdfDict {
  const given = new Map<string, PdfValue>()
  let above = pdf.dict(page.get('Parent'))
  for (let k = 0; above && k < deepest; k++) {
    for (const key of inheritable) if (above.has(key) && !given.has(key)) given.set(key, above.get(key)!)
    above = pdf.dict(above.get('Parent'))
  }
  return given
}
