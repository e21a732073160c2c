import request from 'supertest'
import { afterEach, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../../server/app.ts'
import { change, select } from '../../../server/db.ts'
import { env } from '../../../server/env.ts'
import { browser, makeGroup, makeMember, signedInAs, type Agent, type TestGroup } from '../../support/people.ts'
import { series } from '../../support/register.ts'

const app = createApp()
const PRIMES = { definition: series({ kind: 'primes' }), goal: { digits: 12 } }
const limits = { RUNS_PER_MEMBER: 50, RUNS_PER_GROUP: 50, RUN_CPU_LIMIT_SECONDS: env.RUN_CPU_LIMIT_SECONDS }

let group: TestGroup
let agent: Agent

beforeAll(async () => {
  Object.assign(env, limits)
  group = await makeGroup()
  agent = await signedInAs(await makeMember({ group }), app)
})
afterEach(() => {
  Object.assign(env, limits)
})

/** Each its own request, since the same one within seconds is the same run. */
let asked = 40
const run = async (): Promise<string> => (await agent.post('/api/v1/runs').send({ ...PRIMES, goal: { digits: (asked += 1) } }).expect(201)).body.id
const paths = (body: { fields?: { path: string }[] }): string[] => (body.fields ?? []).map(({ path }) => path)

describe('without the right to it', () => {
  it('nobody starts, lists, reads, follows, stops or resumes a run without an account', async () => {
    const id = await run()
    const reader = browser(app)
    await reader.post('/api/v1/runs').send(PRIMES).expect(401)
    await reader.post('/api/v1/plans').send(PRIMES).expect(401)
    for (const path of ['', `/${id}`, `/${id}/events`, `/${id}/certificate`]) await request(app).get(`/api/v1/runs${path}`).expect(401)
    for (const act of ['stop', 'resume']) await reader.post(`/api/v1/runs/${id}/${act}`).expect(401)
  })

  it('a referee starts no run of their own', async () => {
    const referee = await signedInAs(await makeMember({ group, roles: ['referee'] }), app)
    expect((await referee.post('/api/v1/runs').send(PRIMES).expect(403)).body.code).toBe('role_needed')
  })

  it('a run of another group is as if it were not there', async () => {
    const id = await run()
    const stranger = await signedInAs(await makeMember({ roles: ['lead', 'researcher'] }), app)
    for (const path of ['', '/events', '/certificate']) await stranger.get(`/api/v1/runs/${id}${path}`).expect(404)
    for (const act of ['stop', 'resume']) await stranger.post(`/api/v1/runs/${id}/${act}`).expect(404)
    expect((await stranger.get('/api/v1/runs')).body.items).toEqual([])
    const [row] = await select<{ state: string }>('SELECT state FROM runs WHERE id = $id', { id })
    expect(row!.state).toBe('queued')
  })

  it('a colleague reads it and leaves it alone; a lead of the group may stop it', async () => {
    const id = await run()
    const colleague = await signedInAs(await makeMember({ group }), app)
    expect((await colleague.get(`/api/v1/runs/${id}`).expect(200)).body.abilities).toEqual({ stop: false, resume: false, registerClaim: false })
    expect((await colleague.post(`/api/v1/runs/${id}/stop`).expect(403)).body.code).toBe('not_your_run')
    const lead = await signedInAs(await makeMember({ group, roles: ['lead'] }), app)
    await lead.post(`/api/v1/runs/${id}/stop`).expect(200)
  })

  it('a run that is not there is not found, and an id that is none is refused', async () => {
    await agent.get('/api/v1/runs/2c1b0d58-53ab-4ac6-a6a2-0f0a0b3a4f0e').expect(404)
    await agent.get('/api/v1/runs/42').expect(400)
  })
})

describe('what makes no sense is refused at its field, before anything is written', () => {
  it.each([
    ['k = 0', { definition: series({ kind: 'almost-primes', k: 0 }) }, 'definition.set.k'],
    ['k = 10^9', { definition: series({ kind: 'almost-primes', k: 1_000_000_000 }) }, 'definition.set.k'],
    ['100,000 digits', { goal: { digits: 100_000 } }, 'goal.digits'],
    ['no digit', { goal: { digits: 0 } }, 'goal.digits'],
    ['half a digit', { goal: { digits: 1.5 } }, 'goal.digits'],
    ['no goal', { goal: {} }, 'goal'],
    ['a width that is none', { goal: { width: '0' } }, 'goal.width'],
    ['a cut-off that is no number', { goal: { cutoff: 'far' } }, 'goal.cutoff'],
    ['an exclusion that is no prime', { definition: series({ kind: 'primes', exclude: [6] }) }, 'definition.set.exclude'],
    ['a sum that diverges', { definition: series({ kind: 'primes' }, { logPower: '0' }) }, 'definition.weight.logPower'],
    ['an unknown method', { method: 'guess' }, 'method'],
    ['a method that does not fit', { method: 'finite' }, 'method'],
    ['an unknown arithmetic', { arithmetic: 'float' }, 'arithmetic'],
    ['no definition', { definition: undefined }, 'definition'],
  ])('%s', async (_name, change, path) => {
    const count = async () => (await select<{ n: number }>('SELECT (SELECT count(*) FROM runs)::int + (SELECT count(*) FROM constants)::int + (SELECT count(*) FROM pgboss.job)::int AS n'))[0]!.n
    const before = await count()
    const { body } = await agent.post('/api/v1/runs').send({ ...PRIMES, ...change }).expect(400)
    expect(body).toMatchObject({ code: 'invalid_input', status: 400 })
    expect(paths(body)[0]!.startsWith(path)).toBe(true)
    expect(await count()).toBe(before)
  })

  it('what would take longer than a run may', async () => {
    Object.assign(env, { RUN_CPU_LIMIT_SECONDS: 0.0001 })
    const { body } = await agent.post('/api/v1/runs').send({ ...PRIMES, goal: { digits: 21 } }).expect(400)
    expect(paths(body)).toEqual(['goal.digits'])
  })

  it('a plan for what diverges', async () => {
    const { body } = await agent.post('/api/v1/plans').send({ ...PRIMES, definition: series({ kind: 'integers' }) }).expect(400)
    expect(paths(body)).toEqual(['definition.weight.logPower'])
  })
})

describe('in the wrong state', () => {
  it('a run that has ended is not stopped, one that waits is not resumed, one that is done neither', async () => {
    const id = await run()
    expect((await agent.post(`/api/v1/runs/${id}/resume`).expect(409)).body.code).toBe('run_not_ended')
    await agent.post(`/api/v1/runs/${id}/stop`).expect(200)
    expect((await agent.post(`/api/v1/runs/${id}/stop`).expect(409)).body.code).toBe('run_ended')
    await change(`UPDATE runs SET state = 'done', outcome = '{}', certificate = '{}', finished_at = now() WHERE id = $id`, { id })
    expect((await agent.post(`/api/v1/runs/${id}/resume`).expect(409)).body.code).toBe('run_not_ended')
    expect((await agent.post(`/api/v1/runs/${id}/stop`).expect(409)).body.code).toBe('run_ended')
  })

  it('two who stop it at once: one does, the other is told', async () => {
    const id = await run()
    const answers = await Promise.all([agent.post(`/api/v1/runs/${id}/stop`), agent.post(`/api/v1/runs/${id}/stop`)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
  })
})

describe('more than their share', () => {
  it('nobody has more runs at work than allowed, however fast they ask', async () => {
    await change(`UPDATE runs SET state = 'stopped', finished_at = now() WHERE state = 'queued'`)
    Object.assign(env, { RUNS_PER_MEMBER: 3, RUNS_PER_GROUP: 4 })
    const ask = (from: Agent, digits: number) => from.post('/api/v1/runs').send({ ...PRIMES, goal: { digits } })
    const answers = await Promise.all([31, 32, 33, 34, 35].map((digits) => ask(agent, digits)))
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 201, 201, 429, 429])
    const refused = answers.find(({ status }) => status === 429)!
    expect(refused.body).toMatchObject({ code: 'too_many_runs' })
    expect(refused.headers['retry-after']).toBe('30')
    const colleague = await signedInAs(await makeMember({ group }), app)
    await ask(colleague, 31).expect(201)
    expect((await ask(colleague, 32).expect(429)).body.detail).toContain('your group')
    // Another group has its own share.
    await ask(await signedInAs(await makeMember(), app), 31).expect(201)
    const stopped = answers.find(({ status }) => status === 201)!.body.id
    await agent.post(`/api/v1/runs/${stopped}/stop`).expect(200)
    await ask(agent, 36).expect(201)
    await agent.post(`/api/v1/runs/${stopped}/resume`).expect(429)
  })
})
