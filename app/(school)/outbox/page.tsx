import type { Metadata } from 'next'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { MailLines } from '@/components/outbox/mail-lines'
import { ReceivedMails } from '@/components/outbox/received-mails'
import { TopBar } from '@/components/ui/top-bar'
import { maySchool } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'
import { readOutbox } from '@/lib/tasks/read-outbox'
import { retry } from './actions'

export const metadata: Metadata = { title: 'Outbox' }

export default async function OutboxPage() {
  const actor = await actorOrSignIn()
  const { waiting, sent, received } = await pageOf(readOutbox(actor))
  const mayRetry = maySchool(actor, 'outbox')
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'Outbox' }]}><PersonEnd /></TopBar>
      <main className="page">
        <h1>Outbox</h1>
        <p className="soft">{received ? 'There is no mail server set here, so mails stay on this machine. What each reader would have got:' : 'What the school’s mail server was given.'}</p>
        {waiting.length > 0 && <section className="mt-6"><h2 className="cap">Not sent yet</h2><MailLines lines={waiting} retry={mayRetry ? retry : undefined} /></section>}
        {received && <section className="mt-6"><h2 className="vh">Mails</h2><ReceivedMails mails={received} home={env.url} /></section>}
        {!received && <section className="mt-6"><h2 className="cap">Sent</h2>{sent.length > 0 ? <MailLines lines={sent} /> : <p className="soft mt-2">Nothing yet.</p>}</section>}
      </main>
    </>
  )
}
