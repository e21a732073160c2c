import type { Rational } from '../arithmetic/rational.ts'
import type { PrimeZeta } from './prime-zeta.ts'
import type { ZetaContext } from './zeta-context.ts'

/** One real point s at which every series of a sweep is evaluated: zeta values, prime zeta values, powers, each made once. */
export type SeriesPoint<N> = PrimeZeta<N>

/**
 * D(s) = sum over n in S of n^-s for one set S, as a method needs it. All coefficients are 0 or 1, so that |D(s)| <= D(Re s)
 * and D decreases.
 */
export interface DirichletSeries {
  /** 1 where D has a simple pole at s = 1 and the sum is taken there, else 0. */
  readonly pole: 0 | 1
  /** The least member of S. */
  readonly leastMember: bigint
  /** Makes what `evaluate` needs once for a context; called outside of any frame before the first point of the context. */
  prepare?<N>(context: ZetaContext<N>): void
  /** (s-1)^pole D(s), enclosed. */
  evaluate<N>(at: SeriesPoint<N>): N
  /** Bound of D near the power s0 of the weight. */
  readonly majorant: Majorant
}

/**
 * D(s0 + t) <= t^-pole (c_0 + c_1 y + c_2 y^2 + …), y = L + 1, L = log(1/t), for 0 < t <= 1; all c_i >= 0. (T-3)
 * Where the series has no singularity at s0 only c_0 is there, and the bound holds for all t > 0.
 */
export interface Majorant {
  readonly coefficients: readonly Rational[]
}
