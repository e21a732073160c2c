import { loadavg, cpus } from 'node:os'
import { parseArgs } from 'node:util'
import { end, makeThrowawayInstallation } from './throwaway-installation.ts'

/*
 * `npm run load -- --constants 100000 --readers 20 --seconds 60`: fills a database that is thrown away with constants and three times as
 * many claims, looks at the plan of every statement that lists, filters and look-ups send, and then lets readers at a web process of
 * its own, as in production. Each reader waits for an answer and asks for the next thing at once (or after --think milliseconds on
 * average). What is told is what a reader waits, from sending the request to the last byte of the answer, over loopback: never less
 * than the time at the server, and with the readers' own work on the same cores. Exit code 1 where something is too slow, a big table
 * is read in full, or an answer is no answer.
 */
const { values } = parseArgs({
  options: {
    constants: { type: 'string', default: '100000' }, readers: { type: 'string', default: '20' }, seconds: { type: 'string', default: '60' }, think: { type: 'string', default: '0' }, seed: { type: 'string', default: '7' },
  },
})
const [constants, readers, seconds, think, seed] = [values.constants, values.readers, values.seconds, values.think, values.seed].map(Number)
if (!constants || !readers || !seconds || think === undefined || seed === undefined || [constants, readers, seconds, think, seed].some((number) => !Number.isSafeInteger(number) || number < 0)) {
  process.stderr.write('Usage: load --constants 100000 --readers 20 --seconds 60 --think 0 --seed 7 (whole numbers)\n')
  process.exit(2)
}

const GROUPS = 6
/** How often each export is asked for. */
const ROUNDS = 3
/** Rows before a list's deep page. */
const DEEP = 2_000
const installation = await makeThrowawayInstallation()
const begun = performance.now()
const say = (text: string): void => console.log(`${((performance.now() - begun) / 1000).toFixed(0).padStart(4)} s  ${text}`)
try {
  const { dice } = await import('./dice.ts')
  const { makePeople } = await import('./load-people.ts')
  const { fill, withoutIndexes } = await import('./load-fill.ts')
  const { checkPlans, prepareFacts } = await import('./load-run.ts')
  const { askOnce, gatherCrowd, letRead, measuredOf, resetMeasured } = await import('./load-readers.ts')
  const { EXPORTS, VISITS } = await import('./load-visits.ts')
  const { linesOf, table, together, tooSlow } = await import('./load-report.ts')

  const groups = await makePeople(GROUPS)
  const filled = await withoutIndexes(installation.urls.owner, () => fill(dice(seed), constants, groups, (done) => done % 20_000 === 0 && say(`${done} constants written`)))
  say(`${filled.constants} constants and ${filled.claims} claims of ${GROUPS} groups, seed ${seed}, with indexes and statistics`)

  const facts = await prepareFacts(groups)
  const plans = await checkPlans(facts, groups, { readers, deep: 100, roll: dice(seed) })
  say(`${plans.statements} statements planned, ${plans.faults.length} faults`)

  const web = await installation.start('web')
  const crowd = await gatherCrowd(web.address, facts, groups, readers, DEEP)
  await askOnce(crowd, VISITS, dice(seed))
  resetMeasured(crowd)
  say(`${readers} readers at once, ${think === 0 ? 'each asking again as soon as it is answered' : `each thinking ${think} ms on average`}; load of the machine before: ${loadavg()[0]!.toFixed(1)} on ${cpus().length} cores`)
  const elapsed = await letRead(crowd, seconds, think, dice(seed + 1))
  for (let round = 0; round < ROUNDS; round += 1) await askOnce(crowd, EXPORTS, dice(seed))
  await end(web.child, 'SIGTERM')

  const measured = measuredOf(crowd, VISITS)
  const lines = [...linesOf(measured), together(measured)]
  const { requests } = lines.at(-1)!
  console.log(`\n${table(lines)}\n\n${requests} requests in ${elapsed.toFixed(0)} s (${(requests / elapsed).toFixed(0)} a second)`)
  console.log(`\nExports, one at a time after the readers:\n${table(linesOf(measuredOf(crowd, EXPORTS)))}\n`)
  const faults = [...plans.faults, ...crowd.faults, ...tooSlow(lines).map(({ name }) => `too slow: ${name}`)]
  for (const fault of faults.slice(0, 50)) console.log(`FAULT ${fault}`)
  console.log(faults.length === 0 ? 'Everything in time, by indexes.' : `${faults.length} faults.`)
  process.exitCode = faults.length === 0 ? 0 : 1
} finally {
  await installation.close()
}
process.exit()
