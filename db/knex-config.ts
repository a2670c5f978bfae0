import type { Knex } from 'knex'
import BetterSqlite3Client from 'knex/lib/dialects/better-sqlite3/index.js'

type Query = { sql: string }
type QueryingClient = { _query(connection: unknown, query: Query): unknown }

/**
 * Knex opens transactions with plain BEGIN; web and worker doing read-then-write would then lose writes to SQLITE_BUSY.
 * BEGIN IMMEDIATE takes the write lock at once and waits its turn.
 */
class ImmediateClient extends (BetterSqlite3Client as unknown as new (config: Knex.Config) => QueryingClient) {
  override _query(connection: unknown, query: Query): unknown {
    if (query.sql === 'BEGIN;') query.sql = 'BEGIN IMMEDIATE;'
    return super._query(connection, query)
  }
}

type Connection = { pragma(text: string): unknown }

/** Knex settings for the database file at `filename`. */
export function knexConfig(filename: string): Knex.Config {
  return {
    client: ImmediateClient as unknown as typeof Knex.Client,
    connection: { filename },
    useNullAsDefault: true,
    acquireConnectionTimeout: 10_000,
    pool: {
      min: 1,
      max: 1,
      afterCreate(connection: Connection, done: (error: Error | null, connection: Connection) => void) {
        for (const text of ['journal_mode = WAL', 'foreign_keys = ON', 'busy_timeout = 5000', 'synchronous = NORMAL']) connection.pragma(text)
        done(null, connection)
      },
    },
  }
}
