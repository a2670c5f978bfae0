import type { Knex } from 'knex'

// A sheaf may hold scripts of several papers. Null: the leaf is of the paper its sheaf was sent to.
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`alter table leaves add column paper_id text references papers(id)`)
  await knex.raw(`create index leaves_paper on leaves(paper_id) where paper_id is not null`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`drop index leaves_paper`)
  await knex.raw(`alter table leaves drop column paper_id`)
}
