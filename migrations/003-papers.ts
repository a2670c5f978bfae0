import type { Knex } from 'knex'

// Files are kept byte for byte under their hash; nothing rewrites them. A paper is the test itself.
const statements = [
  `create table stored_files (
    id text primary key,
    sha256 text not null,
    size integer not null,
    media_type text not null,
    original_name text not null,
    created_by text references users(id),
    created_at integer not null
  ) strict`,
  `create index stored_files_sha256 on stored_files(sha256)`,
  `create table papers (
    id text primary key,
    title text not null,
    blank_file_id text references stored_files(id),
    marking_step integer not null default 1 check (marking_step in (1, 2)),
    tolerance integer not null default 1 check (tolerance >= 0),
    sample_size integer check (sample_size > 0),
    names_hidden integer not null default 1 check (names_hidden in (0, 1)),
    scheme_version integer not null default 1,
    solutions_released integer not null default 1 check (solutions_released in (0, 1)),
    odd_half text not null default 'kept' check (odd_half in ('kept', 'up', 'down')),
    keep_until text not null,
    created_by text not null references users(id),
    created_at integer not null,
    archived_at integer
  ) strict`,
  // Sizes in paper points of each page of the blank paper.
  `create table paper_pages (
    paper_id text not null references papers(id) on delete cascade,
    page integer not null check (page > 0),
    width real not null,
    height real not null,
    primary key (paper_id, page)
  ) strict, without rowid`,
  // Where the name and each digit of the candidate number are written, in paper points.
  `create table paper_boxes (
    id text primary key,
    paper_id text not null references papers(id) on delete cascade,
    kind text not null check (kind in ('name', 'number')),
    position integer not null,
    page integer not null,
    x real not null, y real not null, w real not null check (w > 0), h real not null check (h > 0)
  ) strict`,
  `create index paper_boxes_paper on paper_boxes(paper_id)`,
  `create table paper_owners (
    paper_id text not null references papers(id) on delete cascade,
    user_id text not null references users(id),
    primary key (paper_id, user_id)
  ) strict, without rowid`,
  `create index paper_owners_user on paper_owners(user_id)`,
  // Boundaries are inclusive: the lowest mark belongs to the grade. In half marks of the paper's total.
  `create table grade_boundaries (
    paper_id text not null references papers(id) on delete cascade,
    grade text not null,
    lowest integer not null check (lowest >= 0),
    primary key (paper_id, grade)
  ) strict, without rowid`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['grade_boundaries', 'paper_owners', 'paper_boxes', 'paper_pages', 'papers', 'stored_files']) await knex.schema.dropTable(table)
}
