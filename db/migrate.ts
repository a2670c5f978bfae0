import { readdirSync } from 'node:fs'
import path from 'node:path'
import type { Knex } from 'knex'

type Migration = { up(knex: Knex): Promise<void>; down(knex: Knex): Promise<void> }

/** Migrations are imported by us, not by Knex, and named without an extension, so that any loader can run them. */
function migrationSource(folder: string): Knex.MigrationSource<string> {
  return {
    getMigrations: async () => readdirSync(folder).filter((name) => /^\d.*\.ts$/.test(name)).map((name) => name.replace(/\.ts$/, '')).sort(),
    getMigrationName: (name) => name,
    getMigration: async (name) => (await import(`../migrations/${name}.ts`)) as Migration,
  }
}

/** Brings a database to the newest schema. Returns the names of the migrations that ran. */
export async function migrate(knex: Knex): Promise<string[]> {
  const folder = path.join(import.meta.dirname, '..', 'migrations')
  const [, ran] = (await knex.migrate.latest({ migrationSource: migrationSource(folder) })) as [number, string[]]
  return ran
}
