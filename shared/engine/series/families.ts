import { primesUpTo, isPrime } from '../arithmetic/primes.ts'
import { ONE, type Rational, compare } from '../arithmetic/rational.ts'
import type { SetOfIntegers } from '../sets/definition.ts'
import type { DirichletSeries, SeriesPoint } from './dirichlet.ts'
import { almostPrimeMajorant, distinctFactorMajorant, integerMajorant, smoothMajorant } from './majorants.ts'
import { distinctFactorPowerSum } from './prime-power-sums.ts'
import { residueClassSeries } from './residue-class.ts'
import { type SymmetricKind, symmetricFunction } from './symmetric.ts'

/** The first `count` primes that are not excluded. */
export function leastPrimes(exclude: readonly number[], count: number): bigint[] {
  const found: bigint[] = []
  for (let n = 2; found.length < count; n++) if (isPrime(n) && !exclude.includes(n)) found.push(BigInt(n))
  return found
}

const product = (factors: readonly bigint[]): bigint => factors.reduce((a, b) => a * b, 1n)

/** Primes not excluded: P(s) less finitely many terms. */
export function primeSeries(exclude: readonly number[], power: Rational): DirichletSeries {
  return {
    pole: 0,
    leastMember: leastPrimes(exclude, 1)[0],
    majorant: almostPrimeMajorant(power, 1),
    evaluate: (at) => at.value(1, exclude),
  }
}

/** Products of k primes, with or without repetition: complete or elementary symmetric functions of the p^-s (Z-4). */
export function primeProductSeries(kind: SymmetricKind, k: number, exclude: readonly number[], power: Rational): DirichletSeries {
  const least = leastPrimes(exclude, k)
  const name = `${kind}:${exclude.join()}`
  return {
    pole: 0,
    leastMember: kind === 'complete' ? least[0] ** BigInt(k) : product(least),
    majorant: almostPrimeMajorant(power, k),
    evaluate: (at) => symmetricAt(at, name, kind, (j) => at.value(j, exclude), k),
  }
}

/** Exactly k distinct primes, each to any power >= 1: elementary symmetric functions of 1/(p^s - 1) (Z-4, Z-5). */
export function distinctFactorSeries(k: number, exclude: readonly number[], power: Rational): DirichletSeries {
  const name = `distinct:${exclude.join()}`
  return {
    pole: 0,
    leastMember: product(leastPrimes(exclude, k)),
    majorant: distinctFactorMajorant(power, k),
    evaluate: (at) => symmetricAt(at, name, 'elementary', (j) => distinctFactorPowerSum(at, j, exclude), k),
  }
}

function symmetricAt<N>(at: SeriesPoint<N>, name: string, kind: SymmetricKind, powerSum: (j: number) => N, k: number): N {
  const { shared, context } = at.point
  const known = shared.get(name) ?? []
  shared.set(name, known)
  const sums = shared.get(`sums of ${name}`) ?? []
  shared.set(`sums of ${name}`, sums)
  return symmetricFunction(context.arithmetic, kind, (j) => (sums[j] ??= powerSum(j)), known, k)
}

/** Integers n >= 2 coprime to the excluded primes: zeta(s) times 1 - p^-s over these, less 1 (Z-6). */
export function integerSeries(exclude: readonly number[], power: Rational): DirichletSeries {
  return withoutOne(exclude, power, (at) => {
    const { arithmetic, one } = at.point.context
    const factors = exclude.map((p) => arithmetic.subtract(one, at.point.primePower(p, 1)))
    return factors.reduce((total, factor) => arithmetic.multiply(total, factor), at.point.zetaTimesExcess())
  })
}

/** Squarefree integers n >= 2 coprime to the excluded primes: zeta(s)/zeta(2s) over the product of 1 + p^-s, less 1 (Z-6). */
export function squarefreeSeries(exclude: readonly number[], power: Rational): DirichletSeries {
  return withoutOne(exclude, power, (at) => {
    const { arithmetic, one } = at.point.context
    const factors = exclude.map((p) => arithmetic.add(one, at.point.primePower(p, 1)))
    const whole = arithmetic.divide(at.point.zetaTimesExcess(), at.point.zeta(2))
    return factors.reduce((total, factor) => arithmetic.divide(total, factor), whole)
  })
}

/** A set of integers >= 2 whose series, 1 included, is Z(s) with a simple pole at 1; `regular` encloses (s-1) Z(s). */
function withoutOne(exclude: readonly number[], power: Rational, regular: <N>(at: SeriesPoint<N>) => N): DirichletSeries {
  const pole = compare(power, ONE) === 0 ? 1 : 0
  return {
    pole,
    leastMember: leastPrimes(exclude, 1)[0],
    majorant: integerMajorant(power),
    evaluate(at) {
      const { context, excess } = at.point
      const difference = context.arithmetic.subtract(regular(at), excess)
      return pole === 1 ? difference : context.arithmetic.divide(difference, excess)
    },
  }
}

/** Integers n >= 2 all of whose prime factors are <= y and not excluded: a finite Euler product, less 1 (Z-6). */
export function smoothSeries(y: number, exclude: readonly number[]): DirichletSeries {
  const primes = primesUpTo(y).filter((p) => !exclude.includes(p))
  return {
    pole: 0,
    leastMember: BigInt(primes[0]),
    majorant: smoothMajorant(primes),
    evaluate(at) {
      const { arithmetic, one } = at.point.context
      const powers = arithmetic.vector(primes.map((p) => at.point.primePower(p, 1)))
      return arithmetic.subtract(arithmetic.divide(one, arithmetic.eulerProduct(powers, primes.length)), one)
    },
  }
}

/** The series of a set for weights with the power s0 >= 1; null where the set has none of this form. */
export function dirichletSeries(set: SetOfIntegers, power: Rational): DirichletSeries | null {
  switch (set.kind) {
    case 'primes':
      return primeSeries(set.exclude, power)
    case 'almost-primes':
      return primeProductSeries('complete', set.k, set.exclude, power)
    case 'squarefree-almost-primes':
      return primeProductSeries('elementary', set.k, set.exclude, power)
    case 'distinct-prime-factors':
      return distinctFactorSeries(set.k, set.exclude, power)
    case 'integers':
      return integerSeries(set.exclude, power)
    case 'squarefree':
      return squarefreeSeries(set.exclude, power)
    case 'smooth':
      return smoothSeries(set.y, set.exclude)
    case 'residue-class':
      return residueClassSeries(set.modulus, set.residue, set.exclude, power)
    case 'finite':
      return null
  }
}
