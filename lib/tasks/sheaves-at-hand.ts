import type { PDFDocument } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { getSheaf } from '@/db/sheaves'
import { openKept } from '@/lib/infra/file-store'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import { loadSheafFile } from '@/lib/handing-back/sheaf-file'

/** The sheaves that scripts are built from, each opened once for all its students; their pictures stay on disk. Close after use. */
export class SheavesAtHand {
  readonly documents = new Map<string, PDFDocument>()
  private readonly files: { close: () => void }[] = []

  /** Opens what some pages lie in. Throws sheaf_missing or page_unreadable. */
  async fetch(pages: readonly ScriptPage[]): Promise<ReadonlyMap<string, PDFDocument>> {
    for (const { sheaf: id } of pages) {
      if (this.documents.has(id)) continue
      const sheaf = await getSheaf(db(), id)
      const file = sheaf && openOrNot(sheaf.sha256)
      if (!file) throw new AppError('sheaf_missing')
      this.files.push(file)
      this.documents.set(id, await loadSheafFile(file).catch(() => { throw new AppError('page_unreadable') }))
    }
    return this.documents
  }

  close(): void {
    for (const file of this.files.splice(0)) file.close()
    this.documents.clear()
  }
}

function openOrNot(sha256: string): ReturnType<typeof openKept> | null {
  try {
    return openKept(sha256)
  } catch {
    return null
  }
}
