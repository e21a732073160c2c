import { setTimeout as pause } from 'node:timers/promises'
import { select, selectOne } from '../../server/db.ts'
import type { Run } from '../../shared/schemas/run.ts'
import type { Agent } from '../support/people.ts'
import { series } from '../support/register.ts'

/** A run of some seconds of CPU in some hundred shards. */
export const LONG = { definition: series({ kind: 'almost-primes', k: 3 }), goal: { digits: 60 }, method: 'transform', arithmetic: 'ball' }
/** One of a fraction of a second. */
export const SHORT = { definition: series({ kind: 'primes' }), goal: { digits: 15 }, method: 'transform', arithmetic: 'ball' }

export async function startRun(agent: Agent, body: object): Promise<string> {
  const response = await agent.post('/api/v1/runs').send(body)
  if (response.status !== 201) throw new Error(`${response.status}: ${response.text}`)
  return response.body.id
}

export async function runNow(agent: Agent, id: string): Promise<Run> {
  return (await agent.get(`/api/v1/runs/${id}`).expect(200)).body
}

/** Waits until something is so, and says what it waited for when it never is. */
export async function until<T>(what: string, check: () => Promise<T | false | null | undefined>, seconds = 60): Promise<T> {
  const end = performance.now() + seconds * 1000
  while (performance.now() < end) {
    const found = await check()
    if (found) return found
    await pause(50)
  }
  throw new Error(`waited ${seconds} s in vain: ${what}`)
}

export async function untilState(agent: Agent, id: string, state: Run['state'], seconds?: number): Promise<Run> {
  return until(`the run is ${state}`, async () => {
    const run = await runNow(agent, id)
    if (run.state === state) return run
    if (run.state === 'failed') throw new Error(`the run failed: ${run.failure}`)
    return null
  }, seconds)
}

export interface StoredShard {
  index: number
  attempt: number
  finished_at: Date
}

export async function storedShards(id: string): Promise<StoredShard[]> {
  return select<StoredShard>('SELECT index, attempt, finished_at FROM run_shards WHERE run_id = $id ORDER BY index', { id })
}

export async function untilShards(id: string, count: number): Promise<StoredShard[]> {
  return until(`${count} shards are stored`, async () => {
    const shards = await storedShards(id)
    return shards.length >= count && shards
  })
}

export async function attemptOf(id: string): Promise<number> {
  return (await selectOne<{ attempt: number }>('SELECT attempt FROM runs WHERE id = $id', { id }))?.attempt ?? -1
}
