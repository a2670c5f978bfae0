import { createHash } from 'node:crypto'
import { mkdir, rename, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { simpleParser } from 'mailparser'
import { receivedFolder } from '@/lib/infra/received-mails'

/** Keeps a message the fake mail server took, as it came. The same Message-ID twice is one message, as in a reader's mailbox. */
export async function keepReceived(raw: Buffer, folder = receivedFolder()): Promise<void> {
  const { messageId } = await simpleParser(raw)
  const key = createHash('sha256').update(messageId ?? raw).digest('hex').slice(0, 32)
  await mkdir(folder, { recursive: true })
  await writeFile(path.join(folder, `.${key}`), raw)
  await rename(path.join(folder, `.${key}`), path.join(folder, `${key}.eml`))
}
