import type { Knex } from 'knex'

// How sure a suggested name is, from 0 to 1. Null: nobody is suggested.
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`alter table scripts add column suggestion_certainty real check (suggestion_certainty between 0 and 1)`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`alter table scripts drop column suggestion_certainty`)
}
