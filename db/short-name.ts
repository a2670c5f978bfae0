import type { Db } from './knex'

/** "R. Adeyemi", as a person is named beside their marks. */
export async function shortName(db: Db, userId: string): Promise<string> {
  const row = await db('users').where({ id: userId }).first<{ given_name: string; family_name: string } | undefined>('given_name', 'family_name')
  return row ? `${row.given_name.charAt(0)}. ${row.family_name}` : ''
}
