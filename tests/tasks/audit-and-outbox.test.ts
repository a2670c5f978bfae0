import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { addAuditLine } from '@/db/audit'
import { db } from '@/db/knex'
import { addMail } from '@/db/outbox-mails'
import { keepReceived } from '@/scripts/keep-received'
import { auditPage, readAudit } from '@/lib/tasks/read-audit'
import { readOutbox } from '@/lib/tasks/read-outbox'
import { retryMail } from '@/lib/tasks/retry-mail'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('audit lines', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('are read newest first, a page at a time, each once, by admins alone', async () => {
    const admin = await anActor('admin')
    for (let n = 0; n < auditPage + 5; n++) await addAuditLine(db(), admin, { act: 'test', objectKind: 'thing', objectId: `${n}` })
    const first = await readAudit(admin)
    const second = await readAudit(admin, first.older!)
    expect([...first.lines, ...second.lines].map((line) => Number(line.objectId))).toEqual(Array.from({ length: auditPage + 5 }, (_, n) => auditPage + 4 - n))
    expect(second.older).toBeNull()
    for (const role of ['teacher', 'marker', 'moderator', 'student'] as const) await expect(readAudit(await anActor(role))).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('cannot be changed or removed', async () => {
    await addAuditLine(db(), null, { act: 'test', objectKind: 'thing', objectId: '1' })
    await expect(db()('audit_lines').update({ act: 'other' })).rejects.toThrow('never changed')
    await expect(db()('audit_lines').delete()).rejects.toThrow('never removed')
  })
})

describe('the outbox', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('shows staff of the demo school what was sent and what waits; never a student', async () => {
    await addMail(db(), { onceKey: 'a', kind: 'test', to: 'a@example.org', subject: 'Waiting', text: 'words', html: '<p>words</p>' })
    await keepReceived(Buffer.from('Message-ID: <1@x>\r\nTo: b@example.org\r\nSubject: Left\r\n\r\nHello\r\n'))
    const outbox = await readOutbox(await anActor('marker'))
    expect(outbox.waiting.map((mail) => [mail.subject, mail.state])).toEqual([['Waiting', 'waiting']])
    expect(JSON.stringify(outbox.waiting)).not.toContain('words')
    expect(outbox.received?.map((mail) => [mail.to, mail.subject, mail.text.trim()])).toEqual([['b@example.org', 'Left', 'Hello']])
    await expect(readOutbox(await anActor('student'))).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('lets an admin alone send a given-up mail again', async () => {
    await addMail(db(), { onceKey: 'a', kind: 'test', to: 'a@example.org', subject: 'x', text: 'x', html: 'x' })
    const { id } = await db()('outbox_mails').first<{ id: string }>()
    const admin = await anActor('admin')
    await expect(retryMail(admin, id)).rejects.toMatchObject({ code: 'not_found' })
    await db()('outbox_mails').update({ state: 'failed', attempts: 9 })
    await expect(retryMail(await anActor('teacher'), id)).rejects.toMatchObject({ code: 'not_allowed' })
    await retryMail(admin, id)
    expect(await db()('outbox_mails').first()).toMatchObject({ state: 'waiting', attempts: 0 })
  })
})
