import type { Transaction } from 'sequelize'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import { change, inTransaction, select, selectOne } from '../db.ts'
import { env } from '../env.ts'
import { Run } from '../models/run.ts'
import { completeJob, type HeldJob } from './queue.ts'
import { tellRunFinished } from './run-finished.ts'

/*
 * What a worker writes while it holds a run. Every statement names the attempt it belongs to and does nothing once the run has
 * been stopped or has passed to another attempt: the answer `false` then tells the worker to stop.
 */

/** A run that this worker may compute, for as long as it renews the lease. */
export interface Hold {
  runId: string
  attempt: number
  job: HeldJob<'run'>
}

/** A little shorter than the job's, so that the run is free when its job comes back. */
const lease = `make_interval(secs => ${env.RUN_LEASE_SECONDS} - 0.3)`

/** Takes up a queued run, or one whose worker has been silent for too long. */
export async function takeUp(job: HeldJob<'run'>): Promise<{ run: Run; hold: Hold } | 'held-by-another' | 'not-needed'> {
  const [row] = await change<{ attempt: number }>(
    `UPDATE runs SET state = 'running', attempt = attempt + 1, losses = losses + (state = 'running')::int, lease_until = now() + ${lease}, started_at = coalesce(started_at, now())
     WHERE id = $runId AND (state = 'queued' OR (state = 'running' AND lease_until < now())) RETURNING attempt`,
    { runId: job.payload.runId },
  )
  const run = await Run.findByPk(job.payload.runId)
  if (row && run) return { run, hold: { runId: run.id, attempt: row.attempt, job } }
  return run?.state === 'running' ? 'held-by-another' : 'not-needed'
}

/** The job of a run that needs no computing any more. */
export async function dropJob(job: HeldJob<'run'>): Promise<void> {
  await inTransaction((transaction) => completeJob(transaction, 'run', job.id))
}

/** What is told while a run works. */
export interface Progress {
  progress: number
  shardsDone: number
  cpuMs: number
  secondsLeft: number | null
  interim: { lo: string; hi: string } | null
}

/** Renews the lease of the run and of its job, and writes how far it is. */
export async function renew({ runId, attempt, job }: Hold, { progress, shardsDone, cpuMs, secondsLeft, interim }: Progress): Promise<boolean> {
  const [row] = await select<{ held: boolean }>(
    `WITH held AS (
       UPDATE runs SET lease_until = now() + ${lease}, progress = $progress, losses = CASE WHEN shards_done < $shardsDone THEN 0 ELSE losses END,
              shards_done = $shardsDone, cpu_ms = $cpuMs, seconds_left = $secondsLeft, interim_lo = coalesce($lo, interim_lo), interim_hi = coalesce($hi, interim_hi)
       WHERE id = $runId AND attempt = $attempt AND state = 'running' RETURNING id
     ), job AS (
       UPDATE pgboss.job SET started_on = now()
       WHERE name = 'run' AND id = $jobId AND state = 'active' AND retry_count = $retryCount AND EXISTS (SELECT 1 FROM held)
     )
     SELECT EXISTS (SELECT 1 FROM held) AS held`,
    {
      runId, attempt, jobId: job.id, retryCount: job.retryCount, shardsDone,
      progress: progress.toFixed(6), cpuMs: Math.round(cpuMs), secondsLeft: secondsLeft?.toFixed(1) ?? null, lo: interim?.lo ?? null, hi: interim?.hi ?? null,
    },
  )
  return row?.held === true
}

/**
 * What is there to go on from: the parameters and the results of shards, by index. Results of another release of the engine do not
 * mix with new ones: where the digest differs, they and their parameters are dropped and the run begins anew.
 */
export async function storedWork({ runId, attempt }: Hold, engineDigest: string): Promise<{ parameters: string | null; results: Map<number, string> }> {
  return inTransaction(async (transaction) => {
    const run = await selectOne<{ engine_digest: string | null; parameters: string | null }>(
      `SELECT engine_digest, parameters FROM runs WHERE id = $runId AND attempt = $attempt AND state = 'running' FOR UPDATE`,
      { runId, attempt },
      transaction,
    )
    if (run && run.engine_digest !== engineDigest) {
      await change('DELETE FROM run_shards WHERE run_id = $runId', { runId }, transaction)
      await change('UPDATE runs SET engine_digest = $engineDigest, parameters = NULL, shards_total = NULL, shards_done = 0, progress = 0 WHERE id = $runId', { runId, engineDigest }, transaction)
      return { parameters: null, results: new Map() }
    }
    const rows = await select<{ index: number; result: string }>('SELECT index, result FROM run_shards WHERE run_id = $runId', { runId }, transaction)
    return { parameters: run?.parameters ?? null, results: new Map(rows.map(({ index, result }) => [index, result])) }
  })
}

/** Fixes how the run is computed from now on, whoever takes it up. */
export async function storePlan({ runId, attempt }: Hold, parameters: string, shards: number): Promise<boolean> {
  const rows = await change(
    `UPDATE runs SET parameters = $parameters, shards_total = $shards WHERE id = $runId AND attempt = $attempt AND state = 'running' RETURNING id`,
    { runId, attempt, parameters, shards },
  )
  return rows.length === 1
}

/** Stores a shard's result, once: the row lock keeps a stop that comes at the same moment before or after it. */
export async function storeShard({ runId, attempt }: Hold, index: number, result: string, cpuMs: number): Promise<boolean> {
  const rows = await change(
    `INSERT INTO run_shards (run_id, index, result, cpu_ms, attempt)
     SELECT id, $index, $result, $cpuMs, $attempt FROM runs WHERE id = $runId AND attempt = $attempt AND state = 'running' FOR SHARE
     ON CONFLICT (run_id, index) DO NOTHING RETURNING index`,
    { runId, attempt, index, result, cpuMs },
  )
  return rows.length === 1
}

/** Ends a run in the hands of its attempt: state, what `set` brings, those who want to know, and the job, all or nothing. */
async function end({ runId, attempt, job }: Hold, set: string, values: Record<string, unknown>): Promise<boolean> {
  return inTransaction(async (transaction: Transaction) => {
    const rows = await change(
      `UPDATE runs SET ${set}, lease_until = NULL, seconds_left = NULL, finished_at = now() WHERE id = $runId AND attempt = $attempt AND state = 'running' RETURNING id`,
      { runId, attempt, ...values },
      transaction,
    )
    if (rows.length === 0) return false
    await tellRunFinished(transaction, await Run.findByPk(runId, { transaction, rejectOnEmpty: true }))
    await completeJob(transaction, 'run', job.id)
    return true
  })
}

export async function finishRun(hold: Hold, outcome: Outcome, certificate: { text: string; digest: string }, cpuMs: number): Promise<boolean> {
  return end(
    hold,
    `state = 'done', progress = 1, shards_done = shards_total, outcome = $outcome::jsonb, certificate = $certificate, certificate_digest = $digest,
     estimates = $estimates, cpu_ms = $cpuMs, interim_lo = NULL, interim_hi = NULL`,
    {
      outcome: JSON.stringify(outcome),
      certificate: certificate.text,
      digest: certificate.digest,
      estimates: [...new Set(outcome.estimates.map(({ id }) => id))],
      cpuMs: Math.round(cpuMs),
    },
  )
}

/** `failure` is read by the person who started the run. */
export async function failRun(hold: Hold, failure: string): Promise<boolean> {
  return end(hold, `state = 'failed', failure = $failure`, { failure })
}

/** Lays a run back for another worker, with what is stored of it. */
export async function layBack({ runId, attempt }: Hold): Promise<void> {
  await change(`UPDATE runs SET state = 'queued', lease_until = NULL WHERE id = $runId AND attempt = $attempt AND state = 'running'`, { runId, attempt })
}
