import type { Knex } from 'knex'

// A person who signs in. A student of the school's list is a row of `students`; an account is optional there.
const statements = [
  `create table users (
    id text primary key,
    email text unique check (email = lower(email)),
    user_name text unique check (user_name = lower(user_name)),
    given_name text not null,
    family_name text not null,
    password_hash text,
    session_number integer not null default 1,
    disabled_at integer,
    created_at integer not null,
    check (email is not null or user_name is not null)
  ) strict`,
  `create table user_roles (
    user_id text not null references users(id) on delete cascade,
    role text not null check (role in ('teacher', 'marker', 'moderator', 'student', 'admin')),
    primary key (user_id, role)
  ) strict, without rowid`,
  // Links sent by mail, used once: only the hash of the token is kept.
  `create table one_time_links (
    id text primary key,
    user_id text not null references users(id) on delete cascade,
    kind text not null check (kind in ('invitation', 'reset')),
    token_hash text not null unique,
    expires_at integer not null,
    used_at integer,
    created_at integer not null
  ) strict`,
  `create index one_time_links_user on one_time_links(user_id)`,
  // Throttling counts by account first: a whole class shares one address.
  `create table sign_in_attempts (
    id integer primary key,
    account text not null,
    address text not null,
    ok integer not null check (ok in (0, 1)),
    at integer not null
  ) strict`,
  `create index sign_in_attempts_account on sign_in_attempts(account, at)`,
  `create index sign_in_attempts_address on sign_in_attempts(address, at)`,
  `create table settings (name text primary key, value text not null) strict, without rowid`,
]

export async function up(knex: Knex): Promise<void> {
  for (const statement of statements) await knex.raw(statement)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['settings', 'sign_in_attempts', 'one_time_links', 'user_roles', 'users']) await knex.schema.dropTable(table)
}
