import type { ArithmeticName } from '../methods/computation.ts'
import { abs } from './integers.ts'
import { type Rational, compare, magnitude, rational, subtract } from './rational.ts'

/**
 * Real numbers enclosed by intervals. A value of type N stands for a closed interval; every operation returns an interval
 * that contains the result for every choice of members of its arguments (inclusion). Nothing else is promised about which
 * interval comes back, except by the *Bound* of the one that made it, so the methods built on this interface are correct
 * for any implementation, and only the width depends on it.
 *
 * There is no ordering on N: use `certainlyLess` and `overlaps`, for which "undecided" is an answer.
 */
export interface Arithmetic<N> {
  readonly name: ArithmeticName
  /** Bits after the binary point that results are rounded to or are better than, where they are of size about 1. */
  readonly precision: number

  rational(q: Rational): N
  /** The interval [lo, hi], rounded outward; lo <= hi. */
  between(lo: Rational, hi: Rational): N

  negate(x: N): N
  add(x: N, y: N): N
  subtract(x: N, y: N): N
  multiply(x: N, y: N): N
  /** x / y; throws RangeError where y contains 0. */
  divide(x: N, y: N): N
  /** x q for an exact q. */
  scale(x: N, q: Rational): N
  /** x widened on both sides by the largest magnitude in `error`. */
  addError(x: N, error: N): N

  exp(x: N): N
  /** y e^x without the loss of relative accuracy that a fixed point brings where e^x is tiny or huge. */
  timesExp(y: N, x: N): N
  /** Natural logarithm; throws RangeError where x contains a number <= 0. */
  log(x: N): N
  pi(): N
  log2(): N

  /** Numbers in [0, 1] handled many at once, which an implementation may store tightly. */
  vector(items: readonly N[]): Vector<N>
  /** Entry by entry products. */
  multiplyVectors(a: Vector<N>, b: Vector<N>): Vector<N>
  item(v: Vector<N>, index: number): N
  /** (sum of weights[i] v[i]) / divisor with exact integers; divisor > 0. The sum goes over the shorter of the two. */
  dot(weights: Weights, v: Vector<N>): N
  /** Product of 1 - v[i] over the first `count` entries. */
  eulerProduct(v: Vector<N>, count: number): N

  /** Exact end points: dyadic rationals. */
  lower(x: N): Rational
  upper(x: N): Rational
  /** Integers lo, hi with x in [lo, hi] 2^-precision. */
  fixedBounds(x: N): [bigint, bigint]

  /**
   * Runs `work` and releases every number made inside; `work` must return plain data. Numbers of some arithmetics live outside
   * the garbage collector: a number used after its frame has ended throws. What a cache keeps is made inside `keep`.
   */
  frame<T>(work: () => T): T
  /** Runs `work` such that the numbers made inside outlive every frame: for what is computed once and remembered. */
  keep<T>(work: () => T): T
}

/** Opaque to everybody but the arithmetic that made it. */
export interface Vector<N> {
  readonly length: number
  /** Phantom: keeps vectors of two arithmetics apart. */
  readonly of?: N
}

/** The rational weights numerators[i] / divisor, and the sum of |numerators[i]|. */
export interface Weights {
  readonly numerators: readonly bigint[]
  readonly divisor: bigint
  readonly absoluteSum: bigint
}

export function makeWeights(numerators: readonly bigint[], divisor: bigint): Weights {
  return { numerators, divisor, absoluteSum: numerators.reduce((total, n) => total + abs(n), 0n) }
}

/** Whether every member of x is less than every member of y; false says "not so or undecided". */
export function certainlyLess<N>(arithmetic: Arithmetic<N>, x: N, y: N): boolean {
  return compare(arithmetic.upper(x), arithmetic.lower(y)) < 0
}

/** Whether x and y have a member in common. */
export function overlaps<N>(arithmetic: Arithmetic<N>, x: N, y: N): boolean {
  return (
    compare(arithmetic.lower(x), arithmetic.upper(y)) <= 0 && compare(arithmetic.lower(y), arithmetic.upper(x)) <= 0
  )
}

/** Whether the exact number q lies in x. */
export function contains<N>(arithmetic: Arithmetic<N>, x: N, q: Rational): boolean {
  return compare(arithmetic.lower(x), q) <= 0 && compare(q, arithmetic.upper(x)) <= 0
}

/** The largest magnitude of a member of x, exactly. */
export function magnitudeUpper<N>(arithmetic: Arithmetic<N>, x: N): Rational {
  const [lo, hi] = [magnitude(arithmetic.lower(x)), magnitude(arithmetic.upper(x))]
  return compare(lo, hi) > 0 ? lo : hi
}

/** Half the width of x, exactly. */
export function radius<N>(arithmetic: Arithmetic<N>, x: N): Rational {
  const width = subtract(arithmetic.upper(x), arithmetic.lower(x))
  return rational(width.num, width.den * 2n)
}

/** The sum of many values. */
export function sum<N>(arithmetic: Arithmetic<N>, items: readonly N[]): N {
  return items.reduce((total, item) => arithmetic.add(total, item), arithmetic.rational({ num: 0n, den: 1n }))
}
