import { db } from '@/db/knex'
import { findOpenLink } from '@/db/one-time-links'
import { getUser } from '@/db/users'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'
import { hashOfToken } from '@/lib/infra/link-token'

/** Whose password a link or code is for. Reading uses nothing up: mail programs open links too. Throws link_used. */
export async function readLink(token: string): Promise<{ givenName: string; account: string }> {
  const link = await findOpenLink(db(), hashOfToken(token), now())
  const user = link && (await getUser(db(), link.userId))
  if (!user || user.disabledAt !== null) throw new AppError('link_used')
  return { givenName: user.givenName, account: user.email ?? user.userName! }
}
