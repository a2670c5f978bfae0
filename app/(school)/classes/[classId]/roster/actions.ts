'use server'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import type { Outcome } from '@/lib/core/outcome'
import { outcome } from '@/lib/infra/outcome'
import { checkRoster, type RosterCheck } from '@/lib/tasks/check-roster'
import { importRoster, type RosterCounts } from '@/lib/tasks/import-roster'

/** A class list is short: a file above this is another kind of file. */
const ListFile = z.file().max(900_000, 'is too large for a class list')

async function bytesOf(form: unknown): Promise<Uint8Array> {
  const file = ListFile.parse(form instanceof FormData ? form.get('file') : null)
  return new Uint8Array(await file.arrayBuffer())
}

export async function check(classId: unknown, form: unknown): Promise<Outcome<RosterCheck>> {
  return outcome(async () => checkRoster(await requireActor(), z.uuid().parse(classId), await bytesOf(form)))
}

export async function bringIn(classId: unknown, form: unknown): Promise<Outcome<RosterCounts>> {
  return outcome(async () => importRoster(await requireActor(), z.uuid().parse(classId), await bytesOf(form)))
}
