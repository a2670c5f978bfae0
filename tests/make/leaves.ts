import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'

/** Gives every script page of a paper that has none a placed leaf (a sheaf without a file behind it). `skip` script pages stay without. */
export async function placeLeaves(paperId: string, skip: readonly string[] = []): Promise<void> {
  const fileId = newId()
  await db()('stored_files').insert({ id: fileId, sha256: fileId, size: 1, media_type: 'application/pdf', original_name: 'sheaf.pdf', created_at: Date.now() })
  const sheafId = newId()
  await db()('sheaves').insert({ id: sheafId, paper_id: paperId, file_id: fileId, state: 'placed', created_at: Date.now() })
  const pages = (await db()('script_pages').join('scripts', 'scripts.id', 'script_pages.script_id').join('class_sets', 'class_sets.id', 'scripts.class_set_id')
    .where('class_sets.paper_id', paperId).whereNull('script_pages.leaf_id').whereNotIn('script_pages.id', skip).pluck('script_pages.id')) as string[]
  for (const [position, pageId] of pages.entries()) {
    const id = newId()
    await db()('leaves').insert({ id, sheaf_id: sheafId, position, state: 'placed', width: 1654, height: 2339, homography: '[[2.78,0,0],[0,2.78,0],[0,0,1]]', paper_page: 1, script_page_id: pageId })
    await db()('script_pages').where({ id: pageId }).update({ leaf_id: id })
  }
}
