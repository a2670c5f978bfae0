import type { Check, KeptBackReason } from '@/lib/core/hand-back'
import type { Standing } from '@/db/returned-scripts'
import { scriptResult } from '@/lib/handing-back/script-result'
import { gatheredScript, type GatheredSet } from './gather-class-set'

/** Where a script stands: `goes` in the next release, or why it does not. `changed`: it differs from what was handed back. */
export type Going = Readonly<{ scriptId: string; studentId: string | null; goes: boolean; changed: boolean; keptBack: KeptBackReason | null }>

/** What keeps one script from being handed back now; null when nothing does. */
export function keptBackReason(gathered: GatheredSet, scriptId: string, keptBack: ReadonlySet<string>): KeptBackReason | null {
  const script = gathered.scripts.find((one) => one.scriptId === scriptId)
  const student = gathered.students.find(({ studentId }) => studentId === (script?.studentId ?? script?.suggestedStudentId))
  if (student && student.attendance !== 'expected') return 'absent'
  if (keptBack.has(scriptId)) return 'kept_back'
  if (!script?.studentId || !student) return 'name_open'
  if (!(gathered.pages.get(scriptId) ?? []).some(({ leaf }) => leaf)) return 'no_page'
  const asked = new Set(gathered.paper.questions.filter(({ withdrawn }) => !withdrawn).map(({ id }) => id))
  const open = (gathered.cells.get(scriptId) ?? []).some(({ questionId, hasPage, raw }) => asked.has(questionId) && hasPage === 1 && raw === null)
  return open ? 'unmarked' : null
}

/** Scripts that a person has kept back by name. */
function keptBackScripts(checks: readonly Check[]): Set<string> {
  return new Set(checks.filter(({ closing }) => closing === 'keep-back').flatMap(({ lines }) => lines.filter(({ signed }) => signed !== null).map(({ subject }) => subject)))
}

/** Every script of a class set and whether it goes in the next release: those never handed back, and those that have changed since. */
export function scriptsToGo(gathered: GatheredSet, checks: readonly Check[], standing: readonly Standing[]): Going[] {
  const held = new Map(standing.map((one) => [one.scriptId, one]))
  const back = keptBackScripts(checks)
  return gathered.scripts.map(({ scriptId, studentId }) => {
    const keptBack = keptBackReason(gathered, scriptId, back)
    const before = held.get(scriptId)
    const script = keptBack === null && before ? gatheredScript(gathered, scriptId) : null
    const changed = script !== null && scriptResult(script).key !== before!.contentKey
    return { scriptId, studentId, keptBack, changed, goes: keptBack === null && (!before || changed) }
  })
}

