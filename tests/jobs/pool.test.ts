import { afterEach, describe, expect, it } from 'vitest'
import { EnginePool, OutOfMemory, TaskFailure } from '../../server/engine/pool.ts'
import type { ComputationRequest } from '../../shared/engine/methods/computation.ts'

const request = (digits: number, k = 3): ComputationRequest => ({
  definitions: [{ type: 'series', set: { kind: 'almost-primes', k, exclude: [] }, weight: { power: '1', logPower: '1' } }],
  method: 'panels',
  arithmetic: 'ball',
  goal: { digits },
})

let pool: EnginePool
afterEach(() => pool.close())

describe('the threads that compute', () => {
  it('tell of every shard what it cost, and the whole is what the engine gives', async () => {
    pool = new EnginePool(2, 512)
    const asked = request(20)
    const plan = await pool.run({ kind: 'prepare', run: 'a', request: asked })
    expect(plan.value.costs.length).toBeGreaterThan(2)
    const fixed = { ...asked, parameters: plan.value.parameters }
    const shards = await Promise.all(plan.value.costs.map((_, index) => pool.run({ kind: 'shard', run: 'a', request: fixed, index })))
    expect(shards.reduce((sum, { cpuMs }) => sum + cpuMs, 0)).toBeGreaterThan(0)

    const results = shards.map(({ value }) => value)
    const release = { version: '0', digest: '0'.repeat(64) }
    const { value } = await pool.run({ kind: 'combine', run: 'a', request: fixed, results, release })
    // f(N_3) = 1.03083510179321757195568889979… by gp: see tests/reference.
    expect(value.outcome.enclosure.lo < '1.0308351017932175720').toBe(true)
    expect(value.outcome.enclosure.hi > '1.0308351017932175719').toBe(true)
    expect(JSON.parse(value.certificate)).toMatchObject({ digest: value.certificateDigest, engine: release })

    // What holds when the last shard is still missing holds the final enclosure.
    expect(plan.value.interim).toBe(true)
    const early = await pool.run({ kind: 'interim', run: 'a', request: fixed, results: [...results.slice(0, -1), null] })
    if (early.value) {
      expect(Number(early.value.lo)).toBeLessThanOrEqual(Number(value.outcome.enclosure.lo))
      expect(Number(early.value.hi)).toBeGreaterThanOrEqual(Number(value.outcome.enclosure.hi))
    }
  })

  it('tell a refusal of the engine as what it is', async () => {
    pool = new EnginePool(1, 512)
    const refused = pool.run({ kind: 'prepare', run: 'a', request: { ...request(20), method: 'finite' } })
    await expect(refused).rejects.toThrow(TaskFailure)
    await expect(refused).rejects.toMatchObject({ reason: { kind: 'refusal', field: 'method' } })
  })

  it('are stopped in the middle of a task, and others take their place', async () => {
    pool = new EnginePool(1, 512)
    const stop = new AbortController()
    const long = pool.run({ kind: 'prepare', run: 'a', request: request(20) }).then(() => pool.run({ kind: 'shard', run: 'a', request: request(900), index: 0 }, stop.signal))
    setTimeout(() => stop.abort(new Error('enough')), 300)
    await expect(long).rejects.toThrow('enough')
    // What waits is abandoned without ever being given to a thread.
    await expect(pool.run({ kind: 'calibrate' }, stop.signal)).rejects.toThrow('enough')
    expect((await pool.run({ kind: 'prepare', run: 'b', request: request(10) })).value.costs.length).toBeGreaterThan(0)
  })

  it('end a task that needs more memory than it may use, and go on', async () => {
    pool = new EnginePool(1, 64)
    const results = [`[${'1,'.repeat(30_000_000)}1]`]
    await expect(pool.run({ kind: 'interim', run: 'a', request: request(20), results })).rejects.toThrow(OutOfMemory)
    expect((await pool.run({ kind: 'prepare', run: 'b', request: request(10) })).value.costs.length).toBeGreaterThan(0)
  })

  it('give a short run its turn while a long one has the line full', async () => {
    pool = new EnginePool(2, 512)
    const long = await pool.run({ kind: 'prepare', run: 'long', request: request(60) })
    const done: string[] = []
    const work = long.value.costs.map((_, index) => pool.run({ kind: 'shard', run: 'long', request: request(60), index }).then(() => done.push('long')))
    const short = pool.run({ kind: 'prepare', run: 'short', request: request(5) }).then(() => done.push('short'))
    await Promise.all([...work, short])
    expect(done.indexOf('short')).toBeLessThan(work.length / 2)
  })
})
