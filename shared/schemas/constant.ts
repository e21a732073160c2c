import { z } from 'zod'
import { constantNumber, enclosure, id, instant, pageOf, pageQuery } from './common.ts'
import { definitionInput, definitionView } from './definition.ts'
import { claimState, claimSummary } from './claim.ts'
import { arithmetic, method, runState } from './run.ts'

/** POST /constants: states a constant; one that exists is answered with 200 instead of 201. */
export const constantInput = z.object({ definition: definitionInput })

/** Best enclosure: the exact intersection of the signed ones. */
export const bestEnclosure = enclosure.extend({ digits: z.object({ truncated: z.number().int(), rounded: z.number().int() }) })

/** A row of the register. */
export const constantSummary = z.object({
  number: constantNumber,
  definition: definitionView,
  best: bestEnclosure.nullable(),
  /** State of the claim that is furthest on its way, or `stated` where there is none. */
  state: claimState.or(z.literal('stated')),
  inConflict: z.boolean(),
  group: z.object({ id, name: z.string() }),
  changedAt: instant,
})
export type ConstantSummary = z.infer<typeof constantSummary>

/** GET /constants: everything here is in the page's address too. */
export const constantQuery = pageQuery.extend({
  /** Words, a definition such as "odd, k = 3" or "1/(p log p)", or leading digits such as 1.6366. */
  text: z.string().trim().max(200).optional(),
  set: z.string().max(40).optional(),
  k: z.coerce.number().int().min(1).optional(),
  power: z.string().max(20).optional(),
  logPower: z.string().max(20).optional(),
  /** Excluded primes, comma separated: "2" for the odd ones; "none" for no exclusion. */
  exclude: z.string().max(200).optional(),
  state: claimState.or(z.literal('stated')).optional(),
  minDigits: z.coerce.number().int().min(0).max(10_000).optional(),
  group: id.optional(),
  sort: z.enum(['number', 'digits', 'value', 'changed', 'k']).default('number'),
  order: z.enum(['asc', 'desc']).default('asc'),
})
/** GET /constants/export: what is filtered, as a file. */
export const constantExportQuery = constantQuery.omit({ cursor: true, limit: true }).extend({ format: z.enum(['csv', 'json', 'bibtex', 'latex']) })
export const constantPage = pageOf(constantSummary)

export const constant = constantSummary.extend({
  /** Sentence on why and where the sum converges. */
  convergence: z.string(),
  firstMembers: z.array(z.string()),
  claims: z.array(claimSummary),
  /** Narrowing over time: the best enclosure after each signature. */
  narrowing: z.array(z.object({ at: instant, lo: z.string(), hi: z.string(), digits: z.number().int(), claim: z.string(), author: z.string() })),
  conflicts: z.array(z.object({ claims: z.tuple([z.string(), z.string()]), openedAt: instant, closedAt: instant.nullable() })),
  /** Claims of other constants that use this one (orders, derived values). */
  usedBy: z.array(z.object({ claimNumber: z.string(), text: z.string() })),
  /** Estimates that the signed enclosures rest on. */
  restsOn: z.array(z.object({ estimate: z.string(), title: z.string(), conditional: z.boolean() })),
  cite: z.object({ plain: z.string(), bibtex: z.string() }),
  /** Where it was stated. */
  statedBy: z.string(),
  statedAt: instant,
  runs: z.array(z.object({ id, method, arithmetic, state: runState, createdAt: instant })),
})
export type Constant = z.infer<typeof constant>

/** POST /look-ups: constants compatible with pasted leading digits, nearest first. */
export const lookUpInput = z.object({ text: z.string().min(1).max(100_000), reading: z.enum(['truncated', 'rounded']) })
export const lookUpResult = z.object({
  items: z.array(z.object({ constant: constantSummary, compatibleTo: z.number().int(), ruledOutAt: z.number().int().nullable() })),
})
