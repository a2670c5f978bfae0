import nodemailer, { type Transporter } from 'nodemailer'
import { env } from './env'

export type OutgoingMail = Readonly<{ to: string; subject: string; text: string; html: string; messageId: string }>
/** `refused`: the address or the mail will never be taken. `later`: nobody answered, or they said not now. */
export type Delivery = Readonly<{ sent: true } | { sent: false; why: 'refused' | 'later'; error: string }>
export type Mailer = Readonly<{ send: (mail: OutgoingMail) => Promise<Delivery>; close: () => void }>

/** Below the lease of a mail being sent, so that no second sender takes it while this one still waits. */
const patience = { connectionTimeout: 15_000, greetingTimeout: 15_000, socketTimeout: 45_000 }

/** The school's mail server, or without one the local fake on loopback. */
export function openMailer(url: string = env.SHEAFMARK_SMTP_URL ?? `smtp://127.0.0.1:${env.SHEAFMARK_FAKE_SMTP_PORT}`): Mailer {
  const transport = nodemailer.createTransport({ url, ...patience, disableFileAccess: true, disableUrlAccess: true })
  return { send: (mail) => send(transport, mail), close: () => transport.close() }
}

async function send(transport: Transporter, mail: OutgoingMail): Promise<Delivery> {
  try {
    await transport.sendMail({ from: env.SHEAFMARK_MAIL_FROM, ...mail, headers: { 'Auto-Submitted': 'auto-generated' } })
    return { sent: true }
  } catch (error) {
    const { responseCode, code } = error as { responseCode?: number; code?: string }
    const refused = code === 'EENVELOPE' && responseCode !== undefined ? responseCode >= 500 : responseCode !== undefined && responseCode >= 550
    // The server's own words may quote the address; only its number is kept.
    return { sent: false, why: refused ? 'refused' : 'later', error: responseCode ? `answered ${responseCode}` : (code ?? 'no answer') }
  }
}
