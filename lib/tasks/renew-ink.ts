import type { Question } from '@/lib/core/paper'
import type { StrokeMap } from '@/lib/core/leaf'
import { sameHomography } from '@/lib/core/paper-space'
import type { Db } from '@/db/knex'
import { getSeenWriting, listLeavesOfPaper } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { setInk } from '@/db/responses'
import { listScriptPages, type ScriptPage } from '@/db/scripts'
import { inkOfSpace } from '@/lib/cutting/ink-of-space'

/**
 * Measures anew how much is written in the answer spaces of some scripts (all of the paper by default), from what was seen when their
 * leaves were read: no picture is opened. Unknown where a page is missing or lies otherwise than it was read.
 * @param touched picks scripts by any one of their pages
 */
export async function renewInk(db: Db, paperId: string, touched: (page: ScriptPage) => boolean = () => true): Promise<void> {
  const paper = await getPaper(db, paperId)
  if (!paper) return
  const all = await listScriptPages(db, paperId)
  const some = new Set(all.filter(touched).map(({ scriptId }) => scriptId))
  const pages = all.filter(({ scriptId }) => some.has(scriptId))
  const seen = await strokesOf(db, paperId, pages.flatMap(({ leafId }) => leafId ?? []))
  const scripts = new Map<string, Map<number, StrokeMap>>()
  for (const { scriptId, paperPage, leafId } of pages) {
    const own = scripts.get(scriptId) ?? new Map<number, StrokeMap>()
    scripts.set(scriptId, own)
    const leaf = seen.get(leafId ?? '')
    if (paperPage !== null && leaf?.paperPage === paperPage) own.set(paperPage, leaf.strokes)
  }
  await setInk(db, [...scripts].flatMap(([scriptId, own]) => paper.questions.map((question) => ({ scriptId, questionId: question.id, ink: inkOf(question, own) }))))
}

function inkOf({ spaces }: Question, pages: ReadonlyMap<number, StrokeMap>): number | null {
  const inks = spaces.map(({ page, rect }) => { const strokes = pages.get(page); return strokes ? inkOfSpace(strokes, rect) : null })
  return inks.length === 0 || inks.includes(null) ? null : inks.reduce<number>((sum, ink) => sum + ink!, 0)
}

/** Strokes by leaf, of those that lie as they were read. */
async function strokesOf(db: Db, paperId: string, leafIds: readonly string[]): Promise<Map<string, { paperPage: number; strokes: StrokeMap }>> {
  const seen = await getSeenWriting(db, leafIds, 'strokes')
  const lie = new Map((await listLeavesOfPaper(db, paperId)).map(({ id, homography }) => [id, homography]))
  return new Map([...seen].flatMap(([id, { paperPage, homography, seen: strokes }]) => {
    const now = lie.get(id)
    return now && sameHomography(now, homography) ? [[id, { paperPage, strokes }] as const] : []
  }))
}
