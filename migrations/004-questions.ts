import type { Knex } from 'knex'

// What earns marks. Worths and maxima are half marks. What has stamps is withdrawn, never deleted.
const statements = [
  `create table questions (
    id text primary key,
    paper_id text not null references papers(id) on delete cascade,
    label text not null,
    position integer not null,
    maximum integer not null check (maximum > 0),
    text text not null default '',
    answer text not null default '',
    model_solution text not null default '',
    scheme_note text not null default '',
    tolerance integer check (tolerance >= 0),
    withdrawn_at integer,
    withdrawn_by text references users(id),
    withdrawn_reason text,
    withdrawn_as text check (withdrawn_as in ('out', 'full')),
    check ((withdrawn_at is null) = (withdrawn_as is null)),
    unique (paper_id, label)
  ) strict`,
  `create table answer_spaces (
    id text primary key,
    question_id text not null references questions(id) on delete cascade,
    position integer not null,
    page integer not null check (page > 0),
    x real not null, y real not null, w real not null check (w > 0), h real not null check (h > 0)
  ) strict`,
  `create index answer_spaces_question on answer_spaces(question_id)`,
  `create table mark_points (
    id text primary key,
    question_id text not null references questions(id) on delete cascade,
    position integer not null,
    label text not null,
    worth integer not null check (worth > 0),
    kind text check (kind in ('M', 'A', 'B')),
    depends_on text references mark_points(id),
    note text not null default '',
    withdrawn_at integer,
    withdrawn_by text references users(id),
    withdrawn_reason text
  ) strict`,
  `create index mark_points_question on mark_points(question_id)`,
  // How the scheme stood, each time it changed.
  `create table scheme_versions (
    paper_id text not null references papers(id) on delete cascade,
    version integer not null,
    scheme text not null check (json_valid(scheme)),
    made_by text references users(id),
    made_at integer not null,
    primary key (paper_id, version)
  ) strict, without rowid`,
  // Who marks what; no question means every question of the paper.
  `create table paper_markers (
    id text primary key,
    paper_id text not null references papers(id) on delete cascade,
    user_id text not null references users(id),
    question_id text references questions(id) on delete cascade
  ) strict`,
  `create unique index paper_markers_once on paper_markers(paper_id, user_id, coalesce(question_id, ''))`,
  `create index paper_markers_user on paper_markers(user_id)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['paper_markers', 'scheme_versions', 'mark_points', 'answer_spaces', 'questions']) await knex.schema.dropTable(table)
}
