import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { steadyExp, steadyLog } from '../arithmetic/steady.ts'
import { ONE, type Rational, ZERO, compare, negate, rational, subtract } from '../arithmetic/rational.ts'
import { type RationalWeight, negativePower } from '../sieve/weight.ts'
import type { Interval } from './prime-tail.ts'

/** Sums up to the cut-off over the integers n >= 2 whose prime factors are all in the list, in the order of `weightsFor`. */
export type SmoothSums = readonly Interval[]

/** The weights whose sums up to the cut-off the bound needs: w itself, n^-s, n^-s log n, and n^-(s-decay) where decay > 0. */
export function weightsFor({ power, logPower }: RationalWeight, decay: Rational): RationalWeight[] {
  const basis = [{ power, logPower }, { power, logPower: ZERO }, { power, logPower: rational(-1) }]
  return decay.num === 0n ? basis : [...basis, { power: subtract(power, decay), logPower: ZERO }]
}

/**
 * The sum of w(n) = n^-s (log n)^-b over the integers n > x whose prime factors are all among `primes`. With T and M the sums of n^-s
 * and n^-s log n over these n, known from Euler products and the sums up to x, it is at least T (M/T)^-b and at most
 * x^-decay (log x)^-b times the sum of n^-(s-decay).
 * *Claim*: the interval contains it; null where n^-decay (log n)^-b may still grow at x. *Valid for*: x >= 3, 0 <= decay < s; b >= 0 or
 * b <= -1. *Bound*: S-11.
 */
export function smoothTail<N>(
  arithmetic: Arithmetic<N>,
  { power, logPower }: RationalWeight,
  x: number,
  primes: readonly number[],
  decay: Rational,
  upTo: SmoothSums,
): Interval | null {
  return arithmetic.frame(() => {
    const { add, subtract: minus, multiply } = arithmetic
    const logX = arithmetic.log(arithmetic.rational(rational(x)))
    const falls = decay.num === 0n ? logPower.num >= 0n : compare(arithmetic.lower(arithmetic.scale(logX, decay)), negate(logPower)) >= 0
    if (!falls) return null
    const one = arithmetic.rational(ONE)
    const known = upTo.map(({ lo, hi }) => arithmetic.between(lo, hi))
    const { product, logDerivative } = eulerProduct(arithmetic, primes, power)
    const t = minus(minus(product, one), known[1])
    const m = minus(multiply(product, logDerivative), known[2])
    const rest = decay.num === 0n ? t : minus(minus(eulerProduct(arithmetic, primes, subtract(power, decay)).product, one), known[3])
    const first = arithmetic.timesExp(negativePower(arithmetic, logX, logPower), arithmetic.scale(logX, negate(decay)))
    const hi = arithmetic.upper(multiply(rest, first))
    const positive = [t, m].every((value) => arithmetic.lower(value).num > 0n)
    const lo = positive ? arithmetic.lower(multiply(t, negativePower(arithmetic, arithmetic.divide(m, t), logPower))) : ZERO
    return { lo: lo.num > 0n ? lo : ZERO, hi: hi.num > 0n ? hi : ZERO }

    /** prod 1/(1 - p^-sigma), and the sum of log p/(p^sigma - 1). */
    function eulerProduct(a: Arithmetic<N>, over: readonly number[], sigma: Rational): { product: N; logDerivative: N } {
      let [product, logDerivative] = [one, a.rational(ZERO)]
      for (const p of over) {
        const logP = a.log(a.rational(rational(p)))
        const rest = minus(one, a.exp(a.scale(logP, negate(sigma))))
        product = a.divide(product, rest)
        // p^-sigma/(1 - p^-sigma) = 1/(1 - p^-sigma) - 1
        logDerivative = add(logDerivative, multiply(logP, minus(a.divide(one, rest), one)))
      }
      return { product, logDerivative }
    }
  })
}

/** Decays are multiples of this. heuristic: affects width only */
const DECAY_STEPS = 64

/** The least decay that serves all weights at x; null where there is none. heuristic: affects width only */
export function chooseDecay(weights: readonly { power: number; logPower: number }[], x: number): Rational | null {
  const needed = Math.max(0, ...weights.map(({ logPower }) => (-logPower / steadyLog(x)) * 1.001))
  const steps = Math.ceil(needed * DECAY_STEPS)
  return weights.every(({ power }) => steps / DECAY_STEPS < power - 1 / 256) ? rational(steps, DECAY_STEPS) : null
}

/**
 * About half the width of the tail: T, by the best of Rankin's bounds x^-d prod 1/(1 - p^-(s-d)), which is several times too large,
 * times the share by which log n differs from log x. heuristic: affects choice only
 */
export function smoothTailRadius({ power, logPower }: { power: number; logPower: number }, x: number, primes: readonly number[]): number {
  const logX = steadyLog(x)
  const logs = primes.map(steadyLog)
  const exponentAt = (steps: number): number => {
    const d = steps / DECAY_STEPS
    return logs.reduce((exponent, log) => exponent - steadyLog(1 - steadyExp((d - power) * log)), -d * logX - logPower * steadyLog(logX))
  }
  // A convex function of d: the least value is where it begins to grow.
  let [least, most] = [1, Math.max(1, Math.ceil(power * DECAY_STEPS) - 1)]
  while (least < most) {
    const middle = Math.floor((least + most) / 2)
    if (exponentAt(middle) <= exponentAt(middle + 1)) most = middle
    else least = middle + 1
  }
  return (steadyExp(exponentAt(least)) / 4) * Math.min(1, Math.abs(logPower) / logX) + 1e-30
}
