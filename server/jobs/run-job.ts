import { setTimeout as pause } from 'node:timers/promises'
import { OutOfMemory, TaskFailure, type EnginePool } from '../engine/pool.ts'
import { env } from '../env.ts'
import { log } from '../log.ts'
import type { HeldJob } from './queue.ts'
import { Abandoned, computeRun, OverLimit } from './run-compute.ts'
import { dropJob, failRun, layBack, takeUp } from './run-lease.ts'

/** A run that has cost so many workers their life without getting any further is given up. */
const MOST_LOSSES = 3

/**
 * Takes up the run of a job and computes it to its end, or until it is stopped or taken over. `give-back`: the job is still
 * needed, but not from this worker now.
 */
export async function runJob(job: HeldJob<'run'>, pool: EnginePool, shutdown: AbortSignal): Promise<'settled' | 'give-back'> {
  const taken = await takeUp(job)
  if (taken === 'held-by-another') {
    await pause(500, undefined, { signal: shutdown }).catch(() => undefined)
    return 'give-back'
  }
  if (taken === 'not-needed') {
    await dropJob(job)
    return 'settled'
  }
  const { run, hold } = taken
  try {
    if (run.losses > MOST_LOSSES) throw new Error(`its worker died ${run.losses} times without getting any further`)
    await computeRun(run, hold, pool, shutdown)
  } catch (error) {
    if (shutdown.aborted) {
      await layBack(hold)
      return 'give-back'
    }
    if (!(error instanceof Abandoned)) {
      log.warn({ err: error, runId: run.id, attempt: hold.attempt }, 'a run failed')
      await failRun(hold, failureText(error))
    }
  }
  return 'settled'
}

/** The reason in words that help the person who started the run. */
function failureText(error: unknown): string {
  const less = 'Ask for fewer digits, a smaller cut-off or another method.'
  if (error instanceof OutOfMemory) return `It needed more than the ${env.RUN_MEMORY_MEGABYTES} MB of memory that a thread may use. ${less}`
  if (error instanceof OverLimit) return `It used up the ${durationText(env.RUN_CPU_LIMIT_SECONDS)} of CPU time that a run may use. ${less}`
  if (error instanceof TaskFailure && error.reason.kind === 'refusal') return error.reason.message
  const said = error instanceof Error ? error.message : String(error)
  return `A fault of the server ended it (${said.slice(0, 300)}). What was computed is kept: resume it, and if it fails again, tell whoever runs this installation.`
}

function durationText(seconds: number): string {
  return seconds >= 7200 ? `${Math.round(seconds / 3600)} hours` : seconds >= 120 ? `${Math.round(seconds / 60)} minutes` : `${seconds} seconds`
}
