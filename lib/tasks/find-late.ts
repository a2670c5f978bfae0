import type { LeafFinding, LeafReading } from '@/lib/core/leaf'
import { listClassSetStudents, type ListedStudent } from '@/db/class-set-students'
import type { Db } from '@/db/knex'
import { getLeafEvidence, listLeavesOfPaper, type LeafEvidence } from '@/db/leaves'
import { listScriptPages, listScripts, type Script, type ScriptPage } from '@/db/scripts'
import { listSheafClassSets, type Sheaf } from '@/db/sheaves'
import { joinLate, type EarlierScript, type LateVerdict } from '@/lib/placing/join-late'

/** Where leaves of a sheaf go that may belong to scripts of earlier sheaves, by their place in `found`; empty when there are none. */
export async function findLate(trx: Db, sheaf: Sheaf, found: readonly Readonly<{ reading: LeafReading; finding: LeafFinding }>[]): Promise<Map<number, LateVerdict>> {
  const classSetIds = await listSheafClassSets(trx, sheaf.id, sheaf.paperId)
  const own = new Set((await listLeavesOfPaper(trx, sheaf.paperId)).filter(({ sheafId }) => sheafId === sheaf.id).map(({ id }) => id))
  const pages = (await listScriptPages(trx, sheaf.paperId)).filter(({ leafId }) => leafId !== null)
  const scripts = (await listScripts(trx, sheaf.paperId)).filter(({ classSetId }) => classSetIds.includes(classSetId))
  const before = scripts.filter(({ id }) => pages.some((page) => page.scriptId === id && !own.has(page.leafId!)))
  if (before.length === 0) return new Map()
  const students = await listClassSetStudents(trx, classSetIds)
  const evidence = await getLeafEvidence(trx, pages.filter(({ scriptId }) => before.some(({ id }) => id === scriptId)).map(({ leafId }) => leafId!))
  const expected = students.filter(({ attendance, scriptId }) => attendance === 'expected' || scriptId !== null).length
  const wholeNew = new Set(found.flatMap(({ finding }) => (finding.kind === 'script' && finding.missing.length === 0 ? [finding.script] : []))).size
  const without = Math.max(0, expected - Math.max(scripts.length, before.length + wholeNew))
  return joinLate(found.map(({ reading }) => reading), found.map(({ finding }) => finding), before.map((script) => earlierOf(script, pages, students, evidence)), without)
}

function earlierOf({ id, studentId, classSetId }: Script, pages: readonly ScriptPage[], students: readonly ListedStudent[], evidence: ReadonlyMap<string, LeafEvidence>): EarlierScript {
  const student = students.find((one) => one.studentId === studentId && one.classSetId === classSetId)
  return {
    id, number: student?.candidateNumber ?? null,
    pages: pages.flatMap(({ scriptId, paperPage, leafId }) => {
      if (scriptId !== id || paperPage === null) return []
      const reading = evidence.get(leafId!)?.reading
      // The ink was seen on the page that the reading took it for; put elsewhere by hand it says nothing.
      const seenAs = reading?.guesses[0]?.paperPage === paperPage
      return [{ paperPage, ink: seenAs ? (reading?.ink ?? null) : null, pen: seenAs ? (reading?.pen ?? null) : null }]
    }),
  }
}
