import type { Definition } from '../sets/definition.ts'
import type { Goal } from './goal.ts'

/**
 * `transform`: Mellin transform by the trapezoid; `panels`: the same integral by power series and Gauss-Legendre panels;
 * `expansion`: over the primes, by powers of 1/p and prime zeta values; `derivatives`: the Dirichlet series or a derivative at s0.
 */
export const METHOD_NAMES = ['transform', 'panels', 'partial-sum', 'finite', 'expansion', 'derivatives'] as const
export type Method = (typeof METHOD_NAMES)[number]
export const ARITHMETIC_NAMES = ['ball', 'mpfr'] as const
export type ArithmeticName = (typeof ARITHMETIC_NAMES)[number]

export interface ComputationRequest {
  /** One definition, or several that share one sweep (a table over k). */
  definitions: Definition[]
  method: Method
  arithmetic: ArithmeticName
  goal: Goal
  /** Ids of published estimates that nothing may rest on, as while they are in doubt. What is chosen leaves them out. */
  without?: readonly string[]
  /**
   * Everything that `prepare` would otherwise choose (precision in bits, step, node range, …), as a certificate records it.
   * Given, the computation repeats exactly; a value that is not sound is refused, never trusted.
   */
  parameters?: Parameters
}

/** Flat and exact: integers as numbers below 2^53 or decimal strings, rationals as "a/b". */
export type Parameters = Record<string, string | number>

/** Decimal end points, rounded outward: the number is certainly in [lo, hi]. */
export interface Enclosure {
  lo: string
  hi: string
}

export const ERROR_SOURCES = ['discretisation', 'truncation-below', 'truncation-above', 'tail', 'series', 'rounding'] as const
export type ErrorSource = (typeof ERROR_SOURCES)[number]

export interface BudgetItem {
  source: ErrorSource
  /** Id of the bound in BOUNDS.md that this part of the radius rests on. */
  bound: string
  /** Contribution to the radius, decimal in scientific notation, rounded up: "3.1e-42". */
  magnitude: string
}

/** One published estimate that the enclosure rests on, and where it was used. */
export interface EstimateUse {
  /** Id in the library of estimates. */
  id: string
  /** The points or ranges at which it was applied, e.g. "x >= 1000000000". */
  usedAt: string
  /** The range in which it is stated to hold, copied from the library. */
  validFor: string
  conditional: boolean
}

export interface Outcome {
  definition: Definition
  enclosure: Enclosure
  /** Half the width, rounded up, scientific notation. */
  radius: string
  /** Decimals after the point that every number of the enclosure shares, truncated and rounded. */
  digits: { truncated: number; rounded: number }
  method: Method
  arithmetic: ArithmeticName
  goal: Goal
  parameters: Parameters
  budget: BudgetItem[]
  estimates: EstimateUse[]
  /** Enclosures on the way, for the convergence chart: `at` is the cut-off or the number of nodes. */
  convergence: { at: string; lo: string; hi: string }[]
}

/** Exact JSON value; integers beyond 2^53 travel as strings. */
export type Json = null | boolean | number | string | Json[] | { [key: string]: Json }
export type ShardResult = Json

/**
 * A computation cut into independent shards: a shard can run on any thread or machine, its result can be stored, and the
 * outcome depends on the results alone, so that a run is resumed after an interruption and shared between cores without
 * changing a bit of its enclosure.
 */
export interface Computation {
  readonly request: ComputationRequest
  /** The request's parameters made complete: pass them back in to repeat the computation. */
  readonly parameters: Parameters
  readonly shardCount: number
  /** Relative cost of a shard, for progress and scheduling. heuristic: affects speed only */
  shardCost(index: number): number
  runShard(index: number): Promise<ShardResult>
  /**
   * Enclosures that hold already when only some shards are there (in order, undefined where missing), one a definition; null where
   * these shards do not tell any yet. Absent where the method has nothing to tell before the end.
   */
  interim?(results: (ShardResult | undefined)[]): Promise<Enclosure[] | null>
  /** One outcome a definition, in the order of the request; needs the results of all shards, in order. */
  combine(results: ShardResult[]): Promise<Outcome[]>
}
