// First code of a thread: lets it load TypeScript, then hands over to the module named in its workerData.
import { workerData } from 'node:worker_threads'
import { register } from 'tsx/esm/api'

register()
const { module: task } = workerData
const loaded = await import(task)
export default loaded.default
