import type { AddressInfo } from 'node:net'
import { SMTPServer } from 'smtp-server'
import { env } from '@/lib/infra/env'
import { log } from '@/lib/infra/log'
import { keepReceived } from './keep-received'

/**
 * A real SMTP server on loopback that delivers nowhere: it keeps what it is given under the data folder, for the outbox
 * page. For the demo school, development and tests.
 */
export async function startFakeMailServer(port: number = env.SHEAFMARK_FAKE_SMTP_PORT, folder?: string): Promise<{ port: number; close: () => Promise<void> }> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: 5_000_000,
    onData(stream, _session, done) {
      const parts: Buffer[] = []
      stream.on('data', (part: Buffer) => parts.push(part))
      stream.on('end', () => keepReceived(Buffer.concat(parts), folder).then(() => done(), done))
    },
  })
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, '127.0.0.1', () => resolve())
  })
  server.removeAllListeners('error')
  server.on('error', (error) => log.warn({ code: (error as NodeJS.ErrnoException).code }, 'fake mail server'))
  const at = server.server.address() as AddressInfo
  return { port: at.port, close: () => new Promise((resolve) => server.close(() => resolve())) }
}
