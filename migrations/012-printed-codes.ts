import type { Knex } from 'knex'

// Codes on printed papers. Where the code of each page goes, as it stands now; and what was printed: a print run names the class set, its
// scripts whom they were printed for (a spare one nobody), its pages the token of their code. A later print leaves the earlier one in force.
const statements = [
  `create table code_spots (
    paper_id text not null references papers(id) on delete cascade,
    page integer not null check (page > 0),
    x real not null, y real not null, side real not null check (side > 0),
    primary key (paper_id, page)
  ) strict, without rowid`,
  `create table print_runs (
    id text primary key,
    paper_id text not null references papers(id) on delete cascade,
    class_set_id text not null references class_sets(id) on delete cascade,
    blank_file_id text references stored_files(id) on delete set null,
    two_sided integer not null check (two_sided in (0, 1)),
    spares integer not null check (spares >= 0),
    created_by text references users(id),
    created_at integer not null
  ) strict`,
  `create index print_runs_paper on print_runs(paper_id)`,
  `create index print_runs_class_set on print_runs(class_set_id)`,
  // Places in paper points, as they were when the run was printed.
  `create table print_run_spots (
    print_run_id text not null references print_runs(id) on delete cascade,
    page integer not null,
    x real not null, y real not null, side real not null,
    primary key (print_run_id, page)
  ) strict, without rowid`,
  // A spare script remembers the script that its sheets went into.
  `create table printed_scripts (
    id text primary key,
    print_run_id text not null references print_runs(id) on delete cascade,
    position integer not null,
    student_id text references students(id) on delete cascade,
    script_id text references scripts(id) on delete set null
  ) strict`,
  `create index printed_scripts_run on printed_scripts(print_run_id)`,
  `create index printed_scripts_student on printed_scripts(student_id)`,
  `create index printed_scripts_script on printed_scripts(script_id)`,
  // A token says nothing and opens nothing; it only cannot be guessed.
  `create table printed_pages (
    token text primary key,
    printed_script_id text not null references printed_scripts(id) on delete cascade,
    page integer not null
  ) strict, without rowid`,
  `create unique index printed_pages_once on printed_pages(printed_script_id, page)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['printed_pages', 'printed_scripts', 'print_run_spots', 'print_runs', 'code_spots']) await knex.schema.dropTable(table)
}
