import { fork, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { pathToFileURL } from 'node:url'
import { parseArgs } from 'node:util'
import { projectRoot } from '../project-root.ts'

/*
 * `npm run storm -- --people 200 --seconds 60 --kill`: a crowd does random acts, allowed and not, against a web process and a worker of
 * its own on a database that is thrown away; then everything that it has left behind is checked. With --kill both processes are
 * ended by SIGKILL in the middle and started again. Exit code 1 where something is found that must not be.
 */
const { values } = parseArgs({
  options: { people: { type: 'string', default: '200' }, seconds: { type: 'string', default: '60' }, kill: { type: 'boolean', default: false }, seed: { type: 'string', default: String(Date.now() % 1_000_000) } },
})
const [people, seconds, seed] = [values.people, values.seconds, values.seed].map(Number)
if (!people || !seconds || seed === undefined || [people, seconds, seed].some((number) => !Number.isSafeInteger(number) || number < 0)) {
  process.stderr.write('Usage: storm --people 200 --seconds 60 --kill --seed 7 (whole numbers)\n')
  process.exit(2)
}

type Clusters = typeof import('../scripts/throwaway-cluster.mjs')
// Plain JavaScript that is not part of the build.
const { startThrowawayCluster } = (await import(pathToFileURL(join(projectRoot, 'server', 'scripts', 'throwaway-cluster.mjs')).href)) as Clusters
const data = mkdtempSync(join(tmpdir(), 'merestone-storm-'))
const cluster = await startThrowawayCluster()
const urls = cluster.urls()
Object.assign(process.env, {
  DATABASE_URL: urls.application, DATABASE_OWNER_URL: urls.owner, DATA_DIR: data, HOST: '127.0.0.1', PORT: '0', RATE_LIMIT: '100000000', LOG_LEVEL: 'error', SMTP_URL: '', RUN_LEASE_SECONDS: '2', NODE_ENV: 'production',
})

const compiled = import.meta.url.endsWith('.js')
const entry = new URL(compiled ? '../index.js' : '../index.ts', import.meta.url)

/** Starts the web process or the worker, and answers it with the address that it listens on. */
async function start(part: 'web' | 'worker'): Promise<{ child: ChildProcess; address: string }> {
  const child = fork(entry, [part], { execArgv: compiled ? [] : ['--import', 'tsx'], stdio: ['ignore', 'inherit', 'inherit', 'ipc'] })
  const [message] = (await Promise.race([once(child, 'message'), once(child, 'exit')])) as [{ address?: string } | number]
  if (typeof message !== 'object') throw new Error(`the ${part} process ended with code ${message}`)
  return { child, address: message.address ?? '' }
}

async function end(child: ChildProcess, signal: NodeJS.Signals): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return
  const gone = once(child, 'exit')
  child.kill(signal)
  await gone
}

const running: ChildProcess[] = []
try {
  const { migrate } = await import('../migrate.ts')
  await migrate(urls.owner, new URL(urls.application).username)
  const { emptyWorld, gather, live } = await import('./storm-crowd.ts')
  const { findFaults } = await import('./storm-checks.ts')
  const { report } = await import('./storm-report.ts')

  let web = await start('web')
  let worker = await start('worker')
  running.push(web.child, worker.child)
  // Started again, it listens where it did.
  process.env.PORT = new URL(web.address).port
  const world = emptyWorld(web.address, seed)
  console.log(`${people} people for ${seconds} s against ${web.address}, seed ${seed}`)
  await gather(world, people)

  const over = new AbortController()
  const begun = performance.now()
  const crowd = Promise.all(world.people.map((person) => live(world, person, over.signal)))
  await pause(seconds * 500)
  if (values.kill) {
    await Promise.all([end(web.child, 'SIGKILL'), end(worker.child, 'SIGKILL')])
    const down = performance.now()
    ;[web, worker] = await Promise.all([start('web'), start('worker')])
    running.push(web.child, worker.child)
    console.log(`Web process and worker killed, and back after ${((performance.now() - down) / 1000).toFixed(1)} s.`)
  }
  await pause(seconds * 500)
  over.abort()
  await crowd
  const elapsed = (performance.now() - begun) / 1000
  await Promise.all(running.map((child) => end(child, 'SIGTERM')))
  const faults = [...world.faults, ...(await findFaults())]
  console.log(await report(world, elapsed))
  for (const fault of faults.slice(0, 50)) console.log(`FAULT ${fault}`)
  console.log(faults.length === 0 ? 'Nothing that must not be.' : `${faults.length} faults.`)
  process.exitCode = faults.length === 0 ? 0 : 1
} finally {
  await Promise.all(running.map((child) => end(child, 'SIGKILL')))
  const { sequelize } = await import('../db.ts')
  await sequelize.close()
  await cluster.stop()
  rmSync(data, { recursive: true, force: true })
}
process.exit()
