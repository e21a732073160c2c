import { createHash } from 'node:crypto'
import type { Transaction } from 'sequelize'
import type { z } from 'zod'
import { constantNumberText } from '../../shared/constant-number.ts'
import type { ArithmeticName, ComputationRequest, Method } from '../../shared/engine/methods/computation.ts'
import type { Goal } from '../../shared/engine/methods/goal.ts'
import type { runInput } from '../../shared/schemas/run.ts'
import { canonicalJson } from '../audit/canonical.ts'
import { recordAudit } from '../audit/record.ts'
import { inTransaction, selectOne } from '../db.ts'
import { readDefinition } from '../engine/definition.ts'
import { chooseForecast } from '../engine/forecast.ts'
import { estimatesToLeaveOut } from '../engine/without.ts'
import { env } from '../env.ts'
import { conflict, Problem } from '../errors.ts'
import { cancelRunJobs, sendJob } from '../jobs/queue.ts'
import { tellRunFinished } from '../jobs/run-finished.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Constant } from '../models/constant.ts'
import { Run } from '../models/run.ts'
import { assertHandlesRun } from '../policies/run.ts'
import { stateConstant } from './constant.ts'

/** A person asking twice for the same within so many seconds has clicked twice. */
const DOUBLE_CLICK_SECONDS = 10

interface NewRun {
  method: Method
  arithmetic: ArithmeticName
  goal: Goal
  forecastSeconds: number | null
  without: readonly string[]
}

/** Whoever starts runs holds this until the end of their transaction, so that limits and double clicks are counted right. */
async function lockStarter(transaction: Transaction, groupId: string): Promise<void> {
  await selectOne('SELECT pg_advisory_xact_lock(hashtextextended($key, 0))', { key: `runs of ${groupId}` }, transaction)
}

/** Refuses one run more than a person or a group may have at work at a time. */
async function assertRoom(transaction: Transaction, memberId: string, groupId: string): Promise<void> {
  const open = await selectOne<{ mine: number; all: number }>(
    `SELECT (count(*) FILTER (WHERE started_by = $memberId))::int AS mine, count(*)::int AS all FROM runs WHERE group_id = $groupId AND state IN ('queued', 'running')`,
    { memberId, groupId },
    transaction,
  )
  const refuse = (who: string, limit: number): never => {
    throw new Problem(429, 'too_many_runs', `${who} already ${limit === 1 ? 'has a run' : `have ${limit} runs`} waiting or at work. Wait for one to finish, or stop one.`, { headers: { 'Retry-After': '30' } })
  }
  if ((open?.mine ?? 0) >= env.RUNS_PER_MEMBER) refuse('You', env.RUNS_PER_MEMBER)
  if ((open?.all ?? 0) >= env.RUNS_PER_GROUP) refuse('The members of your group', env.RUNS_PER_GROUP)
}

async function createRun(
  transaction: Transaction,
  constant: Constant,
  starter: { id: string; groupId: string },
  { method, arithmetic, goal, forecastSeconds, without }: NewRun,
  recheck?: { claimId: string },
): Promise<Run> {
  const request: ComputationRequest = { definitions: [constant.definition], method, arithmetic, goal, ...(without.length > 0 && { without }) }
  const text = canonicalJson(request)
  const requestKey = createHash('sha256').update(`${recheck?.claimId ?? ''}:${text}`).digest('hex')
  const twin = await selectOne<{ id: string }>(
    `SELECT id FROM runs WHERE started_by = $memberId AND request_key = $requestKey AND state IN ('queued', 'running', 'done')
     AND created_at > now() - make_interval(secs => ${DOUBLE_CLICK_SECONDS}) ORDER BY created_at DESC LIMIT 1`,
    { memberId: starter.id, requestKey },
    transaction,
  )
  if (twin) return Run.findByPk(twin.id, { transaction, rejectOnEmpty: true })

  await assertRoom(transaction, starter.id, starter.groupId)
  const run = await Run.create(
    {
      constantId: constant.id,
      groupId: starter.groupId,
      startedBy: starter.id,
      ...(recheck && { purpose: 'recheck' as const, claimId: recheck.claimId }),
      method,
      arithmetic,
      request: text,
      requestKey,
      goal,
      forecastSeconds: forecastSeconds?.toFixed(3) ?? null,
    },
    { transaction },
  )
  await sendJob(transaction, 'run', { runId: run.id })
  await recordAudit(transaction, {
    act: recheck ? 'run.recheck' : 'run.start',
    actorId: starter.id,
    groupId: starter.groupId,
    subject: { kind: 'run', id: run.id, label: constantNumberText(constant.number) },
    detail: { method, arithmetic, goal, ...(without.length > 0 && { without: [...without] }) },
  })
  return run
}

/** Starts a run, stating its constant where that is new. The same person asking twice within seconds gets the same run. */
export async function startRun(member: SignedInMember, input: z.output<typeof runInput>): Promise<Run> {
  const read = readDefinition(input.definition)
  const without = await estimatesToLeaveOut(member.groupId, input.without)
  const chosen = await chooseForecast(read.definition, input.goal, input.method, input.arithmetic, without)
  return inTransaction(async (transaction) => {
    await lockStarter(transaction, member.groupId)
    const { constant } = await stateConstant(transaction, member, read)
    return createRun(transaction, constant, member, { ...chosen, goal: input.goal, without })
  })
}

/**
 * Starts a referee's recheck of a claim within the transaction of the act. It belongs to the claim's group, whose members see it,
 * and is handled by the referee. Throws the engine's refusal where the method cannot do it.
 */
export async function startRecheck(
  transaction: Transaction,
  claim: { id: string; constantId: string; groupId: string },
  referee: { id: string },
  { method, arithmetic, goal }: Pick<NewRun, 'method' | 'arithmetic' | 'goal'>,
): Promise<Run> {
  const constant = await Constant.findByPk(claim.constantId, { transaction, rejectOnEmpty: true })
  const without = await estimatesToLeaveOut(claim.groupId)
  const chosen = await chooseForecast(constant.definition, goal, method, arithmetic, without)
  await lockStarter(transaction, claim.groupId)
  return createRun(transaction, constant, { id: referee.id, groupId: claim.groupId }, { ...chosen, goal, without }, { claimId: claim.id })
}

/** Ends a run that waits or works. What is computed so far is kept, and what comes in afterwards is not accepted. */
export async function stopRun(member: SignedInMember, id: string): Promise<Run> {
  return inTransaction(async (transaction) => {
    const run = await Run.findByPk(id, { transaction, lock: true, rejectOnEmpty: true })
    assertHandlesRun(member, run)
    if (run.state !== 'queued' && run.state !== 'running') throw conflict('run_ended', `This run is ${run.state} already.`)
    await run.update({ state: 'stopped', leaseUntil: null, secondsLeft: null, finishedAt: new Date() }, { transaction })
    await cancelRunJobs(transaction, run.id)
    await tellRunFinished(transaction, run)
    await recordAudit(transaction, { act: 'run.stop', actorId: member.id, groupId: run.groupId, subject: { kind: 'run', id: run.id } })
    return run
  })
}

/** Lets a stopped or failed run go on after the shards that are stored. */
export async function resumeRun(member: SignedInMember, id: string): Promise<Run> {
  return inTransaction(async (transaction) => {
    await lockStarter(transaction, member.groupId)
    const run = await Run.findByPk(id, { transaction, lock: true, rejectOnEmpty: true })
    assertHandlesRun(member, run)
    if (run.state !== 'stopped' && run.state !== 'failed') throw conflict('run_not_ended', run.state === 'done' ? 'This run is done.' : 'This run has not been stopped.')
    await assertRoom(transaction, run.startedBy, run.groupId)
    await run.update({ state: 'queued', losses: 0, failure: null, finishedAt: null }, { transaction })
    await sendJob(transaction, 'run', { runId: run.id })
    await recordAudit(transaction, { act: 'run.resume', actorId: member.id, groupId: run.groupId, subject: { kind: 'run', id: run.id } })
    return run
  })
}
