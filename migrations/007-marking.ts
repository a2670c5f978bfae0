import type { Knex } from 'knex'

// marking = (response, round, marker). Stamps belong to one marking; marks are what the stamps add up to, never stored beside them.
const statements = [
  `create table responses (
    id text primary key,
    script_id text not null references scripts(id) on delete cascade,
    question_id text not null references questions(id),
    ink real,
    unique (script_id, question_id)
  ) strict`,
  `create index responses_question on responses(question_id)`,
  `create table markings (
    id text primary key,
    response_id text not null references responses(id) on delete cascade,
    round text not null check (round in ('standardising', 'first', 're-mark', 'second', 'third', 'agreed', 'review')),
    marker_id text not null references users(id),
    state text not null default 'open' check (state in ('open', 'settled')),
    reason text,
    created_at integer not null,
    settled_at integer,
    check ((state = 'settled') = (settled_at is not null)),
    unique (response_id, round, marker_id)
  ) strict`,
  `create index markings_marker on markings(marker_id)`,
  // Ids and versions are made where the pen came down; a higher version wins, a removed stamp stays as a tombstone.
  `create table stamps (
    id text primary key,
    marking_id text not null references markings(id) on delete cascade,
    version integer not null check (version > 0),
    kind text not null,
    worth integer not null check (worth >= 0),
    mark_point_id text references mark_points(id),
    script_page_id text references script_pages(id),
    x real not null, y real not null, w real not null, h real not null,
    text text not null default '',
    path text not null default '[]' check (json_valid(path)),
    removed integer not null default 0 check (removed in (0, 1)),
    saved_at integer not null
  ) strict`,
  `create index stamps_marking on stamps(marking_id)`,
  `create index stamps_mark_point on stamps(mark_point_id)`,
  // Which marking counts is a dated decision; the one that is not superseded holds.
  `create table counting_decisions (
    id text primary key,
    response_id text not null references responses(id) on delete cascade,
    marking_id text not null references markings(id),
    reason text not null,
    decided_by text references users(id),
    decided_at integer not null,
    superseded_at integer
  ) strict`,
  `create unique index counting_decisions_now on counting_decisions(response_id) where superseded_at is null`,
  `create index counting_decisions_marking on counting_decisions(marking_id)`,
  `create table flags (
    id text primary key,
    response_id text not null references responses(id) on delete cascade,
    note text not null,
    raised_by text not null references users(id),
    raised_at integer not null,
    answer text,
    answered_by text references users(id),
    answered_at integer
  ) strict`,
  `create index flags_response on flags(response_id)`,
  // A signed row of its own beside the raw mark, in half marks.
  `create table adjustments (
    id text primary key,
    response_id text not null references responses(id) on delete cascade,
    halves integer not null check (halves <> 0),
    reason text not null,
    decided_by text not null references users(id),
    decided_at integer not null,
    undone_at integer
  ) strict`,
  `create index adjustments_response on adjustments(response_id)`,
  // The order of a run is drawn once for a marker, question and round, and can be drawn again from its seed.
  `create table run_seeds (
    user_id text not null references users(id),
    question_id text not null references questions(id) on delete cascade,
    round text not null,
    seed text not null,
    primary key (user_id, question_id, round)
  ) strict, without rowid`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['run_seeds', 'adjustments', 'flags', 'counting_decisions', 'stamps', 'markings', 'responses']) await knex.schema.dropTable(table)
}
