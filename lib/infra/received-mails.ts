import { readdir, readFile, stat } from 'node:fs/promises'
import path from 'node:path'
import { simpleParser, type ParsedMail } from 'mailparser'
import { env } from './env'

export type ReceivedMail = Readonly<{ key: string; at: number; to: string; subject: string; text: string; messageId: string }>

/** Where the fake mail server of a school without one of its own keeps what it takes. */
export const receivedFolder = () => path.join(env.dataFolder, 'fake-mail')

/** The newest messages the local fake mail server took, newest first. */
export async function listReceived(limit: number, folder = receivedFolder()): Promise<ReceivedMail[]> {
  const names = (await readdir(folder).catch(() => [])).filter((name) => name.endsWith('.eml'))
  const dated = await Promise.all(names.map(async (name) => ({ name, at: (await stat(path.join(folder, name))).mtimeMs })))
  const newest = dated.toSorted((a, b) => b.at - a.at).slice(0, limit)
  return Promise.all(newest.map(async ({ name, at }) => toReceived(name, at, await simpleParser(await readFile(path.join(folder, name))))))
}

function toReceived(name: string, at: number, mail: ParsedMail): ReceivedMail {
  const to = [mail.to ?? []].flat().map((address) => address.text).join(', ')
  return { key: name.replace('.eml', ''), at: Math.round(at), to, subject: mail.subject ?? '', text: mail.text ?? '', messageId: mail.messageId ?? '' }
}
