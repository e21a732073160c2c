// Start of a thread where the sources run as TypeScript (development, tests): Node's workers know no TypeScript by themselves.
import { workerData } from 'node:worker_threads'
import { register } from 'tsx/esm/api'

register()
await import(workerData.entry)
