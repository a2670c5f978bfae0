import type { Db } from './knex'

export type LinkKind = 'invitation' | 'reset'
export type OneTimeLink = Readonly<{ id: string; userId: string; kind: LinkKind; tokenHash: string; expiresAt: number; usedAt: number | null }>
type LinkRow = { id: string; user_id: string; kind: LinkKind; token_hash: string; expires_at: number; used_at: number | null; created_at: number }

/** Puts a link and makes every older one of the person useless: only the newest opens. */
export async function putLink(db: Db, link: Omit<OneTimeLink, 'usedAt'>, at: number): Promise<void> {
  await closeLinks(db, link.userId, at)
  await db<LinkRow>('one_time_links').insert({
    id: link.id, user_id: link.userId, kind: link.kind, token_hash: link.tokenHash, expires_at: link.expiresAt, used_at: null, created_at: at,
  })
}

/** Whatever was still open for this person opens nothing any more. */
export async function closeLinks(db: Db, userId: string, at: number): Promise<void> {
  await db<LinkRow>('one_time_links').where({ user_id: userId, used_at: null }).update({ used_at: at })
}

/** The link of a token that can still be used at `at`. */
export async function findOpenLink(db: Db, tokenHash: string, at: number): Promise<OneTimeLink | null> {
  const row = await db<LinkRow>('one_time_links').where({ token_hash: tokenHash, used_at: null }).where('expires_at', '>', at).first()
  return row ? { id: row.id, userId: row.user_id, kind: row.kind, tokenHash: row.token_hash, expiresAt: row.expires_at, usedAt: row.used_at } : null
}
