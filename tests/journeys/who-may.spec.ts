import { expect, test } from '@playwright/test'
import type { Knex } from 'knex'
import { actionRows } from './who-may/actions'
import { askAction, askPage, askPagePart, askRoute } from './who-may/ask'
import { actionDoors, pageDoors, routeDoors, treeAround } from './who-may/doors'
import { fits, isRefusal, wordsOf, type Answer, type Expected } from './who-may/expectation'
import { findObjects, openDemoData, type Objects } from './who-may/objects'
import { pageRows } from './who-may/pages'
import { everyone, signEveryoneIn, type Sessions, type Who } from './who-may/people'
import { routeRows } from './who-may/routes'

let data: Knex
let objects: Objects
let sessions: Sessions

test.beforeAll(async () => {
  data = openDemoData()
  objects = await findObjects(data)
  sessions = await signEveryoneIn()
})
test.afterAll(async () => {
  for (const who of everyone) await sessions[who].dispose()
  await data.destroy()
})

/** Lets everyone knock, and tells each answer that is not the expected one, or says more than that there is nothing. */
async function walk(row: Readonly<{ door: string; of: string; says: Expected }>, ask: (who: Who) => Promise<Answer>): Promise<string[]> {
  const wrong: string[] = []
  for (const [who, word] of wordsOf(row.says)) {
    if (word === '-') continue
    const before = await lastAuditLine(who)
    const answer = await ask(who)
    const where = `${row.door} (${row.of}) as ${who}`
    if (!fits(word, answer)) wrong.push(`${where}: ${word} was expected, ${answer.status} ${answer.code} came`)
    const read = row.door.startsWith('/') || row.door.startsWith('GET ')
    if (read && isRefusal(wordsOf(row.says).get('nobody')!) && !answer.forOneOnly) wrong.push(`${where}: a cache may keep the answer for somebody else`)
    if (!isRefusal(word)) continue
    if ((await lastAuditLine(who)) !== before) wrong.push(`${where}: turned away, and yet something was done`)
    for (const secret of secrets()) if (answer.body.includes(secret)) wrong.push(`${where}: turned away, and yet the answer says "${secret}"`)
  }
  return wrong
}

async function lastAuditLine(who: Who): Promise<number | null> {
  const row = await data('audit_lines').where({ actor_id: who === 'nobody' ? null : objects.users[who] }).max({ id: 'id' }).first<{ id: number | null }>()
  return row.id
}

/** What nobody may read in a refusal. */
function secrets(): string[] {
  const { half, sampled, loose, back, others } = objects
  return [half.title, sampled.title, loose.title, back.title, others.title, `${half.given} ${half.family}`, `${half.family}, ${half.given}`]
}

/** An address of the tree with objects put in for what stands in brackets. */
function addressOfPage(page: string): string {
  const ids: Record<string, string> = { classId: objects.half.class, paperId: objects.half.paper, questionId: objects.half.hers.question, responseId: objects.sampled.read.response, returnedScriptId: objects.back.student, token: 'none' }
  return page.replace(/\[(\w+)\]/g, (_, name: string) => ids[name]!)
}

test('every page, route and action of the tree stands in the tables, and nothing else', () => {
  const standing = (rows: readonly { door: string }[]) => [...new Set(rows.map(({ door }) => door))].sort()
  expect(standing(pageRows)).toEqual(pageDoors().map(({ address }) => address).sort())
  expect(standing(routeRows)).toEqual(routeDoors())
  expect(standing(actionRows)).toEqual(actionDoors().map(({ name }) => name).sort())
})

test('every page as everyone', async () => {
  const wrong: string[] = []
  for (const row of pageRows) wrong.push(...(await walk(row, (who) => askPage(sessions[who], row.at(objects)))))
  expect(wrong).toEqual([])
})

// A browser that holds the layout already asks for the page alone: no page may lean on its layout to turn people away.
test('every page without its layout, as those whom the layout turns away', async () => {
  const doors = new Map(pageDoors().map((door) => [door.address, door]))
  const asked: readonly Who[] = ['nobody', 'other', 'student']
  const wrong: string[] = []
  for (const row of pageRows) {
    const at = row.at(objects)
    for (const [who, word] of wordsOf(row.says)) {
      const door = doors.get(row.door)
      if (!door || !asked.includes(who) || !['in', 'my', 'home'].includes(word)) continue
      const answer = await askPagePart(sessions[who], at, treeAround(door, at))
      const turnedAway = word === 'in' ? answer.code === 'in' : [403, 404].includes(answer.status)
      if (!turnedAway || secrets().some((secret) => answer.body.includes(secret))) wrong.push(`${row.door} (${row.of}) as ${who}: ${answer.status} ${answer.code} came`)
    }
  }
  expect(wrong).toEqual([])
})

test('every route as everyone', async () => {
  const wrong: string[] = []
  for (const row of routeRows) wrong.push(...(await walk(row, (who) => askRoute(sessions[who], row.door.split(' ')[0]!, row.at(objects), row.with?.(objects)))))
  expect(wrong).toEqual([])
})

test('every action as everyone', async () => {
  const doors = new Map(actionDoors().map((door) => [door.name, door]))
  const wrong: string[] = []
  for (const row of actionRows) {
    const door = doors.get(row.door)
    if (!door) continue
    wrong.push(...(await walk(row, (who) => askAction(sessions[who], door.id, addressOfPage(door.page), row.with(objects)))))
  }
  expect(wrong).toEqual([])
})
