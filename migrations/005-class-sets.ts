import type { Knex } from 'knex'

// One class sitting one paper on one date, with its list as it stood that day.
const statements = [
  `create table class_sets (
    id text primary key,
    paper_id text not null references papers(id),
    class_id text not null references classes(id),
    sat_on text not null,
    resit_of text references class_sets(id),
    created_at integer not null
  ) strict`,
  `create unique index class_sets_once on class_sets(paper_id, class_id, sat_on)`,
  `create table class_set_students (
    class_set_id text not null references class_sets(id) on delete cascade,
    student_id text not null references students(id),
    candidate_number text not null,
    given_name text not null,
    family_name text not null,
    attendance text not null default 'expected' check (attendance in ('expected', 'absent', 'excused')),
    primary key (class_set_id, student_id)
  ) strict, without rowid`,
  `create index class_set_students_student on class_set_students(student_id)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['class_set_students', 'class_sets']) await knex.schema.dropTable(table)
}
