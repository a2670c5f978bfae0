import type { Piscina } from 'piscina'

const lookEvery = 250

/**
 * Runs a task in a thread of the pool for at most `most` milliseconds, counted from when it begins and not while it waits for its turn.
 * Rejects when the task throws, takes longer, or ends its thread; the pool then has a new thread and other tasks are not touched.
 */
export async function runLimited<T>(pool: Piscina, job: unknown, most: number): Promise<T> {
  const begun = new Int32Array(new SharedArrayBuffer(4))
  const stop = new AbortController()
  let since: number | null = null
  const timer = setInterval(() => {
    if (since === null && Atomics.load(begun, 0) === 1) since = performance.now()
    if (since !== null && performance.now() - since > most) stop.abort()
  }, lookEvery)
  try {
    return (await pool.run({ job, begun }, { signal: stop.signal })) as T
  } finally {
    clearInterval(timer)
  }
}
