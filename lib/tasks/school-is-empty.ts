import { db } from '@/db/knex'
import { countUsers } from '@/db/users'

/** Whether nobody at all has an account yet: only then a first admin can be made. */
export async function schoolIsEmpty(): Promise<boolean> {
  return (await countUsers(db())) === 0
}
