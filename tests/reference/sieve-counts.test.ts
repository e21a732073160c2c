import { execFileSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import { allFactors, distinctFactors, sieveFactors } from '../../shared/engine/sieve/factor-sieve.ts'
import { countPrimes, forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'
import { gp } from '../support/pari.ts'
import { Random } from '../support/random.ts'

const random = new Random()

/** The last whole number that a program prints. */
function numberFrom(program: string, ...args: string[]): number {
  return Number(execFileSync(program, args, { encoding: 'utf8' }).trim().split(/\s+/).pop())
}

describe(`the sieves against primesieve, primecount and PARI/GP (seed ${random.seed})`, () => {
  it('count primes as primecount does, up to limits chosen at random', () => {
    for (let i = 0; i < 6; i++) {
      const x = random.whole(0, i < 4 ? 3_000_000 : 60_000_000)
      expect(countPrimes(0, x), `up to ${x}`).toBe(numberFrom('primecount', String(x)))
    }
  })

  it('count primes as primesieve does, in intervals chosen at random up to 10^13', () => {
    for (let i = 0; i < 8; i++) {
      const lo = random.whole(0, 10 ** random.whole(5, 13))
      const hi = lo + random.whole(1, 2_000_000)
      expect(countPrimes(lo, hi), `in (${lo}, ${hi}]`).toBe(numberFrom('primesieve', String(lo + 1), String(hi), '-q', '-c'))
    }
  })

  it('list the primes that primesieve prints', () => {
    const lo = random.whole(10 ** 9, 10 ** 11)
    const printed = execFileSync('primesieve', [String(lo + 1), String(lo + 20_000), '-p', '-q'], { encoding: 'utf8' }).trim().split(/\s+/).map(Number)
    const found: number[] = []
    forEachPrime(lo, lo + 20_000, (p) => found.push(p))
    expect(found, `above ${lo}`).toEqual(printed)
  })

  it('count prime factors as PARI/GP does', () => {
    const lo = random.whole(10 ** 6, 4 * 10 ** 9)
    const hi = lo + 2_000
    const answer = gp(`for(n = ${lo + 1}, ${hi}, print1(bigomega(n), " ", omega(n), " ")); print()`)
    const expected = String(answer).trim().split(/[\s,]+/).map(Number)
    const found: number[] = []
    sieveFactors(lo, hi, (codes, _, count) => {
      for (let i = 0; i < count; i++) found.push(allFactors(codes[i]), distinctFactors(codes[i]))
    })
    expect(found, `above ${lo}`).toEqual(expected)
  })
})
