import { setTimeout as pause } from 'node:timers/promises'
import type { ComputationRequest } from '../../shared/engine/methods/computation.ts'
import type { EnginePool } from '../engine/pool.ts'
import { engineRelease } from '../engine/release.ts'
import { env } from '../env.ts'
import { log } from '../log.ts'
import type { Run } from '../models/run.ts'
import { finishRun, renew, storedWork, storePlan, storeShard, type Hold, type Progress } from './run-lease.ts'

/** How often a worker says that it lives and how far it is, and learns whether its run has been stopped. */
const BEAT_MS = 400
/** Pause before an enclosure on the way is asked for again. */
const INTERIM_MS = 2_000

/** The computing ends early because the run is no longer this worker's, or the worker goes. */
export class Abandoned extends Error {}
/** The run has used up its CPU time. */
export class OverLimit extends Error {}

interface Work {
  run: Run
  hold: Hold
  pool: EnginePool
  signal: AbortSignal
  request: ComputationRequest
  costs: number[]
  interim: boolean
  results: Map<number, string>
  told: Progress
}

/**
 * Computes a run that this worker holds, from what is stored of it to outcome and certificate. Rejects with `Abandoned` once the
 * run is stopped or taken over or this worker shuts down, and with whatever else goes wrong.
 */
export async function computeRun(run: Run, hold: Hold, pool: EnginePool, shutdown: AbortSignal): Promise<void> {
  const halt = new AbortController()
  const signal = AbortSignal.any([halt.signal, shutdown])
  const told: Progress = { progress: Number(run.progress), shardsDone: run.shardsDone, cpuMs: Number(run.cpuMs), secondsLeft: null, interim: null }
  const beating = beat(hold, told, halt, () => pool.busyMs(run.id))
  try {
    const { parameters, results } = await storedWork(hold, engineRelease.digest)
    const asked = JSON.parse(run.request) as ComputationRequest
    const begun: ComputationRequest = parameters === null ? asked : { ...asked, parameters: JSON.parse(parameters) }
    const plan = await pool.run({ kind: 'prepare', run: run.id, request: begun }, signal)
    told.cpuMs += plan.cpuMs
    const { costs, interim } = plan.value
    ours(await storePlan(hold, JSON.stringify(plan.value.parameters), costs.length))

    const request: ComputationRequest = { ...asked, parameters: plan.value.parameters }
    await computeShards({ run, hold, pool, signal, request, costs, interim, results, told })

    const inOrder = costs.map((_, index) => results.get(index) ?? '')
    const { value, cpuMs } = await pool.run({ kind: 'combine', run: run.id, request, results: inOrder, release: engineRelease }, signal)
    ours(await finishRun(hold, value.outcome, { text: value.certificate, digest: value.certificateDigest }, told.cpuMs + cpuMs))
  } finally {
    halt.abort(new Abandoned('the computing has ended'))
    await beating
  }
}

/** A write that was not accepted: the run is no longer this worker's. */
function ours(accepted: boolean): void {
  if (!accepted) throw new Abandoned('the run was stopped or taken over')
}

/** Has the missing shards computed, one more at a time than there are threads, so that none of them waits for the next. */
async function computeShards(work: Work): Promise<void> {
  const { run, hold, pool, signal, request, costs, results, told } = work
  const costOf = (index: number): number => costs[index] ?? 0
  const total = costs.reduce((sum, cost) => sum + cost, 0)
  const before = [...results.keys()].reduce((sum, index) => sum + costOf(index), 0)
  const missing = costs.map((_, index) => index).filter((index) => !results.has(index))
  const begun = performance.now()
  let done = before
  const tell = (): void => {
    told.shardsDone = results.size
    told.progress = total > 0 ? Math.min(1, done / total) : 0
    told.secondsLeft = done > before ? ((performance.now() - begun) / 1000) * ((total - done) / (done - before)) : null
  }
  const lane = async (): Promise<void> => {
    for (let index = missing.shift(); index !== undefined; index = missing.shift()) {
      const { value, cpuMs } = await pool.run({ kind: 'shard', run: run.id, request, index }, signal)
      ours(await storeShard(hold, index, value, cpuMs))
      results.set(index, value)
      told.cpuMs += cpuMs
      done += costOf(index)
      tell()
    }
  }
  tell()
  const shardsDone = new AbortController()
  const watching = work.interim ? watchInterim(work, shardsDone.signal) : undefined
  try {
    await Promise.all(Array.from({ length: pool.size + 1 }, lane))
  } finally {
    shardsDone.abort()
    await watching
  }
}

/** Asks now and then which enclosure holds already, while shards are being computed. */
async function watchInterim({ run, pool, signal, request, costs, results, told }: Work, done: AbortSignal): Promise<void> {
  for (let known = 0; !done.aborted && !signal.aborted; ) {
    await pause(INTERIM_MS, undefined, { signal: AbortSignal.any([done, signal]) }).catch(() => undefined)
    if (done.aborted || signal.aborted || results.size === known) continue
    known = results.size
    const given = costs.map((_, index) => results.get(index) ?? null)
    const answer = await pool.run({ kind: 'interim', run: run.id, request, results: given }, signal).catch(() => null)
    told.cpuMs += answer?.cpuMs ?? 0
    if (answer?.value) told.interim = answer.value
  }
}

/** Keeps the lease alive until `halt`; halts the computing when the run is no longer ours or over its limit. */
async function beat(hold: Hold, told: Progress, halt: AbortController, busyMs: () => number): Promise<void> {
  let renewed = performance.now()
  while (!halt.signal.aborted) {
    try {
      if (!(await renew(hold, told))) halt.abort(new Abandoned('the run was stopped or taken over'))
      renewed = performance.now()
    } catch (error) {
      // The database may be away for a moment. Once the lease must have lapsed, somebody else may have the run.
      log.warn({ err: error, runId: hold.runId }, 'a lease could not be renewed')
      if (performance.now() - renewed > env.RUN_LEASE_SECONDS * 1000) halt.abort(new Abandoned('the lease has lapsed'))
    }
    if (told.cpuMs + busyMs() > env.RUN_CPU_LIMIT_SECONDS * 1000) halt.abort(new OverLimit('CPU time'))
    await pause(BEAT_MS, undefined, { signal: halt.signal }).catch(() => undefined)
  }
}
