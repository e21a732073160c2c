import { once } from 'node:events'
import type { Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { dice } from '../../server/cli/dice.ts'
import type { Facts } from '../../server/cli/load-facts.ts'
import { fill, withoutIndexes } from '../../server/cli/load-fill.ts'
import { makePeople, type LoadGroup } from '../../server/cli/load-people.ts'
import { checkPlansOf } from '../../server/cli/load-plans.ts'
import { askOnce, gatherCrowd, letRead, measuredOf, type Crowd } from '../../server/cli/load-readers.ts'
import { linesOf, table, together, tooSlow } from '../../server/cli/load-report.ts'
import { checkPlans, prepareFacts } from '../../server/cli/load-run.ts'
import { EXPORTS, LEFT_OUT, VISITS } from '../../server/cli/load-visits.ts'
import { refreshBest } from '../../server/commands/constant-best.ts'
import { inTransaction, select } from '../../server/db.ts'
import { operationsOf } from '../../server/openapi/operations.ts'
import { checkAudit } from '../../server/queries/audit.ts'
import { RESOURCES } from '../../server/routes/api.ts'
import { databaseUrls } from '../support/test-database.ts'

/* `npm run load` in small: everything in this process, a few seconds, no measure of speed. */

let server: Server
let groups: LoadGroup[]
let facts: Facts
let crowd: Crowd

beforeAll(async () => {
  groups = await makePeople(3)
  await withoutIndexes(databaseUrls.owner, () => fill(dice(7), 300, groups))
  facts = await prepareFacts(groups)
  server = createApp().listen(0, '127.0.0.1')
  await once(server, 'listening')
  crowd = await gatherCrowd(`http://127.0.0.1:${(server.address() as AddressInfo).port}`, facts, groups, 12, 5)
}, 120_000)

afterAll(() => {
  server.close()
  server.closeAllConnections()
})

describe('the database of a load run', () => {
  it('holds three claims a constant, in all states, and an unbroken trail', async () => {
    const [counted] = await select<{ constants: number; claims: number }>('SELECT (SELECT count(*) FROM constants)::int AS constants, (SELECT count(*) FROM claims)::int AS claims')
    expect(counted).toEqual({ constants: 300, claims: 900 })
    const states = await select<{ state: string }>('SELECT DISTINCT state FROM claims')
    expect(states.map(({ state }) => state).sort()).toEqual(['draft', 'endorsed', 'in-review', 'returned', 'signed', 'submitted', 'superseded', 'suspended', 'withdrawn'])
    expect((await checkAudit()).broken).toBeNull()
  })

  it('shows every audience what the register itself would have written', async () => {
    const entries = () => select('SELECT constant_id, audience, group_id, state, entered_state, in_conflict, best_lo, best_hi, digits_truncated, digits_rounded FROM register_entries ORDER BY constant_id, audience')
    const before = await entries()
    for (const { id } of await select<{ id: string }>('SELECT id FROM constants')) await inTransaction((transaction) => refreshBest(transaction, id))
    expect(await entries()).toEqual(before)
  })

  it('has its indexes back', async () => {
    const indexes = await select<{ name: string }>(`SELECT indexname AS name FROM pg_indexes WHERE schemaname = 'public'`)
    expect(indexes.map(({ name }) => name)).toEqual(expect.arrayContaining(['register_entries_number', 'register_entries_within', 'claims_entered', 'audit_entries_words', 'estimate_uses_newest']))
  })
})

describe('the readers', () => {
  it('ask every route that reads, but for those that say why not', () => {
    const routes = operationsOf(RESOURCES).filter(({ method }) => method === 'get').map(({ path }) => `GET ${path}`)
    const asked = new Set([...[...VISITS, ...EXPORTS].map(({ route }) => route), ...Object.keys(LEFT_OUT)])
    expect(routes.filter((route) => !asked.has(route))).toEqual([])
    expect([...asked].filter((route) => route.startsWith('GET') && !routes.includes(route))).toEqual([])
  })

  it('are answered, each way of asking, and go on asking until the time is over', async () => {
    await askOnce(crowd, [...VISITS, ...EXPORTS], dice(7))
    await letRead(crowd, 2, 0, dice(8))
    expect(crowd.faults).toEqual([])
    const lines = linesOf(crowd.measured.values())
    expect(lines.filter(({ requests }) => requests === 0)).toEqual([])
    expect(table([...lines, together(measuredOf(crowd, VISITS))])).toMatch(/GET \/constants {2}k, by value +\d+ +\d+ +\d+ +\d+/)
  })

  it('are told apart by half of all and all but one of a hundred', () => {
    const visit = VISITS[0]!
    const quick = { visit, milliseconds: Array.from({ length: 200 }, (_, index) => (index < 2 ? 5_000 : 40)) }
    const slow = { visit, milliseconds: Array.from({ length: 200 }, (_, index) => (index < 3 ? 301 : 40)) }
    expect(tooSlow(linesOf([quick]))).toEqual([])
    expect(tooSlow(linesOf([slow])).map(({ p99 }) => p99)).toContain(301)
    expect(tooSlow(linesOf([{ visit, milliseconds: [101, 101, 99] }])).length).toBeGreaterThan(0)
  })
})

describe('the plans', () => {
  it('have an index for everything that is asked', async () => {
    const { statements, faults } = await checkPlans(facts, groups, { readers: 12, deep: 5, roll: dice(7), evenSmall: true })
    expect(statements).toBeGreaterThan(50)
    expect(faults).toEqual([])
  })

  it('would be found out if they had none', async () => {
    const { faults } = await checkPlansOf([['a list', [{ text: 'SELECT id FROM claims WHERE remark = $1', values: ['x'] }]]], { evenSmall: true })
    expect(faults).toEqual([expect.stringMatching(/^a list reads all of claims/)])
  })
})
