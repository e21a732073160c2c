import type { SetKind } from '../../../../shared/engine/sets/definition.ts'

/** The sets of integers in words, in the order in which they are offered. */
export const SET_WORDS: Record<SetKind, string> = {
  primes: 'Primes',
  'almost-primes': 'Integers with exactly k prime factors',
  'squarefree-almost-primes': 'Products of k distinct primes',
  'distinct-prime-factors': 'Integers with exactly k distinct prime factors',
  integers: 'All integers from 2 on',
  squarefree: 'Squarefree integers from 2 on',
  smooth: 'Integers without a prime factor above y',
  'residue-class': 'Primes in a residue class',
  finite: 'A finite list of integers',
}
