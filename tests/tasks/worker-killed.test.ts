import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { db, putDb } from '@/db/knex'
import { migrate } from '@/db/migrate'
import { env } from '@/lib/infra/env'
import { anActor } from '@/tests/make/school'
import { aClassSetPaper } from '@/tests/make/class-set'
import { aWaitingSheaf } from '@/tests/make/sheaf'

const workers: ChildProcess[] = []

/** A real worker process on this test's own data folder. */
function startWorker(): ChildProcess {
  const root = path.join(import.meta.dirname, '../..')
  const settings = { ...process.env, SHEAFMARK_DATA: env.dataFolder, SHEAFMARK_LOG: 'error' } as unknown as NodeJS.ProcessEnv
  const child = spawn(process.execPath, ['--import', 'tsx', 'scripts/worker.ts'], { cwd: root, env: settings, stdio: ['ignore', 'inherit', 'inherit'] })
  workers.push(child)
  return child
}

async function until(what: () => Promise<boolean>): Promise<void> {
  while (!(await what())) await wait(50)
}
const rows = async (sheafId: string) => (await db()('leaves').where({ sheaf_id: sheafId }).orderBy('position').select('id', 'position', 'read_at')) as { id: string; position: number; read_at: number }[]
const stateOf = async (sheafId: string) => (await db()('sheaves').where({ id: sheafId }).first<{ state: string }>('state')).state

beforeAll(async () => {
  await migrate(db())
})
afterAll(async () => {
  for (const child of workers) if (child.exitCode === null && child.signalCode === null) child.kill('SIGKILL')
  await putDb(null)
})

it('goes on where a killed worker broke off, with one row a leaf', async () => {
  const teacher = await anActor('teacher')
  const { paperId, classSetId, truth, scan } = await aClassSetPaper(teacher.userId, 'bitonal')
  const sheafId = await aWaitingSheaf(paperId, classSetId, scan, truth.length)

  const first = startWorker()
  await until(async () => (await rows(sheafId)).length >= 5)
  first.kill('SIGKILL')
  await once(first, 'exit')
  const before = await rows(sheafId)
  expect(before.length).toBeLessThan(truth.length)
  expect(await stateOf(sheafId)).toBe('reading')

  const second = startWorker()
  await until(async () => (await stateOf(sheafId)) !== 'reading')
  second.kill('SIGTERM')
  const [code] = (await once(second, 'exit')) as [number | null]
  expect(code).toBe(0)

  const after = await rows(sheafId)
  expect(await stateOf(sheafId)).toBe('placed')
  expect(after.map(({ position }) => position)).toEqual(truth.map(({ index }) => index))
  // what the first worker read is what stands: same rows, not read again
  for (const row of before) expect(after).toContainEqual(row)
  expect(await db()('jobs').where({ subject_id: sheafId }).pluck('state')).toEqual(['done'])
  expect(await db()('audit_lines').where({ object_id: sheafId, act: 'sheaf.placed' }).count({ n: '*' }).first()).toEqual({ n: 1 })
}, 180_000)
