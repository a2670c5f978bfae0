import type { Knex } from 'knex'

// One adjustment of a marker's answers to a question, decided on what a sample showed; n and mean (first minus second, in halves) are those it was
// decided on. Its rows in `adjustments` each hold for one marking alone: where another marking counts later, they count for nothing.
const statements = [
  `create table marker_adjustments (
    id text primary key,
    sample_id text not null references samples(id),
    question_id text not null references questions(id),
    marker_id text not null references users(id),
    halves integer not null check (halves <> 0),
    pairs integer not null,
    mean real not null,
    decided_by text not null references users(id),
    decided_at integer not null,
    undone_by text references users(id),
    undone_at integer,
    check ((undone_by is null) = (undone_at is null))
  ) strict`,
  `create unique index marker_adjustments_now on marker_adjustments(sample_id, question_id, marker_id) where undone_at is null`,
  `alter table adjustments add column marker_adjustment_id text references marker_adjustments(id)`,
  `alter table adjustments add column marking_id text references markings(id)`,
  `create index adjustments_marker_adjustment on adjustments(marker_adjustment_id) where marker_adjustment_id is not null`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop index adjustments_marker_adjustment')
  for (const column of ['marking_id', 'marker_adjustment_id']) await knex.raw(`alter table adjustments drop column ${column}`)
  await knex.schema.dropTable('marker_adjustments')
}
