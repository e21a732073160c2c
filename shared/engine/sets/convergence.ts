import { abs, max } from '../arithmetic/integers.ts'
import { type Polynomial, combine, valueAt } from '../arithmetic/polynomial.ts'
import { isPrime } from '../arithmetic/primes.ts'
import { ONE, type Rational, ZERO, compare, parseRational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Definition, OverPrimesDefinition, SetOfIntegers } from './definition.ts'

/** How dense a set is at the edge of convergence, s = 1: what its sum of 1/n (log n)^-b needs of b. */
type Density = 'thin' | 'primes' | 'integers'

function density(set: SetOfIntegers): Density {
  switch (set.kind) {
    case 'smooth':
    case 'finite':
      return 'thin'
    case 'integers':
    case 'squarefree':
      return 'integers'
    default:
      return 'primes'
  }
}

/** The condition under which sums over the set converge, in words: shown beside its definition. */
export function convergenceCondition(set: SetOfIntegers): string {
  switch (density(set)) {
    case 'thin':
      return set.kind === 'finite' ? 'a finite sum' : 'converges for every power s >= 1 and every b'
    case 'integers':
      return 'converges for s > 1, and for s = 1 when b > 1'
    case 'primes':
      return 'converges for s > 1, and for s = 1 when b > 0'
  }
}

/**
 * Throws EngineRefusal where the sum or product of a definition with canonical parts does not converge. (C-1: at s = 1 by
 * comparison with the integral of the set's density, from the prime number theorem's order of magnitude.)
 */
export function requireConvergence(definition: Definition): void {
  if (definition.type === 'over-primes') requireOverPrimes(definition)
  if (definition.type !== 'series') return
  const power = parseRational(definition.weight.power)
  const logPower = parseRational(definition.weight.logPower)
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  const reason = divergence(definition.set, power, logPower)
  if (reason) throw new EngineRefusal('diverges', 'logPower', reason)
}

function divergence(set: SetOfIntegers, power: Rational, logPower: Rational): string | null {
  if (compare(power, ONE) > 0) return null
  switch (density(set)) {
    case 'thin':
      return null
    case 'integers':
      return compare(logPower, ONE) > 0 ? null : 'The sum diverges: over this set, with n to the power 1, the power of the logarithm must be above 1.'
    case 'primes':
      return compare(logPower, ZERO) > 0 ? null : 'The sum diverges: over this set, with n to the power 1, the power of the logarithm must be above 0.'
  }
}

/** f(p), in a product f(p) - 1, must fall like 1/p^2; f must have no pole at a prime, and no zero there in a product. */
function requireOverPrimes({ numerator, denominator, combine: way, exclude }: OverPrimesDefinition): void {
  const [top, bottom] = [numerator.map(BigInt), denominator.map(BigInt)]
  const falling = way === 'sum' ? top : combine(1n, top, -1n, bottom)
  if (falling.length === 0) throw new EngineRefusal('trivial', 'expression', `The expression is ${way === 'sum' ? 0 : 1} for every prime, and so is the ${way}.`)
  if (bottom.length - falling.length < 2) {
    const need = way === 'sum' ? 'the expression must fall at least like 1/p^2' : 'the expression must differ from 1 by at most about 1/p^2'
    throw new EngineRefusal('diverges', 'expression', `The ${way} does not converge: ${need}.`)
  }
  const included = (p: number): boolean => !exclude.includes(p)
  const pole = primeRoots(bottom).find(included)
  if (pole !== undefined) {
    throw new EngineRefusal('pole_at_prime', 'expression', `The expression has a pole at p = ${pole}: exclude this prime.`)
  }
  const zero = way === 'product' ? primeRoots(top).find(included) : undefined
  if (zero !== undefined) {
    throw new EngineRefusal('zero_factor', 'expression', `The factor at p = ${zero} is 0, and so is the product: exclude this prime.`)
  }
}

const LARGEST_ROOT = 1_000_000n

/**
 * The primes at which a polynomial with integer coefficients vanishes. Such a prime divides the lowest coefficient that is not
 * 0, and is at most Cauchy's bound of the roots, 1 + the largest quotient of a coefficient by the leading one.
 */
function primeRoots(polynomial: Polynomial): number[] {
  const nonzero = polynomial.filter((c) => c !== 0n).map(abs)
  if (nonzero.length < 2) return []
  const bound = nonzero.reduce(max) / nonzero[nonzero.length - 1] + 2n
  if (bound > LARGEST_ROOT) throw new EngineRefusal('out_of_range', 'expression', 'The coefficients are too far apart to exclude a pole at a prime.')
  const roots: number[] = []
  for (let p = 2n; p <= bound; p++) {
    if (nonzero[0] % p === 0n && isPrime(Number(p)) && valueAt(polynomial, p) === 0n) roots.push(Number(p))
  }
  return roots
}
