import type { Knex } from 'knex'

// The school's list of students, and its classes. Candidate numbers are text: leading noughts count.
const statements = [
  `create table students (
    id text primary key,
    candidate_number text not null unique,
    given_name text not null,
    family_name text not null,
    email text,
    user_id text unique references users(id),
    created_at integer not null,
    left_at integer
  ) strict`,
  `create table classes (
    id text primary key,
    name text not null unique,
    created_at integer not null,
    archived_at integer
  ) strict`,
  `create table class_students (
    class_id text not null references classes(id) on delete cascade,
    student_id text not null references students(id),
    primary key (class_id, student_id)
  ) strict, without rowid`,
  `create index class_students_student on class_students(student_id)`,
  `create table class_teachers (
    class_id text not null references classes(id) on delete cascade,
    user_id text not null references users(id),
    primary key (class_id, user_id)
  ) strict, without rowid`,
  `create index class_teachers_user on class_teachers(user_id)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['class_teachers', 'class_students', 'classes', 'students']) await knex.schema.dropTable(table)
}
