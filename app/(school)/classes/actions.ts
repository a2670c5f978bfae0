'use server'
import { refresh } from 'next/cache'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { addClass, ClassName } from '@/lib/tasks/add-class'
import { AccountsForm, giveAccounts, type AccountsGiven } from '@/lib/tasks/give-accounts'
import { renameClass } from '@/lib/tasks/rename-class'
import { setClassTeachers } from '@/lib/tasks/set-class-teachers'
import { takeOutOfClass } from '@/lib/tasks/take-out-of-class'

const Id = z.uuid()
const Named = z.object({ name: ClassName })

export async function add(raw: unknown): Promise<Outcome<{ classId: string }>> {
  return outcome(async () => addClass(await requireActor(), Named.parse(raw).name))
}

export async function rename(classId: unknown, raw: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await renameClass(await requireActor(), Id.parse(classId), Named.parse(raw).name)
    refresh()
  })
}

export async function setTeachers(classId: unknown, userIds: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await setClassTeachers(await requireActor(), Id.parse(classId), z.array(Id).max(100).parse(userIds))
    refresh()
  })
}

export async function giveAccountsTo(classId: unknown, raw: unknown): Promise<Outcome<AccountsGiven>> {
  return outcome(async () => {
    const given = await giveAccounts(await requireActor(), Id.parse(classId), AccountsForm.parse(raw))
    refresh()
    return given
  })
}

export async function takeOut(classId: unknown, studentId: unknown): Promise<Outcome<void>> {
  return outcome(async () => {
    await takeOutOfClass(await requireActor(), Id.parse(classId), Id.parse(studentId))
    refresh()
  })
}
