import { isPrime } from '../arithmetic/primes.ts'
import { EngineRefusal } from '../errors.ts'
import { FACTOR_SIEVE_LIMIT, allFactors, distinctFactors, sieveFactors } from '../sieve/factor-sieve.ts'
import { forEachPrime } from '../sieve/prime-counts.ts'
import type { SetOfIntegers } from './definition.ts'
import { leastProducts, smoothUpTo } from './enumerate-products.ts'

/**
 * Calls `visit` with every member n <= upTo of a set, ascending.
 * *Claim*: exact. *Valid for*: canonical sets, 0 <= upTo < 2^32. *Bound*: S-1, S-6.
 */
export function forEachMember(set: SetOfIntegers, upTo: number, visit: (n: number) => void): void {
  if (!Number.isInteger(upTo) || upTo < 0 || upTo > FACTOR_SIEVE_LIMIT) {
    throw new EngineRefusal('out_of_range', 'upTo', `Members are listed up to a whole number from 0 to ${FACTOR_SIEVE_LIMIT}.`)
  }
  switch (set.kind) {
    case 'primes':
      return primes(set.exclude, upTo, visit)
    case 'residue-class':
      return primes(set.exclude, upTo, visit, { modulus: set.modulus, residue: set.residue })
    case 'smooth':
      return smoothUpTo(set.y, set.exclude, upTo).forEach(visit)
    case 'finite':
      return set.members.filter((text) => BigInt(text) <= BigInt(upTo)).forEach((text) => visit(Number(text)))
    default:
      return byFactors(set, upTo, visit)
  }
}

/** All members n <= upTo, ascending; see `forEachMember`. */
export function membersUpTo(set: SetOfIntegers, upTo: number): number[] {
  const members: number[] = []
  forEachMember(set, upTo, (n) => members.push(n))
  return members
}

/** Most members that a page may ask for. */
export const MOST_MEMBERS = 1_000

/**
 * The least `count` members of a set, ascending, as decimal strings; fewer where the set has no more. Found without a table of
 * the integers between them, so that those with 60 prime factors come as quickly as the primes.
 */
export function firstMembers(set: SetOfIntegers, count: number): string[] {
  if (!Number.isInteger(count) || count < 1 || count > MOST_MEMBERS) {
    throw new EngineRefusal('out_of_range', 'count', `The number of members must be from 1 to ${MOST_MEMBERS}.`)
  }
  switch (set.kind) {
    case 'finite':
      return set.members.slice(0, count)
    case 'almost-primes':
    case 'squarefree-almost-primes':
    case 'distinct-prime-factors':
    case 'smooth':
      return leastProducts(set, count).map(String)
    default:
      return growing(set, count)
  }
}

/** Up to a bound that doubles until there are enough: these sets are not so thin that this takes long. */
function growing(set: SetOfIntegers, count: number): string[] {
  for (let upTo = 64 + 16 * count; ; upTo *= 2) {
    const members = membersUpTo(set, Math.min(upTo, FACTOR_SIEVE_LIMIT))
    if (members.length >= count || upTo >= FACTOR_SIEVE_LIMIT) return members.slice(0, count).map(String)
  }
}

/** Whether n is a member: by factoring it, for n < 2^53 that a person types. */
export function isMember(set: SetOfIntegers, n: number): boolean {
  if (!Number.isSafeInteger(n) || n < 2) return false
  if (set.kind === 'finite') return set.members.includes(String(n))
  if (set.exclude.some((p) => n % p === 0)) return false
  switch (set.kind) {
    case 'integers':
      return true
    case 'primes':
      return isPrime(n)
    case 'residue-class':
      return n % set.modulus === set.residue % set.modulus && isPrime(n)
  }
  const exponents: number[] = []
  let [rest, largest] = [n, 1]
  for (let d = 2; d * d <= rest; d++) {
    if (rest % d !== 0) continue
    let exponent = 0
    for (; rest % d === 0; rest /= d) exponent++
    exponents.push(exponent)
    largest = d
  }
  if (rest > 1) {
    exponents.push(1)
    largest = rest
  }
  const all = exponents.reduce((sum, e) => sum + e, 0)
  const free = all === exponents.length
  switch (set.kind) {
    case 'almost-primes':
      return all === set.k
    case 'squarefree-almost-primes':
      return free && all === set.k
    case 'distinct-prime-factors':
      return exponents.length === set.k
    case 'squarefree':
      return free
    case 'smooth':
      return largest <= set.y
  }
}

function primes(exclude: readonly number[], upTo: number, visit: (n: number) => void, residueClass?: { modulus: number; residue: number }): void {
  const excluded = new Set(exclude)
  forEachPrime(0, upTo, (p) => excluded.has(p) || visit(p), { residueClass })
}

type FactorSet = Extract<SetOfIntegers, { kind: 'almost-primes' | 'squarefree-almost-primes' | 'distinct-prime-factors' | 'integers' | 'squarefree' }>

function byFactors(set: FactorSet, upTo: number, visit: (n: number) => void): void {
  const wanted = codeTest(set)
  sieveFactors(
    1,
    upTo,
    (codes, first, count) => {
      // What an excluded prime divides has the code 0.
      for (let i = 0; i < count; i++) if (codes[i] !== 0 && wanted(codes[i])) visit(first + i)
    },
    set.exclude,
  )
}

function codeTest(set: FactorSet): (code: number) => boolean {
  switch (set.kind) {
    case 'integers':
      return () => true
    case 'squarefree':
      return (code) => allFactors(code) === distinctFactors(code)
    case 'almost-primes':
      return (code) => allFactors(code) === set.k
    case 'squarefree-almost-primes':
      return (code) => allFactors(code) === set.k && distinctFactors(code) === set.k
    case 'distinct-prime-factors':
      return (code) => distinctFactors(code) === set.k
  }
}
