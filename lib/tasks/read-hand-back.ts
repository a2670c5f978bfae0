import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { HandBackStudent, HandBackView, KeptBackReason } from '@/lib/core/hand-back'
import { paperMaximum } from '@/lib/core/paper'
import { listClassSets } from '@/db/class-sets'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { listReleases } from '@/db/releases'
import { addressedStudents, listStanding, listStayedBehind, type Standing } from '@/db/returned-scripts'
import { pairRows, type Pair } from '@/lib/results/mark-book-rows'
import { checkClassSet } from './check-class-set'
import { gatePaper } from './gate-paper'
import { gatherClassSet, gatheredScript, type GatheredSet } from './gather-class-set'
import { scriptsToGo, type Going } from './scripts-to-go'

/**
 * The hand-back page of one class set (the first when none is named): what the clerical check finds, what would go now, what keeps
 * scripts back, and what was handed back when and by whom. While a release is being built only its progress is worked out. For owners.
 */
export async function readHandBack(actor: Actor, paperId: string, classSetId?: string): Promise<HandBackView> {
  await gatePaper(db(), actor, 'change', paperId)
  const paper = await getPaper(db(), paperId)
  const classSets = (await listClassSets(db(), paperId)).map(({ id, className, satOn }) => ({ id, className, satOn }))
  const chosen = classSetId === undefined ? classSets[0] : classSets.find(({ id }) => id === classSetId)
  if (!paper || (classSetId !== undefined && !chosen)) throw new AppError('not_found')
  const view = { paperId, classSets, classSetId: chosen?.id ?? null, maximum: paperMaximum(paper.questions), solutionsReleased: paper.solutionsReleased }
  const nothing = { checks: [], students: [], ready: { scripts: 0, changed: 0, mails: 0 }, building: null, releases: [] }
  if (!chosen) return { ...view, ...nothing }
  const releases = await listReleases(db(), chosen.id)
  const building = releases.find(({ state }) => state === 'building') ?? null
  if (building) return { ...view, ...nothing, building, releases }
  return { ...view, building, releases, ...(await standingOf(actor, chosen.id)) }
}

async function standingOf(actor: Actor, classSetId: string): Promise<Pick<HandBackView, 'checks' | 'students' | 'ready'>> {
  const gathered = await gatherClassSet(db(), classSetId)
  const checks = await checkClassSet(db(), actor, gathered)
  const standing = await listStanding(db(), classSetId)
  const going = scriptsToGo(gathered, checks, standing)
  const addressed = await addressedStudents(db(), classSetId)
  const goes = going.filter((one) => one.goes)
  const behind = new Map((await listStayedBehind(db(), classSetId)).map(({ scriptId, problem }) => [scriptId, problem as KeptBackReason]))
  return {
    checks, ready: { scripts: goes.length, changed: goes.filter(({ changed }) => changed).length, mails: goes.filter(({ studentId }) => addressed.has(studentId!)).length },
    students: pairRows(gathered.students, gathered.scripts).map((pair) => studentLine(pair, gathered, going, standing, behind)),
  }
}

function studentLine({ student, script }: Pair, gathered: GatheredSet, going: readonly Going[], standing: readonly Standing[], behind: ReadonlyMap<string, KeptBackReason>): HandBackStudent {
  const own = going.find(({ scriptId }) => scriptId === script?.scriptId)
  const held = standing.find(({ scriptId }) => scriptId === script?.scriptId)
  const source = script && own?.keptBack === null ? gatheredScript(gathered, script.scriptId) : null
  const absent = student !== null && student.attendance !== 'expected'
  return {
    key: script?.scriptId ?? student!.studentId, name: student ? `${student.familyName}, ${student.givenName}` : `Script ${script!.position + 1}`, candidateNumber: student?.candidateNumber ?? '',
    scriptNumber: script ? script.position + 1 : null, total: source?.total.final ?? null, grade: source?.grade ?? null,
    returned: held ? { id: held.id, revision: held.revision, at: held.releasedAt, firstReadAt: held.firstReadAt } : null,
    changed: own?.changed ?? false,
    keptBack: absent ? 'absent' : own ? (own.keptBack ?? (own.goes ? (behind.get(own.scriptId) ?? null) : null)) : 'no_script',
  }
}
