import type { Role } from '@/lib/core/actor'
import type { Db } from './knex'

export type UserRow = {
  id: string
  email: string | null
  user_name: string | null
  given_name: string
  family_name: string
  password_hash: string | null
  session_number: number
  disabled_at: number | null
  created_at: number
}

export type User = Readonly<{
  id: string
  email: string | null
  userName: string | null
  givenName: string
  familyName: string
  passwordHash: string | null
  sessionNumber: number
  disabledAt: number | null
  roles: readonly Role[]
}>

async function withRoles(db: Db, row: UserRow | undefined): Promise<User | null> {
  if (!row) return null
  const roles = await db<{ user_id: string; role: Role }>('user_roles').where({ user_id: row.id }).pluck('role')
  return toUser(row, roles as Role[])
}

function toUser(row: UserRow, roles: readonly Role[]): User {
  return {
    id: row.id, email: row.email, userName: row.user_name, givenName: row.given_name, familyName: row.family_name,
    passwordHash: row.password_hash, sessionNumber: row.session_number, disabledAt: row.disabled_at, roles,
  }
}

export async function getUser(db: Db, id: string): Promise<User | null> {
  return withRoles(db, await db<UserRow>('users').where({ id }).first())
}

/** By e-mail or user name, whatever case it was typed in. */
export async function findUserByAccount(db: Db, account: string): Promise<User | null> {
  const typed = account.trim().toLowerCase()
  return withRoles(db, await db<UserRow>('users').where({ email: typed }).orWhere({ user_name: typed }).first())
}

export type NewUser = Omit<User, 'sessionNumber' | 'disabledAt'>

export async function addUser(db: Db, user: NewUser): Promise<void> {
  await db<UserRow>('users').insert({
    id: user.id, email: user.email?.toLowerCase() ?? null, user_name: user.userName?.toLowerCase() ?? null, given_name: user.givenName,
    family_name: user.familyName, password_hash: user.passwordHash, session_number: 1, disabled_at: null, created_at: Date.now(),
  })
  await setRoles(db, user.id, user.roles)
}

export async function setRoles(db: Db, userId: string, roles: readonly Role[]): Promise<void> {
  await db('user_roles').where({ user_id: userId }).delete()
  if (roles.length > 0) await db('user_roles').insert(roles.map((role) => ({ user_id: userId, role })))
}

/** A new number ends every session of the person at once. */
export async function endSessions(db: Db, userId: string): Promise<void> {
  await db<UserRow>('users').where({ id: userId }).increment('session_number', 1)
}

export async function setPassword(db: Db, userId: string, passwordHash: string): Promise<void> {
  await db<UserRow>('users').where({ id: userId }).update({ password_hash: passwordHash })
}

export async function setDisabled(db: Db, userId: string, at: number | null): Promise<void> {
  await db<UserRow>('users').where({ id: userId }).update({ disabled_at: at })
}

export async function countUsers(db: Db): Promise<number> {
  const row = await db('users').count({ n: '*' }).first<{ n: number }>()
  return row?.n ?? 0
}

/** The student's row that an account belongs to. */
export async function studentIdOfUser(db: Db, userId: string): Promise<string | null> {
  const row = await db('students').where({ user_id: userId }).first<{ id: string } | undefined>('id')
  return row?.id ?? null
}

type NameChange = Readonly<{ email: string | null; userName: string | null; givenName: string; familyName: string }>

export async function setNames(db: Db, userId: string, to: NameChange): Promise<void> {
  await db<UserRow>('users').where({ id: userId }).update({
    email: to.email?.toLowerCase() ?? null, user_name: to.userName?.toLowerCase() ?? null, given_name: to.givenName, family_name: to.familyName,
  })
}

/** Admins who can sign in: enabled and with a password. */
export async function listWorkingAdmins(db: Db): Promise<string[]> {
  return db('users').join('user_roles', 'user_roles.user_id', 'users.id')
    .where({ role: 'admin' }).whereNull('disabled_at').whereNotNull('password_hash').pluck('users.id')
}

/** Everyone holding one of the roles, by family name. */
export async function listUsers(db: Db, having: readonly Role[]): Promise<User[]> {
  const rows = await db<UserRow>('users').whereIn('id', db('user_roles').whereIn('role', [...having]).select('user_id')).orderBy(['family_name', 'given_name', 'id'])
  const held = await db<{ user_id: string; role: Role }>('user_roles').select('user_id', 'role')
  const rolesOf = new Map<string, Role[]>()
  for (const { user_id, role } of held) rolesOf.set(user_id, [...(rolesOf.get(user_id) ?? []), role])
  return rows.map((row) => toUser(row, rolesOf.get(row.id) ?? []))
}
