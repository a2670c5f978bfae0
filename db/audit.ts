import type { Actor } from '@/lib/core/actor'
import type { Db } from './knex'

/** Ids and values only: never a name, never the text of a comment. */
export type AuditLine = Readonly<{ act: string; objectKind: string; objectId: string; paperId?: string | null; from?: string | number | null; to?: string | number | null }>

type AuditRow = { id: number; at: number; actor_id: string | null; act: string; object_kind: string; object_id: string; paper_id: string | null; from_value: string | null; to_value: string | null }

/** Writes who did what, in the transaction of the change itself. `actor` null is the worker. */
export async function addAuditLine(db: Db, actor: Pick<Actor, 'userId'> | null, line: AuditLine): Promise<void> {
  await db<AuditRow>('audit_lines').insert({
    at: Date.now(),
    actor_id: actor?.userId ?? null,
    act: line.act,
    object_kind: line.objectKind,
    object_id: line.objectId,
    paper_id: line.paperId ?? null,
    from_value: line.from === undefined || line.from === null ? null : String(line.from),
    to_value: line.to === undefined || line.to === null ? null : String(line.to),
  })
}

export type AuditEntry = Readonly<{ id: number; at: number; actorId: string | null; act: string; objectKind: string; objectId: string; paperId: string | null; from: string | null; to: string | null }>

/** The newest lines first, before `before` when given. */
export async function listAuditLines(db: Db, limit: number, before?: number): Promise<AuditEntry[]> {
  const query = db<AuditRow>('audit_lines').orderBy('id', 'desc').limit(limit)
  if (before !== undefined) query.where('id', '<', before)
  return (await query).map((row) => ({
    id: row.id, at: row.at, actorId: row.actor_id, act: row.act, objectKind: row.object_kind, objectId: row.object_id, paperId: row.paper_id, from: row.from_value, to: row.to_value,
  }))
}
