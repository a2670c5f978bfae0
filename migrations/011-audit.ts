import type { Knex } from 'knex'

// Who did what to what, from and to which value: ids and values only, never a name or the text of a comment. Nothing edits a line.
const statements = [
  `create table audit_lines (
    id integer primary key autoincrement,
    at integer not null,
    actor_id text,
    act text not null,
    object_kind text not null,
    object_id text not null,
    paper_id text,
    from_value text,
    to_value text
  ) strict`,
  `create index audit_lines_object on audit_lines(object_kind, object_id)`,
  `create index audit_lines_paper on audit_lines(paper_id, id)`,
  `create index audit_lines_actor on audit_lines(actor_id)`,
  `create trigger audit_lines_no_update before update on audit_lines begin select raise(abort, 'audit lines are never changed'); end`,
  `create trigger audit_lines_no_delete before delete on audit_lines begin select raise(abort, 'audit lines are never removed'); end`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['audit_lines']) await knex.schema.dropTable(table)
}
