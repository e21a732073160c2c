import { describe, expect, it } from 'vitest'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { compare, rational } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { firstMembers, forEachMember, isMember, membersUpTo } from '../../shared/engine/sets/enumerate.ts'
import { weightAt } from '../../shared/engine/sieve/weight.ts'

const SETS: SetOfIntegers[] = [
  { kind: 'primes', exclude: [] },
  { kind: 'primes', exclude: [2, 7] },
  { kind: 'residue-class', modulus: 4, residue: 3, exclude: [7] },
  { kind: 'residue-class', modulus: 5, residue: 2, exclude: [] },
  { kind: 'almost-primes', k: 2, exclude: [] },
  { kind: 'almost-primes', k: 3, exclude: [2] },
  { kind: 'squarefree-almost-primes', k: 2, exclude: [] },
  { kind: 'squarefree-almost-primes', k: 3, exclude: [3] },
  { kind: 'distinct-prime-factors', k: 1, exclude: [] },
  { kind: 'distinct-prime-factors', k: 2, exclude: [5] },
  { kind: 'integers', exclude: [] },
  { kind: 'integers', exclude: [2, 3] },
  { kind: 'squarefree', exclude: [] },
  { kind: 'squarefree', exclude: [2] },
  { kind: 'smooth', y: 7, exclude: [] },
  { kind: 'smooth', y: 13, exclude: [2, 5] },
  { kind: 'finite', members: ['4', '6', '9', '99999999999999999999'] },
]
const named = SETS.map((set): [string, SetOfIntegers] => [JSON.stringify(set), set])

describe('members of a set', () => {
  it.each(named)('%s: those up to x are the integers that factoring says', (_, set) => {
    const expected = Array.from({ length: 3_000 }, (_, n) => n).filter((n) => isMember(set, n))
    expect(membersUpTo(set, 2_999)).toEqual(expected)
    for (const upTo of [0, 1, 2, 3, 10]) expect(membersUpTo(set, upTo)).toEqual(expected.filter((n) => n <= upTo))
  })

  it.each(named)('%s: the first ones are those of the sieve', (_, set) => {
    const sieved = membersUpTo(set, 5_000)
    const count = Math.min(60, sieved.length)
    expect(firstMembers(set, count).map(Number).slice(0, count)).toEqual(sieved.slice(0, count))
  })

  // Exact sieve of the project's table of published values.
  it.each([[1, 78498], [2, 210035], [3, 250853], [8, 17572]])('there are as many with %i prime factors up to 10^6 as is known: %i', (k, count) => {
    let found = 0
    forEachMember(k === 1 ? { kind: 'primes', exclude: [] } : { kind: 'almost-primes', k, exclude: [] }, 1e6, () => found++)
    expect(found).toBe(count)
  })

  it('the first ones with sixty prime factors come at once', () => {
    const [first, second, third] = firstMembers({ kind: 'almost-primes', k: 60, exclude: [] }, 3).map(BigInt)
    expect([first, second, third]).toEqual([2n ** 60n, 2n ** 59n * 3n, 2n ** 58n * 9n])
    expect(firstMembers({ kind: 'squarefree-almost-primes', k: 12, exclude: [] }, 1)).toEqual(['7420738134810'])
    expect(firstMembers({ kind: 'smooth', y: 2, exclude: [] }, 100)[99]).toBe(String(2n ** 100n))
  })

  it('refuses counts and bounds that make no sense', () => {
    expect(() => firstMembers(SETS[0], 0)).toThrow(expect.objectContaining({ field: 'count' }))
    expect(() => membersUpTo(SETS[0], 1e12)).toThrow(expect.objectContaining({ field: 'upTo' }))
  })
})

describe('sums over the members by force', () => {
  // With n^-3/log n the members above x add at most the integral of t^-3 from x on, 1/(2 x^2), for log x > 1.
  it.each(named.filter(([, set]) => set.kind !== 'finite'))('%s: are where the transform says', async (_, set) => {
    const arithmetic = createBallArithmetic(128)
    const weight = { power: rational(3), logPower: rational(1) }
    const x = 3_000
    let sum = arithmetic.rational(rational(0))
    forEachMember(set, x, (n) => {
      sum = arithmetic.add(sum, weightAt(arithmetic, weight, n, arithmetic.log(arithmetic.rational(rational(n)))))
    })
    const top = arithmetic.add(sum, arithmetic.rational(rational(1, 2 * x * x)))
    const computation = await prepare({
      definitions: [{ type: 'series', set, weight: { power: '3', logPower: '1' } }], method: 'transform', arithmetic: 'ball', goal: { digits: 12 },
    })
    const [{ enclosure }] = await computeAll(computation)
    expect(compare(arithmetic.lower(sum), parseDecimal(enclosure.hi)!)).toBeLessThanOrEqual(0)
    expect(compare(parseDecimal(enclosure.lo)!, arithmetic.upper(top))).toBeLessThanOrEqual(0)
  })
})
