import type { PDFDocument } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { getSheaf } from '@/db/sheaves'
import { keptPath, openKept } from '@/lib/infra/file-store'
import { canTakeOver, type ScriptPage } from '@/lib/handing-back/returned-page'
import type { LoadedSheaves } from '@/lib/handing-back/returned-script'
import { sayCopies } from '@/lib/handing-back/say-copies'
import { loadSheafFile } from '@/lib/handing-back/sheaf-file'
import { decodedPage } from './decoded-page'

/** A sheaf that is open: null where its pages cannot be taken over as they are (enciphered, damaged). */
type Held = Readonly<{ path: string; document: PDFDocument | null }>
/** A script's pages ready to be built. `says` is about pages that are copies, for the summary; null when all are as they came. */
export type Fetched = Readonly<{ sheaves: LoadedSheaves; pages: readonly ScriptPage[]; says: string | null }>

/** The sheaves that scripts are built from, each opened once for all its students; their pictures stay on disk. Close after use. */
export class SheavesAtHand {
  private readonly held = new Map<string, Held>()
  private readonly files: { close: () => void }[] = []

  /**
   * Gets some pages ready: as they lie in their sheaf where that can be, else as a decoded copy of the scan without loss. An image that
   * shows two pages is cut, so that nothing of the other goes along. Throws sheaf_missing, page_unreadable, or page_shared where it is not known where to cut.
   */
  async fetch(pages: readonly ScriptPage[]): Promise<Fetched> {
    const sheaves = new Map<string, PDFDocument>()
    const ready: ScriptPage[] = []
    for (const [k, page] of pages.entries()) {
      const { path, document } = await this.open(page.sheaf)
      if (page.half !== undefined && !page.part) throw new AppError('page_shared', { page: page.index + 1 })
      if (document && page.half === undefined && canTakeOver(document, page.index)) {
        sheaves.set(page.sheaf, document)
        ready.push(page)
        continue
      }
      const name = `copy ${k}`
      sheaves.set(name, await decodedPage(path, page))
      ready.push({ ...page, half: undefined, sheaf: name, index: 0 })
    }
    const copies = ready.flatMap((page, k) => (page.sheaf === `copy ${k}` ? [{ page: k + 1, cut: pages[k]!.half !== undefined }] : []))
    return { sheaves, pages: ready, says: sayCopies(copies, pages.length) }
  }

  close(): void {
    for (const file of this.files.splice(0)) file.close()
    this.held.clear()
  }

  private async open(id: string): Promise<Held> {
    const known = this.held.get(id)
    if (known) return known
    const sheaf = await getSheaf(db(), id)
    const file = sheaf && openOrNot(sheaf.sha256)
    if (!sheaf || !file) throw new AppError('sheaf_missing')
    this.files.push(file)
    const document = await loadSheafFile(file).catch(() => null)
    // Two readers of a damaged file may count its pages differently; then no page number says the same to both.
    const same = document !== null && (sheaf.leafCount === null || pagesIn(document) === sheaf.leafCount)
    const held = { path: keptPath(sheaf.sha256), document: same ? document : null }
    this.held.set(id, held)
    return held
  }
}

function pagesIn(document: PDFDocument): number {
  try {
    return document.getPageCount()
  } catch {
    return -1
  }
}

function openOrNot(sha256: string): ReturnType<typeof openKept> | null {
  try {
    return openKept(sha256)
  } catch {
    return null
  }
}
