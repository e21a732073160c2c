import { setTimeout as pause } from 'node:timers/promises'
import { parseArgs } from 'node:util'
import { end, makeThrowawayInstallation } from './throwaway-installation.ts'

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

const installation = await makeThrowawayInstallation({ RUN_LEASE_SECONDS: '2' })
const { start } = installation
try {
  const { emptyWorld, gather, live } = await import('./storm-crowd.ts')
  const { findFaults } = await import('./storm-checks.ts')
  const { report } = await import('./storm-report.ts')

  let web = await start('web')
  let worker = await start('worker')
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
    console.log(`Web process and worker killed, and back after ${((performance.now() - down) / 1000).toFixed(1)} s.`)
  }
  await pause(seconds * 500)
  over.abort()
  await crowd
  const elapsed = (performance.now() - begun) / 1000
  await Promise.all([web, worker].map(({ child }) => end(child, 'SIGTERM')))
  const faults = [...world.faults, ...(await findFaults())]
  console.log(await report(world, elapsed))
  for (const fault of faults.slice(0, 50)) console.log(`FAULT ${fault}`)
  console.log(faults.length === 0 ? 'Nothing that must not be.' : `${faults.length} faults.`)
  process.exitCode = faults.length === 0 ? 0 : 1
} finally {
  await installation.close()
}
process.exit()
