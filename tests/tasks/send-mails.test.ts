import { mkdtempSync, rmSync } from 'node:fs'
import { createServer, type AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { SMTPServer } from 'smtp-server'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { db } from '@/db/knex'
import { addMail, claimMail } from '@/db/outbox-mails'
import { listReceived } from '@/lib/infra/received-mails'
import { startFakeMailServer } from '@/scripts/start-fake-mail-server'
import { openMailer } from '@/lib/infra/mailer'
import { addPerson } from '@/lib/tasks/add-person'
import { setPasswordByLink } from '@/lib/tasks/set-password-by-link'
import { lease, sendMails } from '@/lib/tasks/send-mails'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

/** A port of loopback on which nothing listens. */
async function deadPort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1')
  await new Promise((resolve) => server.once('listening', resolve))
  const { port } = server.address() as AddressInfo
  await new Promise((resolve) => server.close(resolve))
  return port
}
const through = (port: number) => () => openMailer(`smtp://127.0.0.1:${port}`)
const later = (ms: number) => vi.useFakeTimers({ toFake: ['Date'], now: Date.now() + ms })

describe('sending mails', () => {
  let folder: string
  let server: Awaited<ReturnType<typeof startFakeMailServer>>
  beforeEach(async () => {
    await openSchool()
    folder = mkdtempSync(path.join(tmpdir(), 'sheafmark-mail-'))
    server = await startFakeMailServer(0, folder)
  })
  afterEach(async () => {
    vi.useRealTimers()
    await server.close()
    await closeSchool()
    rmSync(folder, { recursive: true, force: true })
  })

  const aMail = (n: number) => addMail(db(), { onceKey: `test ${n}`, kind: 'test', to: `reader${n}@example.org`, subject: `Nº ${n} – zwölf`, text: `Hello ${n}`, html: `<p>Hello ${n}</p>` })
  const states = () => db()('outbox_mails').orderBy('created_at').orderBy('rowid').pluck('state')

  it('sends each mail once, in words that arrive as written', async () => {
    await aMail(1)
    await aMail(2)
    await aMail(2)
    expect(await sendMails(through(server.port))).toEqual({ sent: 2, later: 0, failed: 0 })
    expect(await sendMails(through(server.port))).toEqual({ sent: 0, later: 0, failed: 0 })
    const received = await listReceived(10, folder)
    expect(received.map((mail) => [mail.to, mail.subject, mail.text.trim()]).toSorted()).toEqual([['reader1@example.org', 'Nº 1 – zwölf', 'Hello 1'], ['reader2@example.org', 'Nº 2 – zwölf', 'Hello 2']])
    expect(await states()).toEqual(['sent', 'sent'])
  })

  it('by two senders at once are still sent once each', async () => {
    for (let n = 0; n < 12; n++) await aMail(n)
    const [one, two] = await Promise.all([sendMails(through(server.port)), sendMails(through(server.port))])
    expect(one.sent + two.sent).toBe(12)
    expect(await db()('outbox_mails').sum({ n: 'attempts' }).first()).toEqual({ n: 12 })
  })

  it('waits when nobody answers, longer each time, and goes once somebody does', async () => {
    const dead = await deadPort()
    await aMail(1)
    expect(await sendMails(through(dead))).toEqual({ sent: 0, later: 1, failed: 0 })
    expect(await sendMails(through(dead))).toEqual({ sent: 0, later: 0, failed: 0 })
    const first = (await db()('outbox_mails').first<{ send_after: number }>())!.send_after
    later(61_000)
    expect(await sendMails(through(dead))).toMatchObject({ later: 1 })
    const row = (await db()('outbox_mails').first<{ send_after: number; error: string }>())!
    expect(row.send_after - Date.now()).toBeGreaterThan(first - Date.now() + 60_000)
    expect(row.error).toBe('ESOCKET')
    later(3_600_000)
    expect(await sendMails(through(server.port))).toMatchObject({ sent: 1 })
    expect(await listReceived(10, folder)).toHaveLength(1)
  })

  it('is taken over when its sender died, under the same Message-ID: the reader has one', async () => {
    await aMail(1)
    const claimed = await claimMail(db(), Date.now(), lease)
    // The sender reaches the server and dies before it can write that down.
    await openMailer(`smtp://127.0.0.1:${server.port}`).send({ to: claimed!.to, subject: claimed!.subject, text: claimed!.text, html: claimed!.html, messageId: `<${claimed!.id}@localhost>` })
    expect(await sendMails(through(server.port))).toMatchObject({ sent: 0 })
    later(lease)
    expect(await sendMails(through(server.port))).toMatchObject({ sent: 1 })
    expect((await listReceived(10, folder)).map((mail) => mail.messageId)).toEqual([`<${claimed!.id}@localhost>`])
  })

  it('gives up on an address that is refused, at once, and sends the others', async () => {
    const strict = new SMTPServer({
      authOptional: true,
      disabledCommands: ['AUTH', 'STARTTLS'],
      onRcptTo: ({ address }, _session, done) => done(address.startsWith('reader1@') ? Object.assign(new Error('no such mailbox'), { responseCode: 550 }) : null),
      onData: (stream, _session, done) => { stream.resume(); stream.on('end', () => done()) },
    })
    await new Promise<void>((resolve) => { strict.listen(0, '127.0.0.1', resolve) })
    await aMail(1)
    await aMail(2)
    expect(await sendMails(through((strict.server.address() as AddressInfo).port))).toEqual({ sent: 1, later: 0, failed: 1 })
    expect(await states()).toEqual(['failed', 'sent'])
    await new Promise<void>((resolve) => { strict.close(resolve) })
  })

  it('carries the token that the waiting mail did not hold', async () => {
    await addPerson(await anActor('admin'), { givenName: 'Ines', familyName: 'Okafor', email: 'ines@example.org', userName: null, roles: ['teacher'] })
    await sendMails(through(server.port))
    const [mail] = await listReceived(1, folder)
    expect(mail!.text).not.toContain('Okafor')
    const [, token] = /new-password\/(\S+)/.exec(mail!.text)!
    await setPasswordByLink({ token: token!, password: 'three quiet words' })
  })
})
