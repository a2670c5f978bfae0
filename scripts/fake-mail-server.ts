import { startFakeMailServer } from './start-fake-mail-server'

// Takes mails on loopback and keeps them for the outbox page; delivers nothing anywhere.
const server = await startFakeMailServer()
console.log(`Mails are kept on this machine (127.0.0.1:${server.port}); the outbox page shows them.`)
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void server.close().then(() => process.exit(0)))
