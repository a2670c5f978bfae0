import { threadId } from 'node:worker_threads'

/** A task that ends its thread in one way or another, or says which thread it is. */
export default async function rough(what: 'exit' | 'fill' | 'hang' | 'throw' | 'say'): Promise<number> {
  if (what === 'exit') process.exit(3)
  if (what === 'throw') throw new Error('thrown')
  if (what === 'hang') for (;;) Math.random()
  const kept: object[] = []
  while (what === 'fill') kept.push({ more: [kept.length, String(kept.length)] })
  return threadId
}
