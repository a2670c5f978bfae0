import { maySchool, type Actor } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'

/** Admins; in the demo school and in development all staff, since their mails never leave this machine. */
export function maySeeOutbox(actor: Actor): boolean {
  return maySchool(actor, 'outbox') || ((env.demo || !env.production) && env.SHEAFMARK_SMTP_URL === undefined && maySchool(actor, 'staff'))
}
