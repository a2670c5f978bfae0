import type { Actor } from '@/lib/core/actor'
import { writePaperFile } from '@/lib/setting/write-paper-file'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { gatePaper } from './gate-paper'

/** A paper as a paper.json: its text, and a file name. */
export async function exportPaper(actor: Actor, paperId: string): Promise<{ text: string; name: string }> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = (await getPaper(db(), paperId))!
  const name = paper.title.toLowerCase().normalize('NFKD').replace(/[^a-z0-9]+/g, '-').replace(/^-+|-+$/g, '').slice(0, 60)
  return { text: `${JSON.stringify(writePaperFile(paper), null, 1)}\n`, name: `${name || 'paper'}.json` }
}
