import type { Actor } from '@/lib/core/actor'
import type { ErrorCode } from '@/lib/core/errors'
import { secondsLeft, type LeafLine, type LeafLook, type ScanPageData, type SheafProgress } from '@/lib/core/sheaf-progress'
import { listSittingClasses } from '@/db/class-set-students'
import { db } from '@/db/knex'
import { listLeavesOfPaper, type Leaf } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { listScriptPages } from '@/db/scripts'
import { listSheaves, type Sheaf } from '@/db/sheaves'
import { env } from '@/lib/infra/env'
import { findDemoPile } from './find-demo-pile'
import { gatePaper } from './gate-paper'

/** The sheaves of a paper and how far each has come, leaf by leaf, for the scan page to look at again and again. */
export async function readSheaves(actor: Actor, paperId: string): Promise<ScanPageData> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  const leaves = await listLeavesOfPaper(db(), paperId)
  const scriptOf = new Map((await listScriptPages(db(), paperId)).map((page) => [page.id, page.scriptId]))
  const sheaves = await listSheaves(db(), paperId)
  return {
    hasBlankPaper: Boolean(paper?.blankFileId),
    questions: paper?.questions.length ?? 0,
    limitMb: env.SHEAFMARK_UPLOAD_LIMIT_MB,
    classSets: await listSittingClasses(db(), paperId),
    sheaves: sheaves.map((sheaf) => progressOf(sheaf, leaves.filter((leaf) => leaf.sheafId === sheaf.id), scriptOf)),
    demoPile: sheaves.length === 0 && (await findDemoPile(db(), paperId)) !== null,
  }
}

function progressOf(sheaf: Sheaf, leaves: readonly Leaf[], scriptOf: ReadonlyMap<string, string>): SheafProgress {
  const scripts = new Set(leaves.flatMap((leaf) => (leaf.scriptPageId && scriptOf.get(leaf.scriptPageId)) || []))
  return {
    id: sheaf.id, name: sheaf.name, state: sheaf.state, leafCount: sheaf.leafCount ?? leaves.length, leaves: leaves.map(lineOf), scripts: scripts.size,
    secondsLeft: sheaf.state === 'reading' ? secondsLeft([...new Map(leaves.map(({ position, readAt }) => [position, readAt])).values()], sheaf.leafCount ?? 0) : null,
    problem: sheaf.problem as ErrorCode | 'failed' | null, problemDetail: sheaf.problemDetail, receivedAt: sheaf.createdAt,
  }
}

function lineOf(leaf: Leaf): LeafLine {
  const early: Record<Leaf['glance'], LeafLook> = { clear: 'clear', unclear: 'unclear', empty: 'blank', unreadable: 'unreadable' }
  const unreadable = leaf.glance === 'unreadable' && leaf.state === 'loose'
  return { number: leaf.position + 1, look: leaf.state === 'read' ? early[leaf.glance] : unreadable ? 'unreadable' : leaf.state, turned: leaf.turn !== 0 && leaf.state !== 'blank' }
}
