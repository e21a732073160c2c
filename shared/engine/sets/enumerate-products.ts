import { isPrime, primesUpTo } from '../arithmetic/primes.ts'
import type { SetOfIntegers } from './definition.ts'

export type ProductOfPrimes = Extract<SetOfIntegers, { kind: 'almost-primes' | 'squarefree-almost-primes' | 'distinct-prime-factors' | 'smooth' }>

/** Most smooth integers that are added up one by one. */
export const MOST_SMOOTH = 1_000_000

/** How many integers smoothUpTo lists, or some number above MOST_SMOOTH where there are more. */
export function countSmooth(y: number, exclude: readonly number[], upTo: number): number {
  const primes = primesUpTo(y).filter((p) => !exclude.includes(p))
  /** Products of n with the primes from the i-th on, itself included. */
  const count = (n: number, i: number, most: number): number => {
    let total = 1
    for (let j = i; j < primes.length && n <= upTo / primes[j] && total <= most; j++) total += count(n * primes[j], j, most - total)
    return total
  }
  return count(1, 0, MOST_SMOOTH + 1) - 1
}

/** The y-smooth integers 2 <= n <= upTo coprime to the excluded primes, ascending; upTo < 2^52. *Claim*: exact. *Bound*: S-11. */
export function smoothUpTo(y: number, exclude: readonly number[], upTo: number): number[] {
  let members = [1]
  for (const p of primesUpTo(y)) {
    if (exclude.includes(p)) continue
    for (let i = 0; i < members.length; i++) if (members[i] <= upTo / p) members.push(members[i] * p)
    members = members.filter((n) => n <= upTo)
  }
  return members.filter((n) => n > 1).sort((a, b) => a - b)
}

/** Primes that are not excluded, ascending, as many as are asked for. */
class Primes {
  private readonly found: bigint[] = []
  private readonly exclude: readonly number[]
  private readonly largest: number
  private next = 2

  constructor(exclude: readonly number[], largest: number) {
    this.exclude = exclude
    this.largest = largest
  }

  /** The i-th one, counted from 0; undefined where there is none. */
  at(i: number): bigint | undefined {
    while (this.found.length <= i && this.next <= this.largest) {
      if (isPrime(this.next) && !this.exclude.includes(this.next)) this.found.push(BigInt(this.next))
      this.next++
    }
    return this.found[i]
  }
}

/**
 * The least `count` members, ascending; fewer where the set is finite. Products are searched up to a bound, prime by prime, and
 * the bound is doubled until they are enough.
 */
export function leastProducts(set: ProductOfPrimes, count: number): bigint[] {
  const primes = new Primes(set.exclude, set.kind === 'smooth' ? set.y : Infinity)
  for (let bound = leastMember(set, primes); ; bound *= 2n) {
    const members: bigint[] = []
    search(set, primes, bound, (n) => members.push(n))
    if (members.length >= count) return members.sort((a, b) => (a < b ? -1 : 1)).slice(0, count)
  }
}

function leastMember(set: ProductOfPrimes, primes: Primes): bigint {
  const first = primes.at(0)!
  if (set.kind === 'smooth') return first
  if (set.kind === 'almost-primes') return first ** BigInt(set.k)
  return Array.from({ length: set.k }, (_, i) => primes.at(i)!).reduce((product, p) => product * p)
}

/** Every member n <= bound, once, in no order. */
function search(set: ProductOfPrimes, primes: Primes, bound: bigint, visit: (n: bigint) => void): void {
  /** n is a product of the primes before index i; `left` factors are still to be chosen. */
  const extend = (n: bigint, i: number, left: number): void => {
    if (set.kind === 'smooth' ? n > 1n : left === 0) visit(n)
    if (left === 0) return
    for (let j = i; ; j++) {
      const p = primes.at(j)
      if (p === undefined || n * leastRest(set, primes, j, left) > bound) return
      if (set.kind === 'almost-primes') extend(n * p, j, left - 1)
      else if (set.kind === 'squarefree-almost-primes') extend(n * p, j + 1, left - 1)
      else for (let power = n * p; power <= bound; power *= p) extend(power, j + 1, left - 1)
    }
  }
  extend(1n, 0, set.kind === 'smooth' ? Infinity : set.k)
}

/** The least product of the factors still to be chosen where the next is the j-th prime. */
function leastRest(set: ProductOfPrimes, primes: Primes, j: number, left: number): bigint {
  const p = primes.at(j)!
  if (set.kind === 'smooth') return p
  if (set.kind === 'almost-primes') return p ** BigInt(left)
  let product = 1n
  for (let i = j; i < j + left; i++) product *= primes.at(i)!
  return product
}
