/**
 * The exact definition of a constant, as data. Only canonical definitions (see `canonicalDefinition`) are stored, compared
 * and certified: one number, one definition. Rationals are written in lowest terms: "1", "1/2", "-3".
 */

/** A set of integers. `exclude` lists primes, ascending, without repetition; members are coprime to each of them. */
export type SetOfIntegers =
  | { kind: 'primes'; exclude: number[] }
  /** Exactly k prime factors, counted with multiplicity; k >= 2 (k = 1 is `primes`). */
  | { kind: 'almost-primes'; k: number; exclude: number[] }
  /** Products of k distinct primes; k >= 2. */
  | { kind: 'squarefree-almost-primes'; k: number; exclude: number[] }
  /** Exactly k distinct prime factors, each to any power >= 1; k >= 1 (k = 1: the prime powers). */
  | { kind: 'distinct-prime-factors'; k: number; exclude: number[] }
  /** All integers n >= 2 coprime to the excluded primes. */
  | { kind: 'integers'; exclude: number[] }
  /** All squarefree integers n >= 2 coprime to the excluded primes. */
  | { kind: 'squarefree'; exclude: number[] }
  /** Integers n >= 2 all of whose prime factors are <= y. */
  | { kind: 'smooth'; y: number; exclude: number[] }
  /** Primes congruent to `residue` modulo `modulus`; gcd(residue, modulus) = 1. */
  | { kind: 'residue-class'; modulus: number; residue: number; exclude: number[] }
  /** A finite list of distinct integers >= 2, ascending, as decimal strings. */
  | { kind: 'finite'; members: string[] }

export type SetKind = SetOfIntegers['kind']

/** n^-power (log n)^-logPower, both rationals. */
export interface Weight {
  power: string
  logPower: string
}

/** Sum of the weight over the members of the set. */
export interface SeriesDefinition {
  type: 'series'
  set: SetOfIntegers
  weight: Weight
}

/** Sum over the primes of f(p), or product of f(p), f a rational function with rational coefficients. */
export interface OverPrimesDefinition {
  type: 'over-primes'
  /** f in lowest terms: integer coefficients as decimal strings, ascending powers of p, leading one of the denominator positive. */
  numerator: string[]
  denominator: string[]
  combine: 'sum' | 'product'
  exclude: number[]
}

/** Constants over the primes that are no plain sum or product of a rational function, e.g. the Mertens constant. */
export interface NamedDefinition {
  type: 'named'
  name: 'mertens'
}

export type Definition = SeriesDefinition | OverPrimesDefinition | NamedDefinition
