import { type Arithmetic, sum } from '../arithmetic/arithmetic.ts'
import { primesUpTo } from '../arithmetic/primes.ts'
import { type Rational, ONE, ZERO, add, compare, divide, multiply, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { isqrt } from '../arithmetic/integers.ts'
import { type Character, characters, upToConjugation, units } from './characters.ts'
import { createClassSums } from './class-sums.ts'
import { type Complex, logComplex, multiplyComplex, rootsOfUnity } from './complex.ts'

/** Least A for which the branch is proven. */
const LEAST_SPLIT = 50

/**
 * Logarithms of L_A(ms, chi) = L(ms, chi) prod over p <= A of (1 - chi(p) p^-ms), for one m after the other, from 1 on, and
 * one character of each conjugate pair, in the order of `LogL.characters`.
 */
export interface LogLAt<N> {
  /** Goes on from m to m + 1. */
  advance(): void
  /** The logarithms for the present m. */
  logs(): Complex<N>[]
}

export interface LogL<N> {
  readonly characters: readonly Character[]
  /** exp(2 pi i j / order), `order` being that of the characters. */
  readonly roots: readonly Complex<N>[]
  /** s >= 1 and s - 1, both enclosed, since near s = 1 the difference carries what s has lost. */
  at(s: N, sMinusOne: N): LogLAt<N>
}

/**
 * *Claim*: the branch that vanishes at s = infinity, enclosed. *Valid for*: q >= 3, A >= 50, s >= 1, where `certifyHalfPlane`
 * passes (it throws otherwise). *Bound*: L-1, L-2, L-3, L-4.
 */
export function createLogL<N>(a: Arithmetic<N>, q: number, split: number): LogL<N> {
  if (split < LEAST_SPLIT) throw new EngineRefusal('unsound_parameter', 'split', `Over a residue class the parameter split must be at least ${LEAST_SPLIT}.`)
  const chosen = upToConjugation(characters(q))
  const classes = units(q)
  const primes = primesUpTo(split).filter((p) => q % p !== 0)
  const logs = primes.map((p) => a.log(a.rational(rational(p))))
  const classSums = createClassSums(a, q)
  const order = chosen[0].order
  const roots = rootsOfUnity(a, order)

  /** L_A(ms, chi), before logarithms. */
  const valuesAt = (s: N, sMinusOne: N): { advance(): void; values(): Complex<N>[] } => {
    const sums = classSums(s, sMinusOne)
    const first = a.vector(logs.map((log) => a.exp(a.negate(a.multiply(s, log)))))
    let powers = first
    return {
      advance() {
        powers = a.multiplyVectors(powers, first)
        sums.advance()
      },
      values() {
        const h = sums.sums()
        return chosen.map((chi) => {
          let value: Complex<N> = weighted(a, roots, classes.map((c) => chi.exponents[c]), h)
          primes.forEach((p, i) => {
            const minusPower = a.negate(a.item(powers, i))
            const root = roots[chi.exponents[p % q]]
            const factor = { re: a.add(a.rational(ONE), a.multiply(root.re, minusPower)), im: a.multiply(root.im, minusPower) }
            value = multiplyComplex(a, value, factor)
          })
          return value
        })
      },
    }
  }

  certifyHalfPlane(a, q, split, (s) =>
    a.frame(() => valuesAt(a.rational(s), a.rational(add(s, rational(-1)))).values().map((z) => a.lower(z.re))),
  )
  return {
    characters: chosen,
    roots,
    at(s, sMinusOne) {
      const at = valuesAt(s, sMinusOne)
      return { advance: () => at.advance(), logs: () => at.values().map((value) => logComplex(a, value)) }
    },
  }
}

/** *Claim*: |L(1, chi)| >= result for every chi modulo q but the principal one. *Valid for*: q >= 3. *Bound*: L-1, L-2. *Rounding*: down. */
export function leastAtOne<N>(a: Arithmetic<N>, q: number): Rational {
  return a.frame(() => {
    const classes = units(q)
    const chosen = upToConjugation(characters(q))
    const roots = rootsOfUnity(a, chosen[0].order)
    const sums = createClassSums(a, q)(a.rational(ONE), a.rational(ZERO)).sums()
    const squares = chosen.map((chi) => {
      const { re, im } = weighted(a, roots, classes.map((c) => chi.exponents[c]), sums)
      return a.lower(a.add(a.multiply(re, re), a.multiply(im, im)))
    })
    const least = squares.reduce((x, y) => (compare(x, y) < 0 ? x : y))
    const bits = 32n
    return least.num <= 0n ? ZERO : rational(isqrt((least.num << (2n * bits)) / least.den), 1n << bits)
  })
}

/** sum of roots[exponents[i]] h[i], the h of one exponent added first. */
function weighted<N>(a: Arithmetic<N>, roots: readonly Complex<N>[], exponents: readonly number[], h: readonly N[]): Complex<N> {
  const byExponent = new Map<number, N[]>()
  exponents.forEach((e, i) => byExponent.set(e, [...(byExponent.get(e) ?? []), h[i]]))
  const parts = [...byExponent].map(([e, items]) => {
    const total = sum(a, items)
    return { re: a.multiply(roots[e].re, total), im: a.multiply(roots[e].im, total) }
  })
  return { re: sum(a, parts.map((p) => p.re)), im: sum(a, parts.map((p) => p.im)) }
}

/**
 * Proves that Re L_A(s, chi) > 0 for every s >= 1 and every non-principal chi, so that the principal logarithm is the branch
 * that tends to 0 at infinity (L-3): for s >= 1.3 by the size of log zeta_A, below that by steps that the derivative allows.
 */
function certifyHalfPlane<N>(a: Arithmetic<N>, q: number, split: number, realPartsLower: (s: Rational) => Rational[]): void {
  const slope = derivativeBound(a, q, split)
  let s: Rational = ONE
  while (compare(s, rational(13, 10)) < 0) {
    const least = realPartsLower(s).reduce((x, y) => (compare(x, y) < 0 ? x : y))
    const step = divide(multiply(least, rational(9, 10)), slope)
    if (compare(step, rational(1, 100_000)) < 0) throw new RangeError('the logarithm of an L-function could not be pinned down')
    // Rounded down to a short fraction, so that s stays short.
    s = add(s, rational((step.num * 1_000_000n) / step.den, 1_000_000n))
  }
}

/** An upper bound of |d/ds L_A(s, chi)| for s >= 1 and all non-principal chi modulo q >= 3 (L-3). */
function derivativeBound<N>(a: Arithmetic<N>, q: number, split: number): Rational {
  const log = (n: number): Rational => a.upper(a.log(a.rational(rational(n))))
  let size: Rational = rational(1, 2)
  let slope = divide(log(q + 1), rational(2))
  for (let n = 1; n <= q; n++) {
    size = add(size, rational(1, n))
    slope = add(slope, divide(n === 1 ? ZERO : log(n), rational(n)))
  }
  let product: Rational = ONE
  let logarithmic: Rational = ZERO
  for (const p of primesUpTo(split)) {
    product = multiply(product, rational(p + 1, p))
    logarithmic = add(logarithmic, divide(log(p), rational(p + 1)))
  }
  return shortUpper(multiply(product, add(slope, multiply(size, logarithmic))))
}

/** A fraction with a short denominator above x. */
function shortUpper(x: Rational): Rational {
  return rational((x.num * 1_000n) / x.den + 1n, 1_000n)
}
