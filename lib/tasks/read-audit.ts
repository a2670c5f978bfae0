import { listAuditLines, type AuditEntry } from '@/db/audit'
import { db } from '@/db/knex'
import { assertMaySchool, type Actor } from '@/lib/core/actor'

export const auditPage = 100

/** The audit lines, newest first, a page at a time; `before` is the last line's number of the page before. */
export async function readAudit(actor: Actor, before?: number): Promise<{ lines: readonly AuditEntry[]; older: number | null }> {
  assertMaySchool(actor, 'audit')
  const lines = await listAuditLines(db(), auditPage + 1, before)
  const shown = lines.slice(0, auditPage)
  return { lines: shown, older: lines.length > auditPage ? (shown.at(-1)?.id ?? null) : null }
}
