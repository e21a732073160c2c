import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isPrime, primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { countPrimes, forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'
import { floorSqrt } from '../../shared/engine/sieve/integer-root.ts'
import { sievePrimes } from '../../shared/engine/sieve/prime-sieve.ts'

const SEED = 20261201

function listPrimes(lo: number, hi: number, options = {}): number[] {
  const found: number[] = []
  forEachPrime(lo, hi, (p) => found.push(p), options)
  return found
}

describe('the segmented sieve of primes', () => {
  // Deleglise & Rivat, Math. Comp. 65 (1996) 235-245, quoted in the project's table of published values.
  it.each([
    [1, 4], [2, 25], [3, 168], [4, 1229], [5, 9592], [6, 78498], [7, 664579], [8, 5761455],
  ])('counts the primes to 10^%i: %i', (n, count) => {
    expect(countPrimes(0, 10 ** n)).toBe(count)
  })

  it(`finds the primes that trial division finds, in intervals chosen at random (seed ${SEED})`, () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 2 ** 31 }), fc.integer({ min: 0, max: 400 }), (lo, length) => {
        const expected: number[] = []
        for (let n = lo + 1; n <= lo + length; n++) if (isPrime(n)) expected.push(n)
        expect(listPrimes(lo, lo + length)).toEqual(expected)
      }),
      { seed: SEED, numRuns: 150 },
    )
  })

  it('finds every prime below 5,000 for every end of the range', () => {
    const primes = primesUpTo(5000)
    for (let hi = 0; hi <= 300; hi++) expect(listPrimes(0, hi)).toEqual(primes.filter((p) => p <= hi))
    for (let lo = 0; lo <= 300; lo++) expect(listPrimes(lo, 5000)).toEqual(primes.filter((p) => p > lo))
  })

  it('does not depend on how the range is cut or how long the segments are', () => {
    const whole = countPrimes(0, 20_000_000)
    expect(countPrimes(0, 20_000_000, { segmentBytes: 1024 })).toBe(whole)
    expect(countPrimes(0, 7_654_321) + countPrimes(7_654_321, 20_000_000, { segmentBytes: 3072 })).toBe(whole)
  })

  it('splits the primes into residue classes', () => {
    for (const modulus of [1, 4, 7, 30, 97]) {
      let total = 0
      for (let residue = 0; residue < modulus; residue++) total += countPrimes(0, 100_000, { residueClass: { modulus, residue } })
      expect(total).toBe(9592)
    }
    expect(listPrimes(0, 60, { residueClass: { modulus: 4, residue: 1 } })).toEqual([5, 13, 17, 29, 37, 41, 53])
    expect(listPrimes(0, 60, { residueClass: { modulus: 5, residue: 2 } })).toEqual([2, 7, 17, 37, 47])
  })

  it('hands out segments with nothing outside the range set', () => {
    sievePrimes(1000, 1010, (bytes, firstByte) => {
      const set = [...bytes].flatMap((byte, i) => (byte ? [firstByte + i] : []))
      expect(set).toEqual([33])
    })
  })

  it('takes square roots of integers exactly', () => {
    for (const n of [0, 1, 2, 3, 4, 2 ** 52, 94906265 ** 2, 94906265 ** 2 - 1]) {
      const root = BigInt(floorSqrt(n))
      expect(root * root <= BigInt(n) && (root + 1n) * (root + 1n) > BigInt(n)).toBe(true)
    }
  })
})
