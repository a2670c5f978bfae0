'use server'
import { refresh } from 'next/cache'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { addPerson, PersonForm } from '@/lib/tasks/add-person'
import { changePerson } from '@/lib/tasks/change-person'
import { disablePerson } from '@/lib/tasks/disable-person'
import { enablePerson } from '@/lib/tasks/enable-person'
import { sendLink } from '@/lib/tasks/send-link'

const Id = z.uuid()

export async function add(raw: unknown): Promise<Outcome<{ code: string | null }>> {
  return outcome(async () => {
    const { code } = await addPerson(await requireActor(), PersonForm.parse(raw))
    refresh()
    return { code }
  })
}

export async function change(userId: unknown, raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await changePerson(await requireActor(), Id.parse(userId), PersonForm.parse(raw))
    refresh()
  })
}

export async function disable(userId: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await disablePerson(await requireActor(), Id.parse(userId))
    refresh()
  })
}

export async function enable(userId: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await enablePerson(await requireActor(), Id.parse(userId))
    refresh()
  })
}

export async function send(userId: unknown): Promise<Outcome<{ code: string | null }>> {
  return outcome(async () => sendLink(await requireActor(), Id.parse(userId)))
}
