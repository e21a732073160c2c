import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ceilDivide, isqrt } from '../arithmetic/integers.ts'
import { primesUpTo } from '../arithmetic/primes.ts'
import { ONE, type Rational, ZERO, add, ceilScaled, divide, dyadic, multiply, rational, subtract } from '../arithmetic/rational.ts'
import type { SetOfIntegers } from '../sets/definition.ts'
import { classEdge } from './class-edge.ts'
import type { SeriesPoint } from './dirichlet.ts'
import { dirichletSeries } from './families.ts'
import { logZetaUpper, roundUp } from './majorants.ts'
import { distinctFactorPowerSum } from './prime-power-sums.ts'
import { type SymmetricKind, symmetricFunction } from './symmetric.ts'

/**
 * D(1 + t) near t = 0, its singularity made explicit: with x = t/eps and L = log(1/x)
 *   t^pole D(1+t) = sum over i <= logs of L^i/i! parts[logs - i](t),
 * every part analytic about [0, eps] (P-2, P-3).
 */
export interface EdgeSeries {
  readonly pole: 0 | 1
  readonly logs: number
  /**
   * parts[0 … logs], and perhaps more, at a point whose `logExcess` is log eps in place of log t: this takes the logarithm log(1/x) out of P(s),
   * and Newton's identities turn that into the factor exp(-z L) of the generating function.
   * *Claim*: contains them. *Valid for*: t > 0. *Bound*: P-2.
   */
  parts<N>(at: SeriesPoint<N>): N[]
  /**
   * *Claim*: |parts[c](t)| <= result[c] for |t| + |t - eps| <= 2 reach + eps. *Valid for*: 0 < reach < 1/2, 0 < eps <= 1; refuses what
   * is beyond `room`. *Bound*: P-3, P-9. *Rounding*: up.
   */
  partBounds<N>(eps: Rational, reach: Rational, arithmetic: Arithmetic<N>): Rational[]
  /** Where the parts are known to be analytic only in a disc about t = 0: its radius, which eps + reach must not exceed (P-9). */
  room?<N>(arithmetic: Arithmetic<N>): Rational
}

/** The edge of a set's series at s = 1; null where it has none. */
export function edgeSeries(set: SetOfIntegers): EdgeSeries | null {
  switch (set.kind) {
    case 'primes':
      return primeEdge('complete', 1, set.exclude, false)
    case 'almost-primes':
      return primeEdge('complete', set.k, set.exclude, false)
    case 'squarefree-almost-primes':
      return primeEdge('elementary', set.k, set.exclude, false)
    case 'distinct-prime-factors':
      return primeEdge('elementary', set.k, set.exclude, true)
    case 'integers':
    case 'squarefree':
    case 'smooth': {
      const series = dirichletSeries(set, ONE)
      if (!series) return null
      return { pole: series.pole, logs: 0, parts: (at) => [series.evaluate(at)], partBounds: (_, reach) => [plainBound(set, reach)] }
    }
    case 'residue-class':
      return classEdge(set)
    case 'finite':
      return null
  }
}

function primeEdge(kind: SymmetricKind, k: number, exclude: readonly number[], distinct: boolean): EdgeSeries {
  const name = `edge:${kind}:${distinct}:${exclude.join()}`
  return {
    pole: 0,
    logs: k,
    parts<N>(at: SeriesPoint<N>): N[] {
      const { shared, context } = at.point
      const [known, sums] = [shared.get(name) ?? [], shared.get(`sums of ${name}`) ?? []]
      shared.set(name, known).set(`sums of ${name}`, sums)
      const powerSum = (j: number): N => (sums[j] ??= distinct ? distinctFactorPowerSum(at, j, exclude) : at.value(j, exclude))
      symmetricFunction(context.arithmetic, kind, powerSum, known, k)
      return known
    },
    partBounds: (eps, reach) => generatingBounds(powerSumBounds(k, exclude, distinct, eps, reach)),
  }
}

/** Above |log(t zeta(1+t))| in the ellipse (P-3). */
const LOG_OF_REGULAR_ZETA = rational(33, 10)
/** Above sum over m >= 3 of log zeta(m/2)/m (P-3). */
const LOG_ZETA_REST = rational(7, 10)
/** Above log zeta(3/2). */
const LOG_ZETA_THREE_HALVES = rational(97, 100)
/** Above 1/(1 - 2^(-1/2)), and 2^(-1/2). */
const LEAST_PRIME_FACTOR = rational(34143, 10_000)
const ROOT_HALF = rational(70711, 100_000)

/** Bounds of the power sums p_1 (without its logarithm), p_2, …, p_k where Re t >= -reach, index 0 unused (P-3). */
function powerSumBounds(k: number, exclude: readonly number[], distinct: boolean, eps: Rational, reach: Rational): Rational[] {
  const logZeta2 = logZetaUpper(subtract(ONE, multiply(rational(2), reach)))
  // log(1/eps) <= log(1 + 1/eps).
  let first = [logZetaUpper(eps), multiply(rational(1, 2), logZeta2), LOG_OF_REGULAR_ZETA, LOG_ZETA_REST].reduce(add)
  for (const p of exclude) first = add(first, rational(1n, isqrt(BigInt(p))))
  const bounds = [ZERO, first]
  for (let j = 2; j <= k; j++) bounds.push(j === 2 ? logZeta2 : j === 3 ? LOG_ZETA_THREE_HALVES : primeZetaUpper(j))
  if (!distinct) return bounds
  // sum over p of |p^s - 1|^-j <= (1 - 2^(-1/2))^-j sum p^(-j Re s); for j = 1 only what the P(js), j >= 2, add to P(s).
  let factor = LEAST_PRIME_FACTOR
  bounds[1] = add(first, multiply(factor, logZeta2))
  for (let j = 2; j <= k; j++) {
    factor = roundUp(multiply(factor, LEAST_PRIME_FACTOR))
    bounds[j] = roundUp(multiply(factor, bounds[j]))
  }
  return bounds
}

/** P(j/2) <= zeta(j/2) - 1 <= 2^(-j/2) (j+2)/(j-2), j >= 4. */
function primeZetaUpper(j: number): Rational {
  const power = rational(1n, 1n << BigInt(j >> 1))
  return multiply(multiply(power, j % 2 === 1 ? ROOT_HALF : ONE), rational(j + 2, j - 2))
}

/** Units after the point in which the coefficients below are kept. */
const BOUND_BITS = 64

/**
 * The coefficients of exp(sum q_j z^j/j), by k h_k = sum q_j h_(k-j): they bound those with any p_j, |p_j| <= q_j, of any sign.
 * In integers rounded up.
 */
function generatingBounds(q: readonly Rational[]): Rational[] {
  const units = q.map((one) => ceilScaled(one, BOUND_BITS))
  const bounds = [1n << BigInt(BOUND_BITS)]
  for (let k = 1; k < q.length; k++) {
    let total = 0n
    for (let j = 1; j <= k; j++) total += units[j] * bounds[k - j]
    bounds.push(ceilDivide(total, BigInt(k) << BigInt(BOUND_BITS)))
  }
  return bounds.map((bound) => dyadic(bound, BOUND_BITS))
}

/** Above |t zeta(1+t)| and |t| in the ellipse (P-3). */
const REGULAR_ZETA = rational(4)
const LARGEST_T = rational(3, 2)

function plainBound(set: Extract<SetOfIntegers, { kind: 'integers' | 'squarefree' | 'smooth' }>, reach: Rational): Rational {
  if (set.kind === 'smooth') {
    const primes = primesUpTo(set.y).filter((p) => !set.exclude.includes(p))
    return primes.reduce((product, p) => roundUp(multiply(product, inverseFactor(p))), ONE)
  }
  let bound = REGULAR_ZETA
  if (set.kind === 'integers') {
    for (const p of set.exclude) bound = roundUp(multiply(bound, add(ONE, rational(1n, isqrt(BigInt(p))))))
  } else {
    for (const p of set.exclude) bound = roundUp(multiply(bound, inverseFactor(p)))
    // |1/zeta(2s)| <= zeta(2 - 2 reach) <= 1 + 1/(1 - 2 reach).
    bound = multiply(bound, add(ONE, divide(ONE, subtract(ONE, multiply(rational(2), reach)))))
  }
  return add(bound, LARGEST_T)
}

/** Above 1/(1 - p^(-1/2)): the root is taken of p 2^40 and rounded down. */
function inverseFactor(p: number): Rational {
  const root = rational(isqrt(BigInt(p) << 40n), 1n << 20n)
  return divide(root, subtract(root, ONE))
}
