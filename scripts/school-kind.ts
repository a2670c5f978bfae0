import type { Db } from '@/db/knex'

/**
 * A data folder belongs to the demo school or to a real one, from its first start on. Returns whether this was the first
 * start; throws when the folder belongs to the other kind, so that real scripts never end up among invented ones.
 */
export async function claimSchoolKind(db: Db, kind: 'demo' | 'real'): Promise<boolean> {
  const held = await db('settings').where({ name: 'school_kind' }).first<{ value: string } | undefined>('value')
  if (!held) {
    await db('settings').insert({ name: 'school_kind', value: kind })
    return true
  }
  if (held.value === kind) return false
  throw new Error(
    kind === 'real'
      ? 'This data folder holds the demo school. Choose another for the real one: SHEAFMARK_DATA=/path/to/folder SHEAFMARK_DEMO=0 npm start'
      : 'This data folder holds a real school. Start it with SHEAFMARK_DEMO=0, or choose another folder with SHEAFMARK_DATA.',
  )
}
