import type { Actor } from '@/lib/core/actor'
import type { Check } from '@/lib/core/hand-back'
import { listSignOffs } from '@/db/check-sign-offs'
import type { Db } from '@/db/knex'
import { countSheavesInWork, listLooseLeaves } from '@/db/scripts-to-return'
import { clericalCheck, type CheckedScript, type CheckedSet } from '@/lib/handing-back/clerical-check'
import type { GatheredSet } from './gather-class-set'
import { readSecondMarking } from './read-second-marking'

/** The clerical check of a class set as it stands, with what was signed. The caller has asked the gate. */
export async function checkClassSet(trx: Db, actor: Actor, gathered: GatheredSet): Promise<Check[]> {
  const { paper, set } = gathered
  const loose = (await listLooseLeaves(trx, set.id)).map(({ id, position, sheafName }) => ({ id, says: `Leaf ${position + 1} of ${sheafName} lies loose` }))
  const reading = (await countSheavesInWork(trx, set.id)) > 0 ? [{ id: 'reading', says: 'A sheaf of this class is still being read' }] : []
  const scripts = checkedScripts(gathered)
  const there = new Set(gathered.scripts.map(({ studentId, suggestedStudentId }) => studentId ?? suggestedStudentId))
  const without = gathered.students.filter(({ studentId, attendance }) => attendance === 'expected' && !there.has(studentId)).map(({ studentId, givenName, familyName }) => ({ studentId, name: `${givenName} ${familyName}` }))
  const checked: CheckedSet = { paper, scripts, without, loose: [...reading, ...loose], undecided: await undecidedOf(trx, actor, gathered, scripts) }
  return clericalCheck(checked, await listSignOffs(trx, set.id))
}

function checkedScripts({ paper, students, scripts, cells, markings, pages }: GatheredSet): CheckedScript[] {
  const nameOf = (studentId: string | null) => students.find((student) => student.studentId === studentId)
  const asked = new Set(paper.questions.filter(({ withdrawn }) => !withdrawn).flatMap(({ spaces }) => spaces.map(({ page }) => page)))
  return scripts.map(({ scriptId, position, studentId, suggestedStudentId }) => {
    const student = nameOf(studentId)
    const own = studentId ?? suggestedStudentId
    const twin = studentId === null && own !== null ? scripts.find((other) => other.scriptId !== scriptId && (other.studentId ?? other.suggestedStudentId) === own) : undefined
    const there = new Set((pages.get(scriptId) ?? []).filter(({ leaf }) => leaf).map(({ paperPage }) => paperPage))
    const given = new Map((markings.get(scriptId) ?? []).map((marking) => [marking.questionId, marking.stamps]))
    return {
      scriptId, who: student ? `${student.givenName} ${student.familyName}` : `Script ${position + 1}`, named: studentId !== null, absent: (nameOf(own)?.attendance ?? 'expected') !== 'expected',
      doubles: twin ? `script ${twin.position + 1}` : null, missingPages: [...asked].filter((page) => !there.has(page)).sort((a, b) => a - b),
      answers: (cells.get(scriptId) ?? []).map(({ responseId, questionId, hasPage, flagged }) => ({ responseId, questionId, hasPage: hasPage === 1, flagged: flagged === 1, stamps: given.get(questionId) ?? null })),
    }
  })
}

/** Scripts of open samples that nobody has read to the end, or where both marks lie too far apart and nobody has decided. */
async function undecidedOf(trx: Db, actor: Actor, { paper, set, scripts: all }: GatheredSet, scripts: readonly CheckedScript[]): Promise<CheckedSet['undecided']> {
  const samples = (await readSecondMarking(actor, paper.id, trx)).samples.filter(({ classSetId, closedAt }) => classSetId === set.id && closedAt === null)
  const lines = new Map<string, string>()
  for (const sample of samples) {
    const apart = new Set(sample.questions.flatMap(({ compared }) => compared.filter(({ open }) => open).map(({ scriptNumber }) => scriptNumber)))
    for (const { scriptId, read, answers } of sample.scripts) {
      const { who } = scripts.find((script) => script.scriptId === scriptId)!
      const number = all.find((script) => script.scriptId === scriptId)!.position + 1
      if (read < answers) lines.set(scriptId, `${who}: ${read} of ${answers} answers second-marked by ${sample.moderator}`)
      else if (apart.has(number)) lines.set(scriptId, `${who}: two marks too far apart, not decided`)
    }
  }
  return [...lines].map(([scriptId, says]) => ({ scriptId, says }))
}
