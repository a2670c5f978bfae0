// First code of a thread: lets it load TypeScript, then hands over to the module named in its workerData.
import { workerData } from 'node:worker_threads'
import { register } from 'tsx/esm/api'

register()
const { module: task } = workerData
const loaded = await import(task)

/** Says that the task has begun (run-limited.ts counts its time from here) and does it. */
export default function run({ job, begun }) {
  Atomics.store(begun, 0, 1)
  return loaded.default(job)
}
