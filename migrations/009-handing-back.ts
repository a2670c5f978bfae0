import type { Knex } from 'knex'

// A release freezes what was handed back: a revision, a file and its hash, and the score summary as it stood. 'failed': nothing of it could be built.
const statements = [
  `create table releases (
    id text primary key,
    class_set_id text not null references class_sets(id),
    state text not null default 'building' check (state in ('building', 'released', 'withdrawn', 'failed')),
    problem text,
    created_by text not null references users(id),
    created_at integer not null,
    released_at integer,
    withdrawn_by text references users(id),
    withdrawn_at integer
  ) strict`,
  `create index releases_class_set on releases(class_set_id)`,
  // Two people who press at once start one release.
  `create unique index releases_building on releases(class_set_id) where state = 'building'`,
  `create table returned_scripts (
    id text primary key,
    release_id text not null references releases(id) on delete cascade,
    script_id text not null references scripts(id),
    student_id text not null references students(id),
    revision integer not null,
    file_id text references stored_files(id),
    built_at integer,
    -- Says what went into the file: the same as long as no mark, stamp or page of the script changes.
    content_key text,
    -- Why this script could not be built and stayed behind.
    problem text,
    first_read_at integer,
    unique (release_id, script_id)
  ) strict`,
  `create index returned_scripts_student on returned_scripts(student_id)`,
  `create index returned_scripts_script on returned_scripts(script_id)`,
  // Marks in halves, frozen with the release; detail holds questions, points and comments for the student's page.
  `create table score_summaries (
    returned_script_id text primary key references returned_scripts(id) on delete cascade,
    total integer not null,
    maximum integer not null,
    grade text,
    detail text not null check (json_valid(detail))
  ) strict, without rowid`,
  // One line of the clerical list signed off by name, or one script kept back: 'check/subject'. What comes up later is a line of its own.
  `create table check_sign_offs (
    id text primary key,
    class_set_id text not null references class_sets(id) on delete cascade,
    check_key text not null,
    reason text not null,
    signed_by text not null references users(id),
    signed_at integer not null,
    unique (class_set_id, check_key)
  ) strict`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['check_sign_offs', 'score_summaries', 'returned_scripts', 'releases']) await knex.schema.dropTable(table)
}
