import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'

/** Which products of primes belong to a set. */
interface Rule {
  allowed: (p: number) => boolean
  /** Number of prime factors, or of distinct ones; null: any number of them from one on. */
  k: number | null
  counts: 'all' | 'distinct'
  /** Whether a prime may divide a member more than once. */
  powers: boolean
}

function ruleOf(set: Exclude<SetOfIntegers, { kind: 'finite' }>): Rule {
  const free = (p: number): boolean => !set.exclude.includes(p)
  switch (set.kind) {
    case 'primes':
      return { allowed: free, k: 1, counts: 'all', powers: false }
    case 'residue-class':
      return { allowed: (p) => free(p) && p % set.modulus === set.residue, k: 1, counts: 'all', powers: false }
    case 'almost-primes':
      return { allowed: free, k: set.k, counts: 'all', powers: true }
    case 'squarefree-almost-primes':
      return { allowed: free, k: set.k, counts: 'all', powers: false }
    case 'distinct-prime-factors':
      return { allowed: free, k: set.k, counts: 'distinct', powers: true }
    case 'integers':
      return { allowed: free, k: null, counts: 'all', powers: true }
    case 'squarefree':
      return { allowed: free, k: null, counts: 'all', powers: false }
    case 'smooth':
      return { allowed: (p) => p <= set.y && free(p), k: null, counts: 'all', powers: true }
  }
}

/** Members up to a bound: products are built prime by prime, ascending, and given up as soon as they must exceed it. */
function membersUpTo(bound: bigint, primes: readonly number[], rule: Rule): bigint[] {
  const members: bigint[] = []
  const extend = (product: bigint, used: number, from: number): void => {
    if (used > 0 && (rule.k === null || used === rule.k)) members.push(product)
    if (used === rule.k) return
    for (let index = from; index < primes.length; index += 1) {
      const p = BigInt(primes[index] ?? 0)
      const again = rule.powers && rule.counts === 'all'
      const missing = rule.k === null ? 1 : rule.k - used
      if (!again && index + missing > primes.length) return
      // The least that can still come: p again and again, or this prime and those after it.
      const least = again ? p ** BigInt(missing) : primes.slice(index, index + missing).reduce((all, q) => all * BigInt(q), 1n)
      if (product * least > bound) return
      extend(product * p, used + 1, again ? index : index + 1)
      if (rule.powers && !again) for (let power = p * p; product * power <= bound; power *= p) extend(product * power, used + 1, index + 1)
    }
  }
  extend(1n, 0, 0)
  return members.sort((a, b) => (a < b ? -1 : a > b ? 1 : 0))
}

/**
 * How far above the least member is looked, in 256ths of it: a little at first, since sets with many prime factors have very many
 * members within a factor of two, then twice as far each time. A set with fewer members is listed as far as the last bound.
 */
const FIRST_REACH = 1
const LAST_REACH = 2 ** 22

/** Lists that were asked for before, the newest last: pages of the same constants are read again and again. */
const known = new Map<string, string[]>()
const MOST_KNOWN = 500

/** The least members of the set that a constant sums over, as decimal text; the primes for a product over primes. */
export function firstMembers(definition: Definition, count: number): string[] {
  const set: SetOfIntegers = definition.type === 'series' ? definition.set : { kind: 'primes', exclude: definition.type === 'over-primes' ? definition.exclude : [] }
  if (set.kind === 'finite') return set.members.slice(0, count)
  const key = JSON.stringify([set, count])
  const members = known.get(key) ?? listMembers(set, count)
  known.set(key, members)
  if (known.size > MOST_KNOWN) known.delete(known.keys().next().value ?? '')
  return members
}

function listMembers(set: Exclude<SetOfIntegers, { kind: 'finite' }>, count: number): string[] {
  const rule = ruleOf(set)
  const small = primesUpTo(2_000).filter(rule.allowed)
  const factors = rule.k ?? 1
  const least = rule.counts === 'all' && rule.powers ? Array.from({ length: factors }, () => small[0] ?? 1) : small.slice(0, factors)
  const start = least.reduce((product, p) => product * BigInt(p), 1n)
  const widest = least.at(-1) ?? 1
  let members: bigint[] = []
  for (let reach = FIRST_REACH; members.length < count && reach <= LAST_REACH; reach *= 2) {
    const bound = start + (start * BigInt(reach)) / 256n
    // In a member up to the bound no prime exceeds the widest of the least member by more than the same ratio.
    const primes = primesUpTo(widest + Math.ceil((widest * reach) / 256)).filter(rule.allowed)
    members = membersUpTo(bound, primes, rule)
  }
  return members.slice(0, count).map(String)
}
