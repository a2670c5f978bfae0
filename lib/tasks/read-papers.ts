import { assertMaySchool, maySchool, type Actor } from '@/lib/core/actor'
import type { PaperLine } from '@/lib/core/paper-left'
import { db } from '@/db/knex'
import { countPaper } from '@/db/paper-counts'
import { answersByQuestion, handedBackAt, leavesBeingRead, ownSample, papersMarked, papersModerated, papersOwned, type PaperOfPerson } from '@/db/paper-lines'
import { getPaperStanding } from '@/db/paper-standing'

/** Everything a person has to do with, by class: papers they own, then those they mark or second-mark for others. */
export async function readPapers(actor: Actor): Promise<{ lines: PaperLine[]; mayMake: boolean }> {
  assertMaySchool(actor, 'staff')
  const has = (role: 'teacher' | 'marker' | 'moderator') => actor.roles.includes(role)
  const own = has('teacher') ? await papersOwned(db(), actor.userId) : []
  const owned = new Set(own.map(({ paperId }) => paperId))
  const others = (papers: PaperOfPerson[]) => papers.filter(({ paperId, classSetId }) => !owned.has(paperId) && classSetId !== null)
  const parts: [PaperLine['part'], PaperOfPerson[]][] = [
    ['owner', own],
    ['marker', has('marker') ? others(await papersMarked(db(), actor.userId)) : []],
    ['moderator', has('moderator') ? others(await papersModerated(db(), actor.userId)) : []],
  ]
  const lines: PaperLine[] = []
  for (const [part, papers] of parts) for (const paper of papers) lines.push(await toLine(actor, part, paper))
  return { lines, mayMake: maySchool(actor, 'new-paper') }
}

async function toLine(actor: Actor, part: PaperLine['part'], { hasBlank, ...paper }: PaperOfPerson): Promise<PaperLine> {
  const { paperId, classSetId } = paper
  const { marks } = await getPaperStanding(db(), actor.userId, paperId)
  const questions = classSetId ? await answersByQuestion(db(), classSetId) : []
  return {
    ...paper, part, hasBlank: hasBlank === 1,
    counts: await countPaper(db(), paperId, classSetId),
    questions: part === 'marker' && marks !== 'all' ? questions.filter(({ id }) => marks.includes(id)) : questions,
    reading: classSetId ? await leavesBeingRead(db(), classSetId) : null,
    sample: classSetId && part === 'moderator' ? await ownSample(db(), classSetId, actor.userId) : null,
    handedBackAt: classSetId ? await handedBackAt(db(), classSetId) : null,
  }
}
