import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { sumBatch } from '../../shared/engine/sieve/block-sums.ts'
import { type Classification, factorMoments } from '../../shared/engine/sieve/factor-moments.ts'
import { FACTOR_SIEVE_LIMIT, allFactors, distinctFactors, sieveFactors } from '../../shared/engine/sieve/factor-sieve.ts'
import type { MomentBlock } from '../../shared/engine/sieve/moments.ts'
import { expandWeight } from '../../shared/engine/sieve/weight.ts'
import { rational } from '../../shared/engine/arithmetic/rational.ts'

const SEED = 20261203

/** Numbers of prime factors by trial division. */
function factors(n: number): { all: number; distinct: number } {
  let [all, distinct, rest] = [0, 0, n]
  for (let d = 2; d * d <= rest; d++) {
    if (rest % d !== 0) continue
    distinct++
    for (; rest % d === 0; rest /= d) all++
  }
  return rest > 1 ? { all: all + 1, distinct: distinct + 1 } : { all, distinct }
}

function countBy(x: number, exclude: number[], pick: (code: number) => number | null): number[] {
  const counts: number[] = []
  sieveFactors(0, x, (codes, _, count) => {
    for (let i = 0; i < count; i++) {
      const k = pick(codes[i])
      if (k !== null) counts[k] = (counts[k] ?? 0) + 1
    }
  }, exclude)
  return counts
}

const squarefreeOnly = (code: number): number | null => (allFactors(code) === distinctFactors(code) ? allFactors(code) : null)

describe('the sieve of prime factors', () => {
  // Exact sieve of the project's table of published values.
  it('counts integers up to 10^6 by their number of prime factors', () => {
    expect(countBy(1e6, [], allFactors).slice(1, 9)).toEqual([78498, 210035, 250853, 198062, 124465, 68963, 35585, 17572])
    expect(countBy(1e6, [], squarefreeOnly).slice(1)).toEqual([78498, 209867, 206964, 92966, 18387, 1235, 8])
    expect(countBy(1e6, [2], allFactors).slice(1, 7)).toEqual([78497, 168497, 142527, 71800, 26795, 8529])
  })

  it('counts integers up to 10^8 by their number of prime factors', () => {
    expect(countBy(1e8, [], allFactors).slice(1, 6)).toEqual([5761455, 17427258, 23727305, 20959322, 14371023])
  })

  it('agrees with trial division for every integer up to 40,000', () => {
    sieveFactors(0, 40_000, (codes, first, count) => {
      for (let i = 0; i < count; i++) {
        expect({ all: allFactors(codes[i]), distinct: distinctFactors(codes[i]) }).toEqual(factors(first + i))
      }
    })
  })

  it(`agrees with trial division in intervals chosen at random up to its limit (seed ${SEED})`, () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: FACTOR_SIEVE_LIMIT - 50 }), fc.integer({ min: 1, max: 40 }), (lo, length) => {
        let expected = lo + 1
        sieveFactors(lo, lo + length, (codes, first, count) => {
          for (let i = 0; i < count; i++, expected++) {
            expect(first + i).toBe(expected)
            expect({ all: allFactors(codes[i]), distinct: distinctFactors(codes[i]) }).toEqual(factors(expected))
          }
        })
        expect(expected).toBe(lo + length + 1)
      }),
      { seed: SEED, numRuns: 25 },
    )
  })

  it('does not lose its fields at the powers of 2 and the primorials, and refuses what is beyond', () => {
    for (const n of [2 ** 31, 2 ** 31 - 1, 2 * 3 ** 19, 223092870, 4294967291, 65521 * 65521, FACTOR_SIEVE_LIMIT]) {
      sieveFactors(n - 1, n, (codes) => expect({ all: allFactors(codes[0]), distinct: distinctFactors(codes[0]) }).toEqual(factors(n)))
    }
    expect(() => sieveFactors(0, 2 ** 32, () => undefined)).toThrow(RangeError)
  })
})

describe('moments by number of prime factors', () => {
  const classOf: Record<Classification, (n: number) => number | null> = {
    'all-factors': (n) => factors(n).all,
    'distinct-factors': (n) => factors(n).distinct,
    'squarefree-factors': (n) => (factors(n).all === factors(n).distinct ? factors(n).all : null),
    squarefree: (n) => (factors(n).all === factors(n).distinct ? 0 : null),
    none: () => 0,
  }

  it.each(Object.keys(classOf) as Classification[])('are exact: %s', (classification) => {
    for (const [lo, hi, exclude] of [[0, 30_000, []], [999_000, 1_003_000, [3]], [123_450_000, 123_458_000, []]] as [number, number, number[]][]) {
      const blocks: MomentBlock[] = []
      const singles: number[][] = []
      factorMoments(lo, hi, classification, (batch) => {
        blocks.push(...batch.blocks)
        batch.singles.forEach((list, c) => (singles[c] ??= []).push(...list))
      }, exclude)
      const expected = blocks.map(({ classes }) => classes.map((moments) => moments.map(() => 0n)))
      const expectedSingles: number[][] = singles.map(() => [])
      let at = 0
      for (let n = lo + 1; n <= hi; n++) {
        const c = n === 1 || exclude.some((p) => n % p === 0) ? null : classOf[classification](n)
        if (c === null) continue
        if (n < 2 ** 13) {
          expectedSingles[c].push(n)
          continue
        }
        while (n >= blocks[at].centre + blocks[at].reach) at++
        const e = BigInt(n - blocks[at].centre)
        expected[at][c].forEach((_, j, sums) => { sums[j] += e ** BigInt(j) })
      }
      expect(singles).toEqual(expectedSingles)
      expect(blocks.map(({ classes }) => classes)).toEqual(expected)
    }
  })

  it('keep sums inside doubles: the worst block is below 2^53 (S-7)', () => {
    // 128 cells of 1024 integers, distances at most 512 and 127 half cells.
    for (let a = 0; a <= 4; a++) {
      let cell = 0n
      for (let e = -512n; e < 512n; e++) cell += (e < 0n ? -e : e) ** BigInt(a)
      for (let b = 0; a + b <= 4; b++) {
        let total = 0n
        for (let k = -127n; k <= 127n; k += 2n) total += (k < 0n ? -k : k) ** BigInt(b) * cell
        expect(total < 2n ** 53n).toBe(true)
      }
    }
  })

  it('sum weights as single terms do', () => {
    const [arithmetic, finer] = [createBallArithmetic(128), createBallArithmetic(256)]
    const expansion = expandWeight({ power: rational(1), logPower: rational(1) }, 4)
    const [lo, hi] = [5_000_000, 5_020_000]
    const totals = Array.from({ length: 32 }, () => [0n, 0n])
    factorMoments(lo, hi, 'all-factors', (batch) =>
      sumBatch(arithmetic, [expansion], batch)[0].forEach(([low, high], c) => {
        totals[c][0] += low
        totals[c][1] += high
      }))
    const singles = totals.map((): number[] => [])
    for (let n = lo + 1; n <= hi; n++) singles[factors(n).all].push(n)
    sumBatch(finer, [expansion], { blocks: [], singles })[0].forEach(([low, high], c) => {
      expect(totals[c][0] << 128n <= low && high <= totals[c][1] << 128n).toBe(true)
      expect(totals[c][1] - totals[c][0] < 2n ** 80n).toBe(true)
    })
  })
})
