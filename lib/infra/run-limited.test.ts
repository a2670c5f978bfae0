import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Piscina } from 'piscina'
import { runLimited } from './run-limited'
import { threadPool } from './thread-pool'

let pool: Piscina
beforeAll(() => {
  pool = threadPool('tests/make/rough-thread.ts', 1, { heapMb: 64 })
})
afterAll(() => pool.destroy())

it('a task that ends its thread, fills its memory or does not end is given up; those that wait behind it are done by the next thread', async () => {
  const first = await runLimited<number>(pool, 'say', 60_000)
  for (const fate of ['exit', 'fill', 'hang', 'throw']) {
    const rough = runLimited(pool, fate, fate === 'hang' ? 1000 : 60_000)
    // waits longer than its own time while the thread is held up
    const behind = runLimited<number>(pool, 'say', 900)
    await expect(rough, fate).rejects.toThrow()
    expect(await behind, fate).toBeGreaterThanOrEqual(first)
  }
})
