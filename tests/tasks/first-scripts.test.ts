import { afterEach, beforeEach, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { getLeaf } from '@/db/leaves'
import type { Actor } from '@/lib/core/actor'
import { layLeaf } from '@/lib/tasks/lay-leaf'
import { openRun } from '@/lib/tasks/open-run'
import { pressStamp } from '@/lib/tasks/press-stamp'
import { readSheaf } from '@/lib/tasks/read-sheaf'
import { readSheaves } from '@/lib/tasks/read-sheaves'
import { aClassSetPaper } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'
import { aStamp } from '@/tests/make/stamp'

let teacher: Actor
beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
})
afterEach(closeSchool)

const whereLeavesLie = async () => (await db()('script_pages').join('leaves', 'leaves.id', 'script_pages.leaf_id').orderBy('leaves.position').select('script_pages.script_id', 'leaves.position')) as { script_id: string; position: number }[]

it('puts whole scripts in place while the rest of the sheaf is read, and never takes one away again', async () => {
  const { paperId, classSetId, truth, scan } = await aClassSetPaper(teacher.userId, 'everyday')
  const sheafId = await aWaitingSheaf(paperId, classSetId, scan, truth.length)
  // stopped half way, as by a worker that ends
  let left = 24
  expect(await readSheaf(sheafId, () => left-- > 0)).toBe(false)
  const early = await whereLeavesLie()
  expect(early.length).toBeGreaterThanOrEqual(8)
  expect((await readSheaves(teacher, paperId)).sheaves[0]).toMatchObject({ state: 'reading', scripts: new Set(early.map(({ script_id }) => script_id)).size })

  // the first of them is marked meanwhile, and a page of another taken out by hand
  const question = await db()('questions').where({ paper_id: paperId }).orderBy('position').first<{ id: string }>('id')
  const run = await openRun(teacher, { paperId, questionId: question.id, round: 'first' })
  const strip = run.strips.find(({ pictures }) => pictures[0]?.src)!
  const page = strip.pictures[0]!
  await pressStamp(teacher, aStamp({ responseId: strip.responseId, scriptPageId: page.scriptPageId, x: page.rect.x + 9, y: page.rect.y + 9 }))
  const taken = early.at(-1)!
  const leafId = (await db()('leaves').where({ position: taken.position }).first<{ id: string }>('id')).id
  await layLeaf(teacher, { leafId, to: 'loose' })

  expect(await readSheaf(sheafId, () => true)).toBe(true)
  const after = await whereLeavesLie()
  for (const lie of early) if (lie !== taken) expect(after).toContainEqual(lie)
  expect((await getLeaf(db(), leafId))!.state).toBe('loose')
  expect(await db()('stamps').where({ script_page_id: page.scriptPageId }).count({ n: '*' }).first()).toEqual({ n: 1 })
  expect((await db()('scripts').orderBy('position').pluck('position')) as number[]).toEqual(Array.from({ length: new Set(after.map(({ script_id }) => script_id)).size }, (_, k) => k + 1))
  // every script holds the leaves of one student
  const numbers = new Map<string, Set<string>>()
  for (const { script_id, position } of after) numbers.set(script_id, (numbers.get(script_id) ?? new Set()).add(truth[position]!.candidate_number ?? `leaf ${position}`))
  expect([...numbers.values()].every(({ size }) => size === 1)).toBe(true)
}, 240_000)
