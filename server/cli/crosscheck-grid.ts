import { canonicalDefinition, type DefinitionText } from '../../shared/engine/sets/canonical.ts'
import { loadExpressionParser } from '../../shared/engine/sets/rational-function.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'

const sets: SetOfIntegers[] = [
  { kind: 'primes', exclude: [] },
  { kind: 'primes', exclude: [2] },
  { kind: 'primes', exclude: [3, 101] },
  { kind: 'almost-primes', k: 2, exclude: [] },
  { kind: 'almost-primes', k: 3, exclude: [2] },
  { kind: 'almost-primes', k: 6, exclude: [] },
  { kind: 'squarefree-almost-primes', k: 2, exclude: [] },
  { kind: 'squarefree-almost-primes', k: 4, exclude: [5] },
  { kind: 'distinct-prime-factors', k: 1, exclude: [] },
  { kind: 'distinct-prime-factors', k: 2, exclude: [2] },
  { kind: 'integers', exclude: [] },
  { kind: 'integers', exclude: [2, 3] },
  { kind: 'squarefree', exclude: [] },
  { kind: 'smooth', y: 7, exclude: [] },
  { kind: 'smooth', y: 20, exclude: [3] },
  { kind: 'residue-class', modulus: 4, residue: 1, exclude: [] },
  { kind: 'residue-class', modulus: 5, residue: 2, exclude: [2] },
  { kind: 'finite', members: ['2', '3', '35', '1001', '999999937'] },
]

const weights = [
  { power: '1', logPower: '1' },
  { power: '1', logPower: '2' },
  { power: '1', logPower: '1/2' },
  { power: '3/2', logPower: '1' },
  { power: '2', logPower: '0' },
  { power: '2', logPower: '-1' },
]

const overPrimes: DefinitionText[] = [
  { type: 'named', name: 'mertens' },
  { type: 'named', name: 'twin-prime' },
  { type: 'named', name: 'artin' },
  { type: 'over-primes', expression: '1/(p*(p-1))', combine: 'sum', exclude: [] },
  { type: 'over-primes', expression: '1 - 5/p^2', combine: 'product', exclude: [3] },
]

/** The definitions of the cross-check: every set with every weight for which its sum converges, and constants over the primes. */
export async function crosscheckGrid(): Promise<Definition[]> {
  await loadExpressionParser()
  const series = sets.flatMap((set) => weights.map((weight): DefinitionText => ({ type: 'series', set, weight })))
  return [...series, ...overPrimes].flatMap((text) => {
    try {
      return [canonicalDefinition(text)]
    } catch {
      // A sum that diverges belongs to no method.
      return []
    }
  })
}
