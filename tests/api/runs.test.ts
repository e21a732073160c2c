import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { startRecheck } from '../../server/commands/run.ts'
import { change, inTransaction, select, selectOne } from '../../server/db.ts'
import { onRunFinished } from '../../server/jobs/run-finished.ts'
import { Constant } from '../../server/models/constant.ts'
import type { RunEvent } from '../../shared/schemas/run.ts'
import { computeRuns } from '../support/compute.ts'
import { makeGroup, makeMember, PASSWORD, signedInAs, type Agent, type TestGroup, type TestMember } from '../support/people.ts'
import { makeClaim, series } from '../support/register.ts'
import { startRun, untilState } from '../jobs/run-helpers.ts'

const app = createApp()
const server = app.listen(0, '127.0.0.1')
const PRIMES = { definition: series({ kind: 'primes' }), goal: { digits: 12 } }

let group: TestGroup
let member: TestMember
let agent: Agent

beforeAll(async () => {
  group = await makeGroup()
  member = await makeMember({ group, roles: ['researcher'] })
  agent = await signedInAs(member, app)
})
afterAll(() => server.close())

describe('before anything computes', () => {
  it('a run is written with its constant, waits, and names what may be done with it', async () => {
    const { body, headers } = await agent.post('/api/v1/runs').send(PRIMES).expect(201)
    expect(headers.location).toBe(`/api/v1/runs/${body.id}`)
    expect(body).toMatchObject({
      state: 'queued', progress: 0, arithmetic: 'ball', goal: { digits: 12 }, purpose: 'run', claimNumber: null, outcome: null, shards: null, claims: [],
      startedBy: { id: member.id, name: member.name }, abilities: { stop: true, resume: false, registerClaim: false },
    })
    expect(body.definition.text).toContain('primes p')
    expect(body.forecastSeconds).toBeGreaterThan(0)
    const constant = await agent.get(`/api/v1/constants/${body.constant}`).expect(200)
    expect(constant.body.runs).toMatchObject([{ id: body.id, state: 'queued' }])
    await agent.get(`/api/v1/runs/${body.id}/certificate`).expect(409)
    await agent.post(`/api/v1/runs/${body.id}/stop`).expect(200)
  })

  it('a double click starts one run; asking again after a stop starts another', async () => {
    const request = { ...PRIMES, goal: { digits: 13 } }
    const answers = await Promise.all([1, 2, 3].map(() => agent.post('/api/v1/runs').send(request).expect(201)))
    const [first] = answers.map(({ body }) => body.id)
    expect(new Set(answers.map(({ body }) => body.id)).size).toBe(1)
    expect(await select('SELECT id FROM pgboss.job WHERE data->>$key = $id', { key: 'runId', id: first })).toHaveLength(1)
    await agent.post(`/api/v1/runs/${first}/stop`).expect(200)
    const again = (await agent.post('/api/v1/runs').send(request).expect(201)).body
    expect(again.id).not.toBe(first)
    await agent.post(`/api/v1/runs/${again.id}/stop`).expect(200)
  })

  it('stopping takes the job back, resuming sends a new one', async () => {
    const id = await startRun(agent, { ...PRIMES, goal: { digits: 14 } })
    const jobs = () => select<{ state: string }>('SELECT state::text FROM pgboss.job WHERE data->>$key = $id ORDER BY created_on', { key: 'runId', id })
    await agent.post(`/api/v1/runs/${id}/stop`).expect(200)
    expect(await jobs()).toEqual([{ state: 'cancelled' }])
    const resumed = (await agent.post(`/api/v1/runs/${id}/resume`).expect(200)).body
    expect(resumed).toMatchObject({ state: 'queued', failure: null, finishedAt: null })
    expect(await jobs()).toEqual([{ state: 'cancelled' }, { state: 'created' }])
    await agent.post(`/api/v1/runs/${id}/stop`).expect(200)
  })

  it('lists by state, constant and person, newest first, page by page', async () => {
    const colleague = await signedInAs(await makeMember({ group }), app)
    const theirs = await startRun(colleague, { definition: series({ kind: 'almost-primes', k: 2 }), goal: { digits: 10 } })
    const all = (await agent.get('/api/v1/runs?limit=100').expect(200)).body.items
    expect(all[0].id).toBe(theirs)
    expect((await agent.get('/api/v1/runs?mine=true&limit=100')).body.items.map(({ id }: { id: string }) => id)).not.toContain(theirs)
    expect((await agent.get('/api/v1/runs?state=queued')).body.items.map(({ id }: { id: string }) => id)).toEqual([theirs])
    expect((await agent.get(`/api/v1/runs?constant=${all[0].constant}`)).body.items).toHaveLength(1)
    const paged = []
    for (let cursor = ''; ; ) {
      const { body } = await agent.get(`/api/v1/runs?limit=2${cursor}`).expect(200)
      paged.push(...body.items)
      if (body.next === null) break
      cursor = `&cursor=${encodeURIComponent(body.next)}`
    }
    expect(paged).toEqual(all)
    await colleague.post(`/api/v1/runs/${theirs}/stop`).expect(200)
  })

  it('leaves a trace in the audit trail', async () => {
    const rows = await select<{ act: string }>(`SELECT act FROM audit_entries WHERE actor_id = $id AND act LIKE 'run.%' ORDER BY seq`, { id: member.id })
    expect(rows.slice(0, 2).map(({ act }) => act)).toEqual(['run.start', 'run.stop'])
  })
})

describe('while it computes', () => {
  beforeAll(computeRuns)

  it('those who follow it hear how it goes, and at last how it ended', async () => {
    const { port } = server.address() as AddressInfo
    const base = `http://127.0.0.1:${port}/api/v1`
    const session = await fetch(`${base}/session`, { method: 'POST', headers: { 'Content-Type': 'application/json', 'X-Merestone': '1' }, body: JSON.stringify({ email: member.email, password: PASSWORD }) })
    const cookie = session.headers.getSetCookie().map((one) => one.split(';')[0]).join('; ')
    const id = await startRun(agent, { definition: series({ kind: 'almost-primes', k: 3 }), goal: { digits: 40 }, method: 'transform' })

    const stream = await fetch(`${base}/runs/${id}/events`, { headers: { cookie } })
    expect(stream.headers.get('content-type')).toMatch(/^text\/event-stream/)
    // The stream ends by itself when the run has ended.
    const text = await stream.text()
    const events = [...text.matchAll(/^data:(.*)$/gm)].map(([, data]) => JSON.parse(data!) as RunEvent)
    expect(text).toMatch(/^event:progress$/m)
    expect(events.length).toBeGreaterThan(2)
    const progress = events.map((event) => event.progress)
    expect(progress).toEqual([...progress].sort((a, b) => a - b))
    const last = events.at(-1)!
    expect(last).toMatchObject({ state: 'done', progress: 1 })
    expect(last.enclosure!.lo).toMatch(/^1\.0308351/)
    expect(events.slice(0, -1).every(({ state }) => state === 'queued' || state === 'running')).toBe(true)
    // Who comes late is told the end at once.
    expect(await (await fetch(`${base}/runs/${id}/events`, { headers: { cookie } })).text()).toContain('"state":"done"')
  })

  it('a recheck belongs to its claim and its referee, and whoever wants to know is told of its end', async () => {
    const referee = await makeMember({ roles: ['referee'] })
    const id = await startRun(agent, { definition: series({ kind: 'primes', exclude: [2] }), goal: { digits: 10 }, method: 'transform' })
    const run = await untilState(agent, id, 'done')
    const constant = (await Constant.findOne({ where: { number: Number(run.constant.slice(4)) } }))!
    const claim = await makeClaim(member, constant, { ...run.outcome!.enclosure, state: 'in-review', runId: id })

    const told: { id: string; state: string; purpose: string; claimId: string | null }[] = []
    onRunFinished.push(async (transaction, finished) => {
      // What is written here is part of the end of the run.
      await change('UPDATE claims SET repeated_here = true WHERE id = $id', { id: finished.claimId }, transaction)
      told.push({ id: finished.id, state: finished.state, purpose: finished.purpose, claimId: finished.claimId })
    })
    const recheck = await inTransaction((transaction) =>
      startRecheck(transaction, { id: claim.id, constantId: constant.id, groupId: member.groupId }, referee, { method: 'transform', arithmetic: 'mpfr', goal: { digits: 10 } }),
    )
    const asReferee = await signedInAs(referee, app)
    const done = await untilState(asReferee, recheck.id, 'done')
    onRunFinished.pop()
    expect(told).toEqual([{ id: recheck.id, state: 'done', purpose: 'recheck', claimId: claim.id }])
    expect(done).toMatchObject({ purpose: 'recheck', arithmetic: 'mpfr', claimNumber: `${run.constant}/1`, abilities: { registerClaim: false } })
    // Both enclose the same number with different arithmetic: they must meet.
    const meets = await selectOne<{ meets: boolean }>('SELECT numrange($a::numeric, $b::numeric, $ends) && numrange($c::numeric, $d::numeric, $ends) AS meets', {
      a: run.outcome!.enclosure.lo, b: run.outcome!.enclosure.hi, c: done.outcome!.enclosure.lo, d: done.outcome!.enclosure.hi, ends: '[]',
    })
    expect(meets).toEqual({ meets: true })
    // The claim's own group sees it too.
    await agent.get(`/api/v1/runs/${recheck.id}`).expect(200)
    expect((await agent.get(`/api/v1/runs/${id}`)).body.claims).toMatchObject([{ id: claim.id, number: `${run.constant}/1` }])
  }, 60_000)
})

describe('a plan', () => {
  it('tells for each method and arithmetic what it would give, and recommends the quickest', async () => {
    const { body } = await agent.post('/api/v1/plans').send({ definition: series({ kind: 'almost-primes', k: 1 }), goal: { digits: 30 } }).expect(200)
    expect(body.definition.text).toBe('sum over primes p of 1/(p log p)')
    expect(body.constant).toMatch(/^MST-/)
    const ways = body.forecasts as { method: string; arithmetic: string; possible: boolean; reason: string | null; seconds: number | null; recommended: boolean }[]
    expect(ways.filter(({ recommended }) => recommended)).toHaveLength(1)
    const best = ways.find(({ recommended }) => recommended)!
    expect(best.possible).toBe(true)
    expect(Math.min(...ways.flatMap(({ possible, seconds, method }) => (possible && method !== 'partial-sum' ? [seconds!] : [])))).toBe(best.seconds)
    for (const way of ways) expect(way.possible ? way.seconds! > 0 : way.reason!.length > 10).toBe(true)
    expect(ways.find(({ method }) => method === 'finite')?.possible ?? false).toBe(false)
  })

  it('stores nothing', async () => {
    const { body } = await agent.post('/api/v1/plans').send({ definition: series({ kind: 'almost-primes', k: 47 }), goal: { digits: 20 } }).expect(200)
    expect(body.constant).toBeNull()
    expect((await agent.get('/api/v1/constants?k=47')).body.items).toEqual([])
  })
})
