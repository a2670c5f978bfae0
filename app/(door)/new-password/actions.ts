'use server'
import { callerAddress } from '@/app/_door/caller-address'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { AskForm, askNewPassword } from '@/lib/tasks/ask-new-password'
import { LinkPassword, setPasswordByLink } from '@/lib/tasks/set-password-by-link'

export async function askForLink(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => askNewPassword(AskForm.parse(raw), await callerAddress()))
}

export async function choosePassword(raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => setPasswordByLink(LinkPassword.parse(raw)))
}
