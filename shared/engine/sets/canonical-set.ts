import { LIMITS } from '../../limits.ts'
import { gcd } from '../arithmetic/integers.ts'
import { isPrime, primesUpTo } from '../arithmetic/primes.ts'
import { EngineRefusal } from '../errors.ts'
import type { SetOfIntegers } from './definition.ts'

/** Primes, ascending, without repetition; refuses what is no prime and what is too much. */
export function canonicalExclusions(exclude: readonly number[]): number[] {
  const bad = exclude.find((p) => !Number.isSafeInteger(p) || p > LIMITS.excludedPrime || !isPrime(p))
  if (bad !== undefined) {
    const reason = Number.isSafeInteger(bad) && bad > LIMITS.excludedPrime ? `is above ${LIMITS.excludedPrime}` : 'is not a prime'
    throw new EngineRefusal('not_a_prime', 'exclude', `${bad} ${reason}: list primes to exclude, such as 2, 3.`)
  }
  const sorted = [...new Set(exclude)].sort((a, b) => a - b)
  if (sorted.length > LIMITS.exclusions) {
    throw new EngineRefusal('too_many_exclusions', 'exclude', `At most ${LIMITS.exclusions} primes can be excluded.`)
  }
  return sorted
}

function wholeNumber(value: number, field: string, least: number, most: number, what: string): number {
  if (!Number.isSafeInteger(value) || value < least || value > most) {
    throw new EngineRefusal('out_of_range', field, `${what} must be a whole number from ${least} to ${most}.`)
  }
  return value
}

/** A number of prime factors from 1 on; with 0 of them there is only n = 1, where log n is 0. */
function factorCount(k: number): number {
  if (k === 0) throw new EngineRefusal('out_of_range', 'k', 'k must be at least 1: the only integer with no prime factor is 1, and log 1 = 0.')
  return wholeNumber(k, 'k', 1, LIMITS.k, 'k')
}

/**
 * The one way to write a set, so that one number has one definition: k = 1 is the primes, a modulus 2m with m odd is the
 * modulus m, exclusions that remove nothing go. Refuses a set that is empty or finite where infinitely many members are meant.
 */
export function canonicalSet(set: SetOfIntegers): SetOfIntegers {
  if (set.kind === 'finite') return canonicalList(set.members)
  const exclude = canonicalExclusions(set.exclude)
  switch (set.kind) {
    case 'almost-primes':
    case 'squarefree-almost-primes': {
      const k = factorCount(set.k)
      return k === 1 ? { kind: 'primes', exclude } : { kind: set.kind, k, exclude }
    }
    case 'distinct-prime-factors':
      return { kind: set.kind, k: factorCount(set.k), exclude }
    case 'smooth':
      return canonicalSmooth(set.y, exclude)
    case 'residue-class':
      return canonicalClass(set.modulus, set.residue, exclude)
    default:
      return { kind: set.kind, exclude }
  }
}

/** y is the largest prime that occurs; only smaller primes are worth excluding. */
function canonicalSmooth(y: number, exclude: readonly number[]): SetOfIntegers {
  wholeNumber(y, 'y', 2, LIMITS.smoothBound, 'y')
  const primes = primesUpTo(y).filter((p) => !exclude.includes(p))
  const largest = primes[primes.length - 1]
  if (largest === undefined) throw new EngineRefusal('empty_set', 'exclude', `No prime up to ${y} is left, so that no integer n >= 2 is.`)
  return { kind: 'smooth', y: largest, exclude: exclude.filter((p) => p < largest) }
}

function canonicalClass(modulus: number, residue: number, exclude: readonly number[]): SetOfIntegers {
  wholeNumber(modulus, 'modulus', 1, LIMITS.modulus, 'The modulus')
  if (!Number.isSafeInteger(residue)) throw new EngineRefusal('out_of_range', 'residue', 'The residue must be a whole number.')
  const reduced = ((residue % modulus) + modulus) % modulus
  const common = gcd(BigInt(reduced), BigInt(modulus))
  if (common !== 1n) {
    throw new EngineRefusal('finite_class', 'residue', `${reduced} and ${modulus} have the common divisor ${common}, so that at most one prime is in the class.`)
  }
  // n = a mod 2m with m and a odd says n = a mod m and n odd.
  const halved = modulus % 4 === 2
  const m = halved ? modulus / 2 : modulus
  const all = halved ? [...new Set([2, ...exclude])].sort((a, b) => a - b) : [...exclude]
  if (m === 1) return { kind: 'primes', exclude: all }
  const r = reduced % m
  return { kind: 'residue-class', modulus: m, residue: r, exclude: all.filter((p) => p % m === r) }
}

function canonicalList(members: readonly string[]): SetOfIntegers {
  if (members.length === 0) throw new EngineRefusal('empty_set', 'members', 'The list has no members.')
  if (members.length > LIMITS.members) throw new EngineRefusal('too_many_members', 'members', `A list holds at most ${LIMITS.members} integers.`)
  const bad = members.find((text) => !/^\d{1,40}$/.test(text) || BigInt(text) < 2n)
  if (bad !== undefined) throw new EngineRefusal('not_an_integer', 'members', `"${bad.slice(0, 50)}" is no integer from 2 to 10^40.`)
  const sorted = [...new Set(members.map(BigInt))].sort((a, b) => (a < b ? -1 : a > b ? 1 : 0))
  return { kind: 'finite', members: sorted.map(String) }
}
