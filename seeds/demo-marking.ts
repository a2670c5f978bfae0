import { db } from '@/db/knex'
import { listClassSetStudents } from '@/db/class-set-students'
import { getPaper } from '@/db/papers'
import { listRunResponses, listScriptPages } from '@/db/runs'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { halves, type HalfMarks } from '@/lib/core/marks'
import type { Question } from '@/lib/core/paper'
import { PressedStamp, type Round } from '@/lib/core/stamp'
import { pressStamp } from '@/lib/tasks/press-stamp'
import { settleMarking } from '@/lib/tasks/settle-marking'
import { readTruth, type ClassSetName, type TruthQuestion } from './class-set-files'

type Pile = Readonly<{ paperId: string; classSetId: string; set: ClassSetName; round: Round; questions: (label: string) => boolean; most?: number }>
/** How far from the deserved mark this marker is, in halves, for the n-th response; the demo's moderator differs now and then. */
type Lean = (n: number) => number

const comments = ['Show each step.', 'Check the last step.', 'Good, clearly set out.', 'Say what the number means.']

/**
 * Marks responses as a person would, stamp by stamp, through the tasks the desk uses. Responses that may not be marked by this
 * actor in this round are left alone by giving only those in `responseIds`.
 */
export async function markDemoResponses(actor: Actor, pile: Pile, lean: Lean = () => 0, responseIds?: (questionId: string) => Promise<readonly string[]>): Promise<void> {
  const paper = (await getPaper(db(), pile.paperId))!
  const truth = readTruth(pile.set)
  const numbers = new Map((await listClassSetStudents(db(), [pile.classSetId])).filter((student) => student.scriptId).map((student) => [student.scriptId!, student.candidateNumber]))
  let n = 0
  for (const question of paper.questions.filter(({ label }) => pile.questions(label))) {
    const spot = truth.questions.find(({ label }) => label === question.label)!
    const only = responseIds && new Set(await responseIds(question.id))
    const responses = (await listRunResponses(db(), question.id)).filter(({ id }) => !only || only.has(id)).slice(0, pile.most)
    for (const { id, scriptId } of responses) {
      const wrote = truth.responses.find((response) => response.question === question.label && response.candidate_number === numbers.get(scriptId))
      const page = (await listScriptPages(db(), scriptId)).find((candidate) => candidate.paperPage === question.spaces[0]?.page)
      if (!wrote || !page) continue
      const mark = Math.min(question.maximum, Math.max(0, wrote.intended_marks * 2 + lean(n++)))
      const stamps = wrote.blank ? [nothing(spot)] : stampsFor(question, spot, halves(mark), n)
      for (const stamp of stamps) await pressStamp(actor, PressedStamp.parse({ id: newId(), version: 1, markPointId: null, scriptPageId: page.id, worth: 0, ...stamp, responseId: id, round: pile.round }))
      await settleMarking(actor, { responseId: id, round: pile.round })
    }
  }
}

type Drawn = Readonly<{ kind: PressedStamp['kind']; x: number; y: number; w?: number; h?: number; text?: string; worth?: HalfMarks; markPointId?: string }>

function nothing({ region }: TruthQuestion): Drawn {
  return { kind: 'nothing-written', x: region.x + region.w * 0.55, y: region.y + region.h * 0.45 }
}

/** Ticks where each point was earned: working marks down the working, the last one beside the answer. */
function stampsFor(question: Question, { region, areas }: TruthQuestion, mark: HalfMarks, n: number): Drawn[] {
  const answer = areas?.answer ?? { x: region.x + region.w * 0.6, y: region.y + region.h - 30, w: 60, h: 24 }
  const beside = { x: answer.x + answer.w - 26, y: answer.y + answer.h - 8 }
  if (mark === 0) return [{ kind: 'cross', ...beside }, { kind: 'nought', x: beside.x + 22, y: beside.y - 4 }]
  const stamps: Drawn[] = []
  let left: number = mark
  for (const [k, point] of question.points.entries()) {
    const worth = halves(Math.min(left, point.worth))
    if (worth === 0) break
    left -= worth
    const last = k === question.points.length - 1
    // A low space has no room for working: its ticks stand before the answer, clear of the writing.
    const low = region.h < 70
    const working = low ? { x: answer.x - 34 - 26 * k, y: beside.y } : { x: region.x + 250 + 6 * k, y: region.y + 46 + 18 * k }
    stamps.push({ kind: worth === 1 ? 'half' : 'tick', worth, markPointId: point.id, ...(last ? beside : working) })
  }
  if (mark < question.maximum && n % 5 === 0 && region.h > 90) stamps.push({ kind: 'note', text: comments[n % comments.length]!, x: region.x + 300, y: region.y + 34 })
  if (mark < question.maximum && n % 3 === 0) stamps.push({ kind: 'ring', x: answer.x + 6, y: answer.y + 1, w: 52, h: answer.h - 3 })
  return stamps
}
