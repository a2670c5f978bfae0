import type { Knex } from 'knex'

// Durable work: a job is put in the same transaction as the rows it is about; a mail leaves once, even over a crash.
const statements = [
  `create table jobs (
    id text primary key,
    kind text not null,
    subject_id text not null,
    state text not null default 'waiting' check (state in ('waiting', 'running', 'done', 'failed')),
    attempts integer not null default 0,
    run_after integer not null,
    lease_until integer,
    worker text,
    error_code text,
    created_at integer not null,
    finished_at integer
  ) strict`,
  `create index jobs_next on jobs(state, run_after)`,
  `create unique index jobs_open_once on jobs(kind, subject_id) where state in ('waiting', 'running')`,
  `create table outbox_mails (
    id text primary key,
    once_key text not null unique,
    kind text not null,
    to_address text not null,
    subject text not null,
    text text not null,
    html text not null,
    state text not null default 'waiting' check (state in ('waiting', 'sending', 'sent', 'failed')),
    attempts integer not null default 0,
    send_after integer not null,
    lease_until integer,
    sent_at integer,
    error text,
    created_at integer not null
  ) strict`,
  `create index outbox_mails_next on outbox_mails(state, send_after)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['outbox_mails', 'jobs']) await knex.schema.dropTable(table)
}
