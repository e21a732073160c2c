import { binomial } from '../arithmetic/integers.ts'
import { rational } from '../arithmetic/rational.ts'
import type { SeriesPoint } from './dirichlet.ts'
import { powerOfTwo } from './zeta-context.ts'

/**
 * Sum over the primes p not excluded of (p^s - 1)^-j: for p <= A as (p^-s/(1 - p^-s))^j, for the others through
 * (p^s - 1)^-j = sum_{i >= j} C(i-1, j-1) p^(-is) and the prime zeta values over p > A; what is left out after i = last is at
 * most 2^(last - roughBits(last + 1)).
 *
 * *Claim*: contains it. *Valid for*: s > 1, j >= 1, split >= 3. *Bound*: Z-5.
 */
export function distinctFactorPowerSum<N>(at: SeriesPoint<N>, j: number, exclude: readonly number[]): N {
  const { arithmetic, primes, split } = at.point.context
  let last = Math.max(at.order, j)
  while (at.roughBits(last + 1) - last < arithmetic.precision) last++
  let total = arithmetic.rational(rational(0))
  for (let i = j; i <= last; i++) {
    total = arithmetic.add(total, arithmetic.scale(at.overRoughPrimes(i), rational(binomial(i - 1, j - 1))))
  }
  total = arithmetic.addError(total, powerOfTwo(arithmetic, at.roughBits(last + 1) - last))
  for (const p of primes) if (!exclude.includes(p)) total = arithmetic.add(total, ratioPower(at, p, j))
  for (const p of exclude) if (p > split) total = arithmetic.subtract(total, ratioPower(at, p, j))
  return total
}

/** (p^s - 1)^-j. */
function ratioPower<N>(at: SeriesPoint<N>, p: number, j: number): N {
  const { arithmetic, one } = at.point.context
  const name = `1/(${p}^s-1)`
  const known = at.point.shared.get(name) ?? []
  at.point.shared.set(name, known)
  if (known.length === 0) known.push(arithmetic.divide(at.point.primePower(p, 1), arithmetic.subtract(one, at.point.primePower(p, 1))))
  while (known.length < j) known.push(arithmetic.multiply(known[known.length - 1], known[0]))
  return known[j - 1]
}
