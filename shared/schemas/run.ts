import { z } from 'zod'
import { decimalText, enclosure, id, instant, pageOf, pageQuery, personRef, constantNumber } from './common.ts'
import { definitionInput, definitionView } from './definition.ts'
import { ARITHMETIC_NAMES, ERROR_SOURCES, METHOD_NAMES } from '../engine/methods/computation.ts'
import { WIDTH_HINT, WIDTH_PATTERN, parseWidth } from '../engine/methods/goal.ts'
import { LIMITS } from '../limits.ts'

export const method = z.enum(METHOD_NAMES)
export const arithmetic = z.enum(ARITHMETIC_NAMES)
export const goal = z.union([
  z.object({ digits: z.number().int().min(1, 'at least one digit').max(LIMITS.digits, `at most ${LIMITS.digits} digits`) }),
  z.object({ width: z.string().regex(WIDTH_PATTERN, `write ${WIDTH_HINT}`).refine((text) => parseWidth(text) !== null, `write ${WIDTH_HINT}`) }),
  z.object({ cutoff: z.string().regex(/^[1-9]\d{0,17}$/, 'write a whole number') }),
])

/** Ids of published estimates that nothing may rest on; those that the member's group has in doubt are left out in any case. */
const without = z.array(z.string().max(200)).max(500).default([])

/** POST /plans: what would be computed, for every method and arithmetic, before anything starts. */
export const planInput = z.object({ definition: definitionInput, goal, without })
export const forecast = z.object({
  method,
  arithmetic,
  possible: z.boolean(),
  /** Why not, where it is not possible. */
  reason: z.string().nullable(),
  radius: z.string().nullable(),
  /** CPU seconds on this server, by calibration. */
  seconds: z.number().nullable(),
  /** The quickest that reaches the goal. */
  recommended: z.boolean(),
})
export const plan = z.object({
  definition: definitionView,
  /** Register number if this constant is already stated. */
  constant: constantNumber.nullable(),
  forecasts: z.array(forecast),
  /** Estimates that are left out. */
  without: z.array(z.string()),
})
export type Plan = z.infer<typeof plan>

/** POST /runs */
export const runInput = z.object({
  definition: definitionInput,
  goal,
  method: method.or(z.literal('auto')).default('auto'),
  arithmetic: arithmetic.default('ball'),
  without,
})
export type RunInput = z.input<typeof runInput>

export const runState = z.enum(['queued', 'running', 'done', 'failed', 'stopped'])
export const budgetItem = z.object({
  source: z.enum(ERROR_SOURCES),
  bound: z.string(),
  /** Name of the bound and what it claims, from BOUNDS.md. */
  statement: z.string(),
  magnitude: z.string(),
})
export const estimateUse = z.object({ id: z.string(), title: z.string(), usedAt: z.string(), validFor: z.string(), conditional: z.boolean() })

export const outcome = z.object({
  enclosure,
  radius: z.string(),
  digits: z.object({ truncated: z.number().int(), rounded: z.number().int() }),
  parameters: z.record(z.string(), z.union([z.string(), z.number()])),
  budget: z.array(budgetItem),
  estimates: z.array(estimateUse),
  convergence: z.array(z.object({ at: z.string(), lo: decimalText, hi: decimalText })),
  certificateDigest: z.string(),
})
export type OutcomeView = z.infer<typeof outcome>

export const runSummary = z.object({
  id,
  constant: constantNumber,
  definition: definitionView,
  state: runState,
  method,
  arithmetic,
  goal,
  /** Share done, 0 to 1. */
  progress: z.number(),
  /** `recheck` belongs to a referee's work on a claim. */
  purpose: z.enum(['run', 'recheck']),
  claimNumber: z.string().nullable(),
  startedBy: personRef,
  createdAt: instant,
  startedAt: instant.nullable(),
  finishedAt: instant.nullable(),
  digits: z.object({ truncated: z.number().int(), rounded: z.number().int() }).nullable(),
})
export type RunSummary = z.infer<typeof runSummary>

export const run = runSummary.extend({
  group: z.object({ id, name: z.string() }),
  /** Estimates that it may not rest on. */
  without: z.array(z.string()),
  /** Forecast of CPU seconds made when it was started. */
  forecastSeconds: z.number().nullable(),
  /** CPU seconds used so far by finished shards. */
  cpuSeconds: z.number(),
  /** Estimate of seconds left while it works. */
  secondsLeft: z.number().nullable(),
  shards: z.object({ done: z.number().int(), total: z.number().int() }).nullable(),
  outcome: outcome.nullable(),
  /** Why it failed, for a person. */
  failure: z.string().nullable(),
  /** Claims registered from this run. */
  claims: z.array(z.object({ id, number: z.string().nullable(), state: z.string() })),
  abilities: z.object({ stop: z.boolean(), resume: z.boolean(), registerClaim: z.boolean() }),
})
export type Run = z.infer<typeof run>

/** Server-sent event `progress` of GET /runs/:id/events; `state` other than queued/running is the last. */
export const runEvent = run.pick({ state: true, progress: true, shards: true, secondsLeft: true, cpuSeconds: true }).extend({ enclosure: enclosure.nullable() })
export type RunEvent = z.infer<typeof runEvent>

export const runQuery = pageQuery.extend({ state: runState.optional(), mine: z.stringbool().optional(), constant: constantNumber.optional() })
export const runPage = pageOf(runSummary)
