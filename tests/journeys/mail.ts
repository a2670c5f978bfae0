import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { expect } from '@playwright/test'
import { simpleParser, type ParsedMail } from 'mailparser'

const folder = path.join(import.meta.dirname, '..', 'results', 'real', 'fake-mail')

async function received(): Promise<ParsedMail[]> {
  const names = (() => { try { return readdirSync(folder) } catch { return [] } })().filter((name) => name.endsWith('.eml')).sort()
  return Promise.all(names.map((name) => simpleParser(readFileSync(path.join(folder, name)))))
}

/** Waits for a mail to an address whose text fits, as the mail server took it. */
export async function mailTo(address: string, fits: RegExp): Promise<{ text: string; link: string }> {
  let found: ParsedMail | undefined
  await expect.poll(async () => {
    found = (await received()).findLast((mail) => [mail.to].flat().some((to) => to?.text.includes(address)) && fits.test(mail.text ?? ''))
    return found !== undefined
  }, { message: `a mail to ${address}`, timeout: 20_000 }).toBe(true)
  const text = found!.text ?? ''
  return { text, link: /https?:\/\/\S+/.exec(text)?.[0] ?? '' }
}
