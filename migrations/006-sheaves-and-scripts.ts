import type { Knex } from 'knex'

// A sheaf is one uploaded file; a leaf one scanned page of it. What the engine found stays beside what a person decided.
const statements = [
  `create table sheaves (
    id text primary key,
    paper_id text not null references papers(id),
    file_id text not null references stored_files(id),
    state text not null default 'waiting' check (state in ('waiting', 'reading', 'placed', 'failed')),
    leaf_count integer,
    problem text,
    problem_detail text check (problem_detail is null or json_valid(problem_detail)),
    created_by text references users(id),
    created_at integer not null,
    started_at integer,
    finished_at integer
  ) strict`,
  `create index sheaves_paper on sheaves(paper_id)`,
  `create table sheaf_class_sets (
    sheaf_id text not null references sheaves(id) on delete cascade,
    class_set_id text not null references class_sets(id),
    primary key (sheaf_id, class_set_id)
  ) strict, without rowid`,
  // One student's answered test. Until a person confirms the name the student is only suggested.
  `create table scripts (
    id text primary key,
    class_set_id text not null references class_sets(id),
    position integer not null,
    student_id text references students(id),
    suggested_student_id text references students(id),
    suggestion_reason text,
    confirmed_by text references users(id),
    confirmed_at integer,
    created_at integer not null,
    foreign key (class_set_id, student_id) references class_set_students(class_set_id, student_id)
  ) strict`,
  `create unique index scripts_once on scripts(class_set_id, student_id) where student_id is not null`,
  `create index scripts_class_set on scripts(class_set_id)`,
  // A page of a script: of the paper, or an extra page with no blank behind it. A re-scan makes another leaf current; the old one stays.
  `create table script_pages (
    id text primary key,
    script_id text not null references scripts(id) on delete cascade,
    paper_page integer,
    extra integer not null default 0 check (extra in (0, 1)),
    position integer not null,
    leaf_id text references leaves(id) deferrable initially deferred,
    check ((paper_page is null) = (extra = 1))
  ) strict`,
  `create unique index script_pages_once on script_pages(script_id, paper_page) where paper_page is not null`,
  `create unique index script_pages_leaf on script_pages(leaf_id) where leaf_id is not null`,
  // Position counts from 0 in the sheaf. "glance" is what the leaf shows by itself, before its neighbours are known. Width and height are pixels of the stored image. "set_aside": kept but not used.
  `create table leaves (
    id text primary key,
    sheaf_id text not null references sheaves(id),
    position integer not null,
    half integer check (half in (0, 1)),
    state text not null default 'read' check (state in ('read', 'placed', 'loose', 'blank', 'set_aside')),
    glance text not null default 'clear' check (glance in ('clear', 'unclear', 'empty', 'unreadable')),
    read_at integer not null default 0,
    width integer, height integer,
    turn integer not null default 0 check (turn in (0, 90, 180, 270)),
    homography text check (homography is null or json_valid(homography)),
    paper_page integer,
    confidence real,
    problem text,
    finding text not null default '{}' check (json_valid(finding)),
    script_page_id text references script_pages(id),
    decided_by text references users(id),
    decided_at integer
  ) strict`,
  `create unique index leaves_once on leaves(sheaf_id, position, coalesce(half, 0))`,
  `create index leaves_script_page on leaves(script_page_id)`,
  `create index leaves_state on leaves(sheaf_id, state)`,
  // What a person decided at the sorting table: the rows it touched as they were and as they became, so that it can be undone.
  `create table sorting_decisions (
    id text primary key,
    number integer not null unique,
    paper_id text not null references papers(id),
    act text not null,
    before text not null check (json_valid(before)),
    after text not null check (json_valid(after)),
    decided_by text not null references users(id),
    decided_at integer not null,
    undone_at integer
  ) strict`,
  `create index sorting_decisions_last on sorting_decisions(paper_id, decided_by, number)`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['sorting_decisions', 'leaves', 'script_pages', 'scripts', 'sheaf_class_sets', 'sheaves']) await knex.schema.dropTable(table)
}
