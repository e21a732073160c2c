import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import { estimateById } from '../../shared/engine/estimates/library.ts'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import type { OutcomeView, Run, RunEvent, RunSummary } from '../../shared/schemas/run.ts'
import { boundStatement } from '../engine/bounds.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { runAbilities } from '../policies/run.ts'
import type { RunDetailRow, RunEventRow, RunRow } from '../queries/run.ts'

export const presentRunSummary = (row: RunRow): RunSummary => ({
  id: row.id,
  constant: constantNumberText(row.number),
  definition: { canonical: row.definition, latex: row.latex, text: row.text, aliases: row.aliases },
  state: row.state,
  method: row.method,
  arithmetic: row.arithmetic,
  goal: row.goal,
  progress: Number(row.progress),
  purpose: row.purpose,
  claimNumber: row.claim_number !== null && row.claim_ordinal !== null ? claimNumberText(row.claim_number, row.claim_ordinal) : null,
  startedBy: { id: row.started_by, name: row.starter_name },
  createdAt: row.created_at.toISOString(),
  startedAt: row.started_at?.toISOString() ?? null,
  finishedAt: row.finished_at?.toISOString() ?? null,
  digits: row.digits,
})

const seconds = (text: string | null): number | null => (text === null ? null : Number(text))

const shards = (row: { shards_done: number; shards_total: number | null }): Run['shards'] =>
  row.shards_total === null ? null : { done: row.shards_done, total: row.shards_total }

/** The engine's outcome with the bounds and estimates in words. */
export const presentOutcome = (outcome: Outcome, certificateDigest: string): OutcomeView => ({
  enclosure: { lo: outcome.enclosure.lo, hi: outcome.enclosure.hi },
  radius: outcome.radius,
  digits: { truncated: outcome.digits.truncated, rounded: outcome.digits.rounded },
  parameters: outcome.parameters,
  budget: outcome.budget.map(({ source, bound, magnitude }) => ({ source, bound, statement: boundStatement(bound), magnitude })),
  estimates: outcome.estimates.map(({ id, usedAt, validFor, conditional }) => ({ id, title: estimateById(id)?.title ?? id, usedAt, validFor, conditional })),
  convergence: outcome.convergence.map(({ at, lo, hi }) => ({ at, lo, hi })),
  certificateDigest,
})

export const presentRun = (row: RunDetailRow, claims: { id: string; number: number; ordinal: number | null; state: string }[], reader: SignedInMember): Run => ({
  ...presentRunSummary(row),
  group: { id: row.group_id, name: row.group_name },
  without: row.without,
  forecastSeconds: seconds(row.forecast_seconds),
  cpuSeconds: Number(row.cpu_ms) / 1000,
  secondsLeft: seconds(row.seconds_left),
  shards: shards(row),
  outcome: row.outcome && row.certificate_digest ? presentOutcome(row.outcome, row.certificate_digest) : null,
  failure: row.failure,
  claims: claims.map(({ id, number, ordinal, state }) => ({ id, number: ordinal === null ? null : claimNumberText(number, ordinal), state })),
  abilities: runAbilities(reader, { groupId: row.group_id, startedBy: row.started_by, state: row.state, purpose: row.purpose }),
})

export const presentRunEvent = (row: RunEventRow): RunEvent => ({
  state: row.state,
  progress: Number(row.progress),
  shards: shards(row),
  secondsLeft: seconds(row.seconds_left),
  cpuSeconds: Number(row.cpu_ms) / 1000,
  enclosure: row.lo !== null && row.hi !== null ? { lo: row.lo, hi: row.hi } : null,
})
