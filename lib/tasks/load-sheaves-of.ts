import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { getSheaf } from '@/db/sheaves'
import { readKept } from '@/lib/infra/file-store'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import { loadSheaf, type LoadedSheaves } from '@/lib/handing-back/returned-script'

/** The sheaves that some pages lie in, those in `held` not loaded again. Throws sheaf_missing or page_unreadable. */
export async function loadSheavesOf(pages: readonly ScriptPage[], held = new Map<string, Awaited<ReturnType<typeof loadSheaf>>>()): Promise<LoadedSheaves> {
  for (const { sheaf: id } of pages) {
    if (held.has(id)) continue
    const sheaf = await getSheaf(db(), id)
    const bytes = sheaf && (await readKept(sheaf.sha256).catch(() => null))
    if (!bytes) throw new AppError('sheaf_missing')
    held.set(id, await loadSheaf(bytes).catch(() => { throw new AppError('page_unreadable') }))
  }
  return held
}
