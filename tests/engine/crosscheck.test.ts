import { describe, expect, it } from 'vitest'
import { crosscheck, meet } from '../../server/cli/crosscheck.ts'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { add, compare, multiply, parseRational, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { SetOfIntegers } from '../../shared/engine/sets/definition.ts'

describe('the cross-check of methods and arithmetics', () => {
  it.each<[string, SetOfIntegers, string, string, number]>([
    ['odd primes', { kind: 'primes', exclude: [2] }, '1', '1', 3],
    ['primes 1 mod 4', { kind: 'residue-class', modulus: 4, residue: 1, exclude: [] }, '1', '1', 3],
    ['integers with log n above', { kind: 'integers', exclude: [] }, '2', '-1', 2],
    ['7-smooth integers', { kind: 'smooth', y: 7, exclude: [] }, '1', '2', 3],
  ])('%s: all ways meet, by at least that many methods', async (_name, set, power, logPower, methods) => {
    const { outcomes, disjoint } = await crosscheck(canonicalDefinition({ type: 'series', set, weight: { power, logPower } }))
    expect(disjoint).toEqual([])
    expect(new Set(outcomes.map(({ way }) => way.method)).size).toBeGreaterThanOrEqual(methods)
    expect(new Set(outcomes.map(({ way }) => way.arithmetic)).size).toBe(2)
    // Whatever the method, what the budget names makes up half the width of the enclosure, and not much more.
    for (const { outcome: { enclosure, budget } } of outcomes) {
      const half = multiply(subtract(parseDecimal(enclosure.hi)!, parseDecimal(enclosure.lo)!), rational(1, 2))
      const total = budget.reduce((sum, { magnitude }) => add(sum, parseRational(magnitude)!), rational(0))
      expect(compare(total, half)).toBeGreaterThanOrEqual(0)
      expect(compare(total, multiply(half, rational(3, 2)))).toBeLessThanOrEqual(0)
    }
  })

  it('tells enclosures apart that have no number in common', () => {
    const outcome = (lo: string, hi: string): Outcome => ({ enclosure: { lo, hi } }) as Outcome
    expect(meet(outcome('1.0', '1.2'), outcome('1.2', '1.3'))).toBe(true)
    expect(meet(outcome('1.0', '1.2'), outcome('1.21', '1.3'))).toBe(false)
  })
})
