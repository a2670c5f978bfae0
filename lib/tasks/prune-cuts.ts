import { cutKey, type Cut } from '@/lib/cutting/cut-key'
import { leavesWithPictures, sweepPictures } from '@/lib/infra/kept-picture'
import { addJob } from '@/db/jobs'
import { db, type Db } from '@/db/knex'
import { getLeaf, type Leaf } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { getScriptPage } from '@/db/runs'
import { cutOf, masksOf, wholePage } from './pictures-of-script'
import { cropBoxes, leafCrop } from './read-leaf-crop'

/** The subject of a sweep through all papers, and through what is left of leaves that are gone. */
export const everyPaper = 'every paper'
/** Pictures younger than this stay: they may be being written, and who asked for them may ask again. In ms. */
const young = 5 * 60_000
/** A sweep follows a change after so long, once nobody looks at the old pictures any more. In ms. */
const after = 10 * 60_000

/** Asks the worker to sweep away the cuts of a paper that a change has put out of use. */
export async function askToPrune(db: Db, paperId: string): Promise<void> {
  await addJob(db, 'prune-cuts', paperId, paperId === everyPaper ? 0 : after)
}

/** Sweeps away kept pictures that nothing shows any more: of leaves that are gone, of boxes that were moved, of scans that another replaced. False when stopped half way. */
export async function pruneCuts(subject: string, goOn: () => boolean, youngerThanMs = young): Promise<boolean> {
  for (const leafId of await leavesWithPictures()) {
    if (!goOn()) return false
    const leaf = await getLeaf(db(), leafId)
    if (subject !== everyPaper && leaf?.paperId !== subject) continue
    const shown = leaf ? await shownOf(leaf) : null
    await sweepPictures(leafId, (name) => shown !== null && (name === 'leaf' || shown.has(name.slice(0, name.indexOf('-')))), youngerThanMs)
  }
  return true
}

/** The keys of all cuts of a leaf that a screen may ask for: strips and pages with names covered and open, and the crops of the sorting table. */
async function shownOf(leaf: Leaf & { paperId: string }): Promise<Set<string>> {
  const paper = await getPaper(db(), leaf.paperId)
  const page = leaf.scriptPageId === null ? null : await getScriptPage(db(), leaf.scriptPageId)
  const cuts: (Cut | null)[] = []
  for (const box of cropBoxes) cuts.push(await leafCrop(leaf, paper, box))
  if (paper && page?.leaf?.id === leaf.id) {
    const spaces = paper.questions.flatMap(({ spaces: own }) => own).filter((space) => space.page === page.paperPage).map(({ rect }) => rect)
    for (const rect of [...spaces, wholePage(page, paper)]) if (rect) cuts.push(cutOf(page, rect, []), cutOf(page, rect, masksOf(paper, page.paperPage)))
  }
  return new Set(cuts.flatMap((cut) => (cut ? cutKey(cut) : [])))
}
