'use server'
import { z } from 'zod'
import { requireActor } from '@/app/_door/require-actor'
import { outcome } from '@/lib/infra/outcome'
import { SignatureForm, signOffCheck, SignOffForm, takeBackSignature } from '@/lib/tasks/sign-off-check'
import { callOffRelease } from '@/lib/tasks/call-off-release'
import { ReleaseForm, startRelease } from '@/lib/tasks/start-release'
import { withdrawRelease } from '@/lib/tasks/withdraw-release'
import { withdrawScript } from '@/lib/tasks/withdraw-script'
import type { Outcome } from '@/lib/core/outcome'

const Id = z.string().min(1).max(80)

export async function handBack(classSetId: unknown, how: unknown = {}): Promise<Outcome<string>> {
  return outcome(async () => startRelease(await requireActor(), Id.parse(classSetId), ReleaseForm.parse(how)))
}

export async function withdrawOne(scriptId: unknown): Promise<Outcome<void>> {
  return outcome(async () => withdrawScript(await requireActor(), Id.parse(scriptId)))
}

export async function callOff(classSetId: unknown): Promise<Outcome<void>> {
  return outcome(async () => callOffRelease(await requireActor(), Id.parse(classSetId)))
}

export async function withdraw(classSetId: unknown): Promise<Outcome<void>> {
  return outcome(async () => withdrawRelease(await requireActor(), Id.parse(classSetId)))
}

export async function signOff(form: unknown): Promise<Outcome<void>> {
  return outcome(async () => signOffCheck(await requireActor(), SignOffForm.parse(form)))
}

export async function takeBackSign(form: unknown): Promise<Outcome<void>> {
  return outcome(async () => takeBackSignature(await requireActor(), SignatureForm.parse(form)))
}
