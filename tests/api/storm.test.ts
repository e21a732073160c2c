import { once } from 'node:events'
import type { Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { setTimeout as pause } from 'node:timers/promises'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { findFaults } from '../../server/cli/storm-checks.ts'
import { emptyWorld, gather, live, type World } from '../../server/cli/storm-crowd.ts'
import { change, select } from '../../server/db.ts'

/* `npm run storm` in small: everything in this process, a few seconds, no worker. */

const seed = Number(process.env.RANDOM_SEED ?? Date.now() % 1_000_000)
/** Kinds of acts that have to occur. */
const ENOUGH = 10
const actsDone = async () => (await select(`SELECT DISTINCT act FROM audit_entries WHERE act LIKE 'claim.%'`)).length
let server: Server
let world: World

beforeAll(async () => {
  server = createApp().listen(0, '127.0.0.1')
  await once(server, 'listening')
  world = emptyWorld(`http://127.0.0.1:${(server.address() as AddressInfo).port}`, seed)
  await gather(world, 24)
  // As long as it takes to see a good part of a claim's life: how long that is depends on what else the machine does.
  const over = new AbortController()
  const crowd = Promise.all(world.people.map((person) => live(world, person, over.signal)))
  const end = performance.now() + 60_000
  do await pause(2_000)
  while ((await actsDone()) < ENOUGH && performance.now() < end)
  over.abort()
  await crowd
}, 120_000)

afterAll(() => server.close())

it('meets with no fault of the server and leaves nothing that must not be', async () => {
  expect(world.faults, `RANDOM_SEED=${seed}`).toEqual([])
  expect(await findFaults(), `RANDOM_SEED=${seed}`).toEqual([])
  expect(await actsDone(), `RANDOM_SEED=${seed}`).toBeGreaterThanOrEqual(ENOUGH)
})

it('would find what must not be', async () => {
  const [claim] = await select<{ id: string; state: string }>(`SELECT id, state FROM claims WHERE state IN ('submitted', 'in-review') LIMIT 1`)
  await change(`UPDATE claims SET state = 'returned' WHERE id = $id`, { id: claim!.id })
  await change(`DELETE FROM outbox WHERE id = (SELECT id FROM outbox WHERE template = 'claim-submitted' LIMIT 1)`)
  const faults = await findFaults()
  expect(faults).toContainEqual(`claim ${claim!.id} is returned, but its trail ends in ${claim!.state}`)
  expect(faults).toContainEqual(expect.stringMatching(/^1 mails missing: claim-submitted:/))
})
