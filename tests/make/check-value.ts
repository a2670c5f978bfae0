import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

type Case = Readonly<{ id: string; source: string; tolerance: number; data: unknown; expected: unknown }>

/** One case of the published check values, by its id. The test says what shape it expects. */
export function checkValue<D, E>(id: string): { source: string; tolerance: number; data: D; expected: E } {
  const file = fileURLToPath(new URL('../fixtures/check-values.json', import.meta.url))
  const found = (JSON.parse(readFileSync(file, 'utf8')) as { cases: Case[] }).cases.find((one) => one.id === id)
  if (!found) throw new Error(`no check value ${id}`)
  return found as { source: string; tolerance: number; data: D; expected: E }
}
