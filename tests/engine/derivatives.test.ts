import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { type Rational, add, compare, multiply, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import type { Parameters } from '../../shared/engine/methods/computation.ts'
import { derivatives } from '../../shared/engine/methods/derivatives.ts'
import { centralDifferenceWeights, interpolationErrorUpper } from '../../shared/engine/series/central-differences.ts'
import type { SetOfIntegers } from '../../shared/engine/sets/definition.ts'

async function enclose(set: SetOfIntegers, power: string, logPower: string, digits: number): Promise<[Rational, Rational, number]> {
  const definition = { type: 'series' as const, set, weight: { power, logPower } }
  const [outcome] = await computeAll(await derivatives.prepare({ definitions: [definition], method: 'derivatives', arithmetic: 'ball', goal: { digits } }))
  return [parseDecimal(outcome.enclosure.lo)!, parseDecimal(outcome.enclosure.hi)!, outcome.digits.truncated]
}

const primes: SetOfIntegers = { kind: 'primes', exclude: [] }
const integers: SetOfIntegers = { kind: 'integers', exclude: [] }

function holds([lo, hi]: readonly [Rational, Rational, number], truncated: string): void {
  const value = parseDecimal(truncated)!
  const next = add(value, rational(1n, 10n ** BigInt(truncated.split('.')[1].length)))
  expect(compare(lo, next)).toBeLessThan(0)
  expect(compare(hi, value)).toBeGreaterThanOrEqual(0)
}

describe('weights of central differences', () => {
  it('differentiate every polynomial of low degree exactly', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 8 }), fc.integer({ min: 0, max: 5 }), fc.array(fc.bigInt(-99n, 99n), { minLength: 1, maxLength: 17 }), (half, order, poly) => {
        fc.pre(order <= 2 * half && poly.length <= 2 * half + 1)
        const weights = centralDifferenceWeights(half, order)
        const derivative = weights.reduce((sum, w, i) => {
          const x = BigInt(i - half)
          return add(sum, multiply(w, rational(poly.reduceRight((v, c) => v * x + c, 0n))))
        }, rational(0))
        let factor = 1n
        for (let i = 2n; i <= BigInt(order); i++) factor *= i
        expect(derivative).toEqual(rational(factor * (poly[order] ?? 0n)))
      }),
      { seed: 20_261_201 },
    )
  })

  it('and the error bound D-1 covers 1/(1+z), of which everything is known', () => {
    // f = 1/(1+z) on |z| <= 1/2 is at most 2; f'(0) = -1; points j/40, |j| <= 4.
    const weights = centralDifferenceWeights(4, 1)
    const approximate = weights.reduce((sum, w, i) => add(sum, multiply(w, rational(40, 40 + i - 4))), rational(0))
    const error = subtract(multiply(approximate, rational(40)), rational(-1))
    const size = error.num < 0n ? rational(-error.num, error.den) : error
    const bound = interpolationErrorUpper(rational(2), rational(1, 2), rational(1, 10), 9, 1)
    expect(compare(size, bound)).toBeLessThan(0)
    expect(size.num > 0n).toBe(true)
  })
})

describe('sums with log n above', () => {
  it("zeta''(2) and the fourth derivative of zeta at 1.01 as PARI/GP 2.15 gives them (derivnum, 60 digits)", async () => {
    holds(await enclose(integers, '2', '-2', 40), '1.9892802342989010234208586874215163814944')
    holds(await enclose(integers, '101/100', '-4', 30), '240000000000.002317424976561923312971532683')
  })

  it('log n to the power 0 is the Dirichlet series itself: P(2) and zeta(3) - 1 (Abramowitz and Stegun, Table 23.3)', async () => {
    holds(await enclose(primes, '2', '0', 40), '0.4522474200410654985065433648322479341732')
    holds(await enclose(integers, '3', '0', 20), '0.2020569031595942853')
  })

  it('two numbers of digits meet, and each has the digits asked for', async () => {
    for (const set of [primes, { kind: 'almost-primes', k: 2, exclude: [3] }, { kind: 'smooth', y: 7, exclude: [] }, { kind: 'squarefree', exclude: [2] }, { kind: 'residue-class', modulus: 5, residue: 2, exclude: [] }] as SetOfIntegers[]) {
      const [short, long] = [await enclose(set, '3/2', '-1', 15), await enclose(set, '3/2', '-1', 35)]
      expect(compare(short[0], long[1])).toBeLessThanOrEqual(0)
      expect(compare(long[0], short[1])).toBeLessThanOrEqual(0)
      expect(short[2]).toBeGreaterThanOrEqual(15)
      expect(long[2]).toBeGreaterThanOrEqual(35)
    }
  })

  it('the 3-smooth integers with weight log n/n: the derivative of 1/((1-2^-s)(1-3^-s)) at 1 is (log 2 + (log 3)/2) 3', async () => {
    const found = await enclose({ kind: 'smooth', y: 3, exclude: [] }, '1', '-1', 20)
    // log 2 = 0.693147180559945309417, log 3 = 1.098612288668109691395 (Abramowitz and Stegun, Table 4.2).
    holds(found, '3.7273599746820004653')
  })

  it('stays true, only wider, with few points and few terms', async () => {
    // zeta''(2) by PARI/GP 2.15, as above.
    const definition = { type: 'series' as const, set: integers, weight: { power: '2', logPower: '-2' } }
    const request = { definitions: [definition], method: 'derivatives' as const, arithmetic: 'ball' as const, goal: { digits: 30 } }
    const usual = await derivatives.prepare(request)
    for (const change of [{ half: 1 }, { half: 2 }, { half: 4 }, { terms: 4 }, { precision: 64 }] as Parameters[]) {
      const [outcome] = await computeAll(await derivatives.prepare({ ...request, parameters: { ...usual.parameters, ...change } }))
      holds([parseDecimal(outcome.enclosure.lo)!, parseDecimal(outcome.enclosure.hi)!, 0], '1.9892802342989010234208586874215163814944')
      expect(outcome.digits.truncated).toBeLessThan(25)
    }
  })

  it('refuses a power of log n that is not whole, and a sum that diverges', async () => {
    await expect(enclose(integers, '2', '-1/2', 10)).rejects.toThrow(/whole number/)
    await expect(enclose(integers, '1', '-1', 10)).rejects.toThrow(/diverges/)
    await expect(enclose(primes, '2', '1', 10)).rejects.toThrow(/transform/)
  })
})
