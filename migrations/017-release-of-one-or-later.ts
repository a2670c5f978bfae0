import type { Knex } from 'knex'

// A release may wait for its day, and one script may be taken back out of a release that holds for the others.
const statements = [
  `alter table releases add column due_at integer`,
  `alter table returned_scripts add column withdrawn_at integer`,
  `alter table returned_scripts add column withdrawn_by text references users(id)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('alter table returned_scripts drop column withdrawn_by')
  await knex.raw('alter table returned_scripts drop column withdrawn_at')
  await knex.raw('alter table releases drop column due_at')
}
