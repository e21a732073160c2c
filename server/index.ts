import { log } from './log.ts'
import { startWeb } from './web.ts'
import { startWorker } from './worker.ts'

/*
 * `node index.js web` or `node index.js worker`. Ends cleanly on SIGTERM and SIGINT, and when the process that started it over an
 * IPC channel is gone, so that nothing is left behind.
 */
const roles = { web: startWeb, worker: startWorker }

const start = roles[process.argv[2] as keyof typeof roles]
if (start === undefined) {
  process.stderr.write('Say which process to start: web or worker.\n')
  process.exit(64)
}

const shutdown = new AbortController()
for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP'] as const) process.on(signal, () => shutdown.abort())
if (process.send) process.on('disconnect', () => shutdown.abort())

// Something that was not awaited failed. What it leaves behind is not known, so the process ends and the supervisor starts a new one.
process.on('unhandledRejection', (error) => {
  log.fatal({ err: error }, 'unhandled rejection')
  process.exit(70)
})

await start(shutdown.signal, (address) => process.send?.({ ready: true, address }))
process.exit(0)
