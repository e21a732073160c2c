import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { MOST_REPORTED, parseList } from '../../shared/engine/sets/parse-list.ts'
import { factorCounts } from '../../shared/engine/sets/primitive-counts.ts'
import { SMALL_LIMIT, divisorsOf, factorSmall } from '../../shared/engine/sets/primitive-factor.ts'
import { maximality } from '../../shared/engine/sets/primitive-maximal.ts'
import { divisibility } from '../../shared/engine/sets/primitive.ts'

const SEED = 20261204
const texts = (members: Iterable<number | bigint>): string[] => [...members].map(String)
const ascending = (numbers: number[]): number[] => [...new Set(numbers)].sort((a, b) => a - b)

/** By looking at every pair. */
function pairsByForce(members: number[]): [string, string][] {
  return members.flatMap((a, i) => members.slice(i + 1).flatMap((b): [string, string][] => (b % a === 0 ? [[String(a), String(b)]] : [])))
}

describe('reading a list', () => {
  it('takes plain text and CSV, and keeps the good when something is wrong', () => {
    const { members, repeated, bad, badCount } = parseList('\ufeffn,name\r\n6, 10;15\n"21"\t6\n# a comment\n\n007 # seven\nabc\n1\n-5\n2.5\n1e6\n0\n12x')
    expect(members).toEqual(['6', '7', '10', '15', '21'])
    expect(repeated).toBe(1)
    expect(badCount).toBe(7)
    expect(bad.map(({ line, text }) => [line, text])).toEqual([[7, 'abc'], [8, '1'], [9, '-5'], [10, '2.5'], [11, '1e6'], [12, '0'], [13, '12x']])
    expect(bad.map(({ reason }) => reason)).toEqual([
      'not a number', 'below 2', 'negative', 'not written as a whole number', 'not written as a whole number', 'below 2', 'not a number',
    ])
  })

  it('takes integers of up to 40 digits, and orders them as numbers', () => {
    const top = '9'.repeat(40)
    expect(parseList(`${top} 99999999999999999999 3 100`).members).toEqual(['3', '100', '99999999999999999999', top])
    expect(parseList(`1${'0'.repeat(40)} 2`)).toMatchObject({ members: ['2'], badCount: 1 })
  })

  it('reports no more than is useful, and counts the rest', () => {
    const { bad, badCount } = parseList('2\n' + 'x\n'.repeat(1000))
    expect([bad.length, badCount]).toEqual([MOST_REPORTED, 1000])
    expect(parseList('').members).toEqual([])
  })
})

describe('factors of small integers', () => {
  it(`multiply to the integer and are prime (seed ${SEED})`, () => {
    const primes = new Set(primesUpTo(32_768))
    const isPrime = (n: number): boolean => (n <= 32_768 ? primes.has(n) : [...primes].every((p) => n % p !== 0))
    fc.assert(
      fc.property(fc.integer({ min: 2, max: SMALL_LIMIT - 1 }), (n) => {
        const factors = factorSmall(n)
        expect(factors.reduce((product, p) => product * p, 1)).toBe(n)
        expect(factors.every(isPrime)).toBe(true)
      }),
      { seed: SEED, numRuns: 1_000 },
    )
  })

  it('split squares and products of two large primes', () => {
    const primes = primesUpTo(32_768).slice(-60)
    for (const p of primes) for (const q of primes) if (p <= q && p * q < SMALL_LIMIT) expect(factorSmall(p * q)).toEqual([p, q])
    for (const p of primesUpTo(32_768)) expect(factorSmall(p * p)).toEqual([p, p])
  })

  it('give every divisor once', () => {
    for (let n = 2; n <= 3_000; n++) {
      const expected = Array.from({ length: n }, (_, i) => i + 1).filter((d) => n % d === 0)
      expect(divisorsOf(factorSmall(n)).sort((a, b) => a - b)).toEqual(expected)
    }
  })
})

describe('primitive lists', () => {
  it(`the pairs that break one are those found by force, by multiples and by divisors (seed ${SEED})`, () => {
    // Small values make the walk over multiples cheap; a small and a huge value together make factoring the cheaper way.
    const lists = fc.oneof(
      fc.array(fc.integer({ min: 2, max: 400 }), { minLength: 1, maxLength: 80 }),
      fc.array(fc.oneof(fc.integer({ min: 2, max: 60 }), fc.integer({ min: 2 ** 28, max: SMALL_LIMIT - 1 })), { minLength: 1, maxLength: 60 }),
      fc.array(fc.integer({ min: 2 ** 30 - 5, max: 2 ** 33 }).chain((n) => fc.constantFrom(n, Math.floor(n / 2), n - (n % 6))), { minLength: 1, maxLength: 40 }),
    )
    fc.assert(
      fc.property(lists, (list) => {
        const members = ascending(list)
        const expected = pairsByForce(members)
        const report = divisibility(texts(members), 20)
        expect(report).toEqual({ primitive: expected.length === 0, pairs: expected.length, examples: expected.slice(0, 20) })
      }),
      { seed: SEED, numRuns: 400 },
    )
  })

  it('the primes are primitive, the integers are not, with 40-digit members too', () => {
    expect(divisibility(texts(primesUpTo(200_000))).primitive).toBe(true)
    const report = divisibility(texts(Array.from({ length: 1_000 }, (_, i) => i + 2)), 3)
    // sum over a of floor(1001/a) - 1, a = 2 … 1001.
    expect(report.pairs).toBe(Array.from({ length: 1_000 }, (_, i) => Math.floor(1_001 / (i + 2)) - 1).reduce((a, b) => a + b))
    expect(report.examples).toEqual([['2', '4'], ['2', '6'], ['2', '8']])
    const p = 10n ** 19n + 51n
    expect(divisibility(texts([7n, p, 3n * p, 10n ** 40n])).examples).toEqual([[String(p), String(3n * p)]])
  })

  it('refuses to compare too many huge members', () => {
    const huge = Array.from({ length: 70_000 }, (_, i) => String(10n ** 30n + BigInt(i)))
    expect(() => divisibility(huge)).toThrow(expect.objectContaining({ field: 'members' }))
  })
})

describe('maximality', () => {
  it('the primes up to N are maximal up to N, and one less is not', () => {
    expect(maximality(texts(primesUpTo(10_000)), 10_000)).toEqual({ upTo: 10_000, maximal: true, addable: 0, examples: [] })
    const report = maximality(texts(primesUpTo(10_000).filter((p) => p !== 7)), 10_000, 3)
    expect(report).toMatchObject({ maximal: false, examples: [7, 49, 343] })
  })

  it(`is what trying every integer says (seed ${SEED})`, () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 2, max: 5_000 }), { minLength: 1, maxLength: 30 }), fc.integer({ min: 2, max: 600 }), (list, upTo) => {
        const members = ascending(list)
        const addable = Array.from({ length: upTo - 1 }, (_, i) => i + 2).filter((m) => members.every((a) => a % m !== 0 && m % a !== 0))
        expect(maximality(texts(members), upTo, 5)).toEqual({ upTo, maximal: addable.length === 0, addable: addable.length, examples: addable.slice(0, 5) })
      }),
      { seed: SEED, numRuns: 200 },
    )
  })

  it('counts the divisors of members beyond its bound, small and huge', () => {
    expect(maximality(texts([10n ** 20n * 3n]), 6).examples).toEqual([])
    expect(maximality(texts([10n ** 20n]), 6).examples).toEqual([3, 6])
    expect(() => maximality(['6'], 1)).toThrow(expect.objectContaining({ field: 'upTo' }))
  })
})

describe('factor counts', () => {
  it('count members by their number of prime factors', () => {
    // Integers <= 1000 with exactly k prime factors: exact sieve, as the project's table of published values for 10^6.
    const { byFactors, squarefree, notFactored } = factorCounts(texts(Array.from({ length: 999 }, (_, i) => i + 2)))
    expect(byFactors).toEqual([0, 168, 299, 247, 149, 76, 37, 14, 7, 2])
    // 608 squarefree integers <= 1000, 1 included: count by inclusion and exclusion, sum mu(d) floor(1000/d^2).
    expect(squarefree).toBe(607)
    expect(notFactored).toBe(0)
  })

  it('say where a member was too large', () => {
    expect(factorCounts([String(2n ** 100n), String((10n ** 9n + 7n) * (10n ** 9n + 9n))])).toMatchObject({ notFactored: 1, byDistinct: [0, 1] })
  })
})
