import { copyFileSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import knex from 'knex'
import { putDb, db } from '@/db/knex'
import { knexConfig } from '@/db/knex-config'
import { migrate } from '@/db/migrate'
import { addUser } from '@/db/users'
import type { Actor, Role } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'

// tests/set-up.ts makes the data folder of each test file before anything reads the environment.
let template: Promise<string> | undefined

async function makeTemplate(): Promise<string> {
  const file = path.join(mkdtempSync(path.join(tmpdir(), 'sheafmark-template-')), 'school.sqlite')
  const fresh = knex(knexConfig(file))
  await migrate(fresh)
  await fresh.raw('pragma wal_checkpoint(truncate)')
  await fresh.destroy()
  return file
}

/** A real, empty, migrated school in a SQLite file of its own. Call in beforeEach; close in afterEach. */
export async function openSchool(): Promise<void> {
  template ??= makeTemplate()
  const file = path.join(mkdtempSync(path.join(tmpdir(), 'sheafmark-test-')), 'school.sqlite')
  copyFileSync(await template, file)
  await putDb(knex({ ...knexConfig(file), acquireConnectionTimeout: 2000 }))
}

export async function closeSchool(): Promise<void> {
  const file = (db().client.config.connection as { filename: string }).filename
  await putDb(null)
  rmSync(path.dirname(file), { recursive: true, force: true })
}

/** A person with roles, stored, as the actor of a task. */
export async function anActor(...roles: Role[]): Promise<Actor> {
  const id = newId()
  await addUser(db(), { id, email: `${id.slice(0, 8)}@kestrelbay.example`, userName: null, givenName: 'Rowan', familyName: 'Test', passwordHash: null, roles })
  return { userId: id, givenName: 'Rowan', familyName: 'Test', roles, studentId: null }
}
