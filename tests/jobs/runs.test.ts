import { setTimeout as pause } from 'node:timers/promises'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { change, select } from '../../server/db.ts'
import { storeShard } from '../../server/jobs/run-lease.ts'
import { reviveRuns } from '../../server/jobs/run-worker.ts'
import { isIntact, type Certificate } from '../../shared/engine/certificate/certificate.ts'
import { repeatCertificate } from '../../shared/engine/certificate/repeat.ts'
import { makeMember, signedInAs, type Agent } from '../support/people.ts'
import { series } from '../support/register.ts'
import { attemptOf, LONG, runNow, SHORT, startRun, storedShards, until, untilShards, untilState } from './run-helpers.ts'
import { endWorker, startWorkerProcess } from './worker-process.ts'

const app = createApp()
let agent: Agent

beforeAll(async () => {
  agent = await signedInAs(await makeMember({ roles: ['lead'] }), app)
})

describe('a run', () => {
  it('goes from the request to a certificate that repeats', async () => {
    const worker = await startWorkerProcess()
    const id = await startRun(agent, SHORT)
    const run = await untilState(agent, id, 'done')
    // f(primes) = 1.63661632335126086856965800392186367118… (Lichtman, J. Number Theory 211 (2020)).
    expect(run.outcome!.enclosure.lo < '1.63661632335126086856965800392186367118').toBe(true)
    expect(run.outcome!.enclosure.hi > '1.63661632335126086856965800392186367118').toBe(true)
    expect(run.digits!.truncated).toBeGreaterThanOrEqual(14)
    expect(run).toMatchObject({ progress: 1, failure: null, abilities: { stop: false, resume: false, registerClaim: true } })
    expect(run.shards!.done).toBe(run.shards!.total)
    expect(run.cpuSeconds).toBeGreaterThan(0)

    const file = await agent.get(`/api/v1/runs/${id}/certificate`).expect(200)
    const certificate = file.body as Certificate
    expect(file.headers.etag).toBe(`"${certificate.digest}"`)
    expect(certificate.signature).toBeUndefined()
    expect(await isIntact(certificate)).toBe(true)
    expect(await repeatCertificate(certificate)).toMatchObject({ repeats: true, findings: [] })
    await agent.get(`/api/v1/runs/${id}/certificate`).set('If-None-Match', file.headers.etag).expect(304)
    await endWorker(worker, 'SIGTERM')
  })

  it('outlives a worker that is killed: another goes on, and no stored shard is computed again', async () => {
    // The second is held still until the first has the run.
    const [first, second] = await Promise.all([startWorkerProcess(), startWorkerProcess()])
    second.kill('SIGSTOP')
    const id = await startRun(agent, LONG)
    await untilShards(id, 12)
    second.kill('SIGCONT')
    await endWorker(first, 'SIGKILL')
    const killed = performance.now()
    const before = await storedShards(id)
    await until('another worker has the run', async () => (await attemptOf(id)) === 2)
    // The lease of two seconds, a second until the queue looks, and what a busy machine adds.
    expect((performance.now() - killed) / 1000).toBeLessThan(10)
    const run = await untilState(agent, id, 'done', 120)

    const after = await storedShards(id)
    expect(after.map(({ index }) => index)).toEqual(Array.from({ length: run.shards!.total }, (_, index) => index))
    const kept = after.filter(({ attempt }) => attempt === 1)
    // What the first had stored is there unchanged, and the second has done the rest and nothing else.
    expect(kept).toEqual(before)
    expect(after.filter(({ attempt }) => attempt === 2)).toHaveLength(run.shards!.total - before.length)
    const certificate = (await agent.get(`/api/v1/runs/${id}/certificate`)).body as Certificate
    expect((await repeatCertificate(certificate)).repeats).toBe(true)
    await endWorker(second, 'SIGTERM')
  }, 180_000)

  it('is laid back at once by a worker that is told to go', async () => {
    const first = await startWorkerProcess()
    const id = await startRun(agent, { ...LONG, definition: series({ kind: 'almost-primes', k: 4 }) })
    await untilShards(id, 4)
    await endWorker(first, 'SIGTERM')
    expect(await runNow(agent, id)).toMatchObject({ state: 'queued' })
    const before = await storedShards(id)

    const second = await startWorkerProcess()
    await until('another worker has the run', async () => (await attemptOf(id)) === 2, 3)
    await untilShards(id, before.length + 1)
    await agent.post(`/api/v1/runs/${id}/stop`).expect(200)
    expect((await storedShards(id)).filter(({ attempt }) => attempt === 1)).toEqual(before)
    await endWorker(second, 'SIGTERM')
  }, 120_000)

  it('stops within a second, takes nothing in afterwards, and is resumed where it stood', async () => {
    const worker = await startWorkerProcess()
    const id = await startRun(agent, { ...LONG, definition: series({ kind: 'almost-primes', k: 5 }) })
    await untilShards(id, 6)
    const stopped = (await agent.post(`/api/v1/runs/${id}/stop`).expect(200)).body
    expect(stopped).toMatchObject({ state: 'stopped', abilities: { stop: false, resume: true } })
    const kept = await storedShards(id)
    // A result that was on its way when the run was stopped: this attempt no longer counts.
    const attempt = await attemptOf(id)
    const hold = { runId: id, attempt, job: { id: '', payload: { runId: id }, retryCount: 0 } }
    expect(await storeShard(hold, 100_000, 'null', 1)).toBe(false)

    // The threads are free for others within a second: a short run is done while a long one would still hold them.
    const other = await startRun(agent, { ...SHORT, goal: { digits: 10 } })
    await untilState(agent, other, 'done', 10)
    await pause(1_000)
    expect(await storedShards(id)).toEqual(kept)
    expect(await runNow(agent, id)).toMatchObject({ state: 'stopped' })

    await agent.post(`/api/v1/runs/${id}/resume`).expect(200)
    const run = await untilState(agent, id, 'done', 120)
    const shards = await storedShards(id)
    expect(shards).toHaveLength(run.shards!.total)
    expect(shards.filter((shard) => shard.attempt === attempt)).toEqual(kept)
    await endWorker(worker, 'SIGTERM')
  }, 180_000)

  it('that the engine refuses or that uses up its time fails with a reason', async () => {
    const worker = await startWorkerProcess({ RUN_CPU_LIMIT_SECONDS: '2' })
    const id = await startRun(agent, { ...SHORT, goal: { digits: 11 } })
    // A request that the engine will not run, as one from an older release might be.
    await change(`UPDATE runs SET request = jsonb_set(request::jsonb, '{parameters}', '{"first": 5, "last": 2}')::text, state = 'queued', lease_until = NULL WHERE id = $id`, { id })
    const refused = await until('the run has failed', async () => {
      const run = await runNow(agent, id)
      return run.state === 'failed' && run
    })
    expect(refused.failure).toMatch(/parameter/)
    expect(refused.abilities).toMatchObject({ resume: true, registerClaim: false })

    const long = await startRun(agent, { ...LONG, definition: series({ kind: 'almost-primes', k: 6 }) })
    const over = await until('the run has failed', async () => {
      const run = await runNow(agent, long)
      return run.state === 'failed' && run
    })
    expect(over.failure).toMatch(/2 seconds of CPU time/)
    await endWorker(worker, 'SIGTERM')
  }, 120_000)

  it('that has lost its job gets a new one, and one only', async () => {
    const id = await startRun(agent, { ...SHORT, goal: { digits: 13 } })
    const jobs = () => select<{ state: string }>('SELECT state::text FROM pgboss.job WHERE data->>$key = $id', { key: 'runId', id })
    await change('DELETE FROM pgboss.job WHERE data->>$key = $id', { key: 'runId', id })
    // A run that has just been written may still be on its way to the queue.
    await reviveRuns()
    expect(await jobs()).toEqual([])
    await change(`UPDATE runs SET created_at = now() - interval '1 minute' WHERE id = $id`, { id })
    await Promise.all([reviveRuns(), reviveRuns()])
    await reviveRuns()
    expect(await jobs()).toEqual([{ state: 'created' }])
    await agent.post(`/api/v1/runs/${id}/stop`).expect(200)
  })

  it('is shared by two workers with others, each run by one at a time', async () => {
    const workers = await Promise.all([startWorkerProcess({ COMPUTE_THREADS: '1' }), startWorkerProcess({ COMPUTE_THREADS: '1' })])
    const ids = []
    for (const digits of [16, 17, 18, 19]) ids.push(await startRun(agent, { ...SHORT, goal: { digits } }))
    for (const id of ids) await untilState(agent, id, 'done')
    for (const id of ids) expect(await attemptOf(id)).toBe(1)
    await Promise.all(workers.map((worker) => endWorker(worker, 'SIGTERM')))
  }, 60_000)
})
