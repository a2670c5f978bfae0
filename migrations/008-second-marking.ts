import type { Knex } from 'knex'

// A sample is drawn by a stored seed and can be drawn again; nobody takes a script out unseen.
const statements = [
  `create table samples (
    id text primary key,
    class_set_id text not null references class_sets(id),
    moderator_id text not null references users(id),
    seed text not null,
    size integer not null,
    default_size integer not null,
    tolerance integer not null,
    drawn_by text not null references users(id),
    drawn_at integer not null,
    closed_at integer,
    closed_by text references users(id),
    unique (class_set_id, moderator_id)
  ) strict`,
  `create table sample_scripts (
    sample_id text not null references samples(id) on delete cascade,
    script_id text not null references scripts(id),
    position integer not null,
    drawn_as text not null check (drawn_as in ('lowest', 'highest', 'spread', 'added')),
    primary key (sample_id, script_id)
  ) strict, without rowid`,
  `create index sample_scripts_script on sample_scripts(script_id)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['sample_scripts', 'samples']) await knex.schema.dropTable(table)
}
