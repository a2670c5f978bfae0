import { mkdirSync } from 'node:fs'
import path from 'node:path'
import knex, { type Knex } from 'knex'
import { env } from '@/lib/infra/env'
import { knexConfig } from './knex-config'

/** The connection or an open transaction: every query's first argument. */
export type Db = Knex

// Development reloads modules; the one connection has to outlive them.
const held = globalThis as { sheafmarkDb?: Knex }

/** The school's database. One connection: inside a transaction use only the transaction. */
export function db(): Knex {
  if (!held.sheafmarkDb) {
    mkdirSync(env.dataFolder, { recursive: true })
    held.sheafmarkDb = knex(knexConfig(path.join(env.dataFolder, 'sheafmark.sqlite')))
  }
  return held.sheafmarkDb
}

/** Puts another database in place (tests), or lets go of the one in use. */
export async function putDb(next: Knex | null): Promise<void> {
  await held.sheafmarkDb?.destroy()
  held.sheafmarkDb = next ?? undefined
}

/** Runs in one write transaction; throws away everything when `work` throws. */
export async function transaction<T>(work: (trx: Knex.Transaction) => Promise<T>): Promise<T> {
  return db().transaction(work)
}
