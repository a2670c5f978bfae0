import type { SignOff } from '@/lib/core/hand-back'
import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

type SignOffRow = { id: string; class_set_id: string; check_key: string; reason: string; signed_by: string; signed_at: number }

/** Signs one line of the clerical check; signed already, the first name stays. */
export async function addSignOff(db: Db, signOff: Readonly<{ classSetId: string; key: string; reason: string; by: string; at: number }>): Promise<void> {
  await db<SignOffRow>('check_sign_offs').insert({ id: newId(), class_set_id: signOff.classSetId, check_key: signOff.key, reason: signOff.reason, signed_by: signOff.by, signed_at: signOff.at })
    .onConflict(['class_set_id', 'check_key']).ignore()
}

/** Takes a signature back. False when there was none. */
export async function dropSignOff(db: Db, classSetId: string, key: string): Promise<boolean> {
  return (await db<SignOffRow>('check_sign_offs').where({ class_set_id: classSetId, check_key: key }).delete()) > 0
}

/** The signatures of a class set by what they are about. */
export async function listSignOffs(db: Db, classSetId: string): Promise<Map<string, SignOff>> {
  const rows = (await db('check_sign_offs').join('users', 'users.id', 'check_sign_offs.signed_by').where({ class_set_id: classSetId })
    .select('check_key', 'reason', 'signed_at', 'users.given_name', 'users.family_name')) as (Pick<SignOffRow, 'check_key' | 'reason' | 'signed_at'> & { given_name: string; family_name: string })[]
  return new Map(rows.map((row) => [row.check_key, { by: `${row.given_name.charAt(0)}. ${row.family_name}`, at: row.signed_at, reason: row.reason }]))
}
