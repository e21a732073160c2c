import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { afterAll } from 'vitest'
import { projectRoot } from '../../server/project-root.ts'

/*
 * Workers as the product runs them: processes of their own that share nothing with the test but the database. The settings of
 * test-database.ts are in the environment; leases are short, so that a test need not wait.
 */

const alive = new Set<ChildProcess>()

afterAll(async () => {
  await Promise.all([...alive].map((worker) => endWorker(worker, 'SIGKILL')))
})

/** Starts a worker and waits until it takes jobs. */
export async function startWorkerProcess(settings: Record<string, string> = {}): Promise<ChildProcess> {
  const worker = spawn(process.execPath, ['--import', 'tsx', 'server/index.ts', 'worker'], {
    cwd: projectRoot,
    env: { ...process.env, SMTP_URL: '', RUN_LEASE_SECONDS: '2', COMPUTE_THREADS: '2', ...settings },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  })
  alive.add(worker)
  worker.once('exit', () => alive.delete(worker))
  const [message] = (await Promise.race([once(worker, 'message'), once(worker, 'exit')])) as [unknown]
  if (message === null || typeof message !== 'object') throw new Error(`the worker ended with code ${String(message)}`)
  return worker
}

/** Ends a worker by a signal and waits until it is gone. */
export async function endWorker(worker: ChildProcess, signal: 'SIGTERM' | 'SIGKILL'): Promise<void> {
  if (worker.exitCode !== null || worker.signalCode !== null) return
  const gone = once(worker, 'exit')
  worker.kill(signal)
  await gone
}
