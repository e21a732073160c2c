import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { type Rational, ONE, add, compare, magnitude, multiply, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import { expansion } from '../../shared/engine/methods/expansion.ts'
import type { Outcome, Parameters } from '../../shared/engine/methods/computation.ts'
import { expandLogarithm, expandQuotient, expansionTail, valueAtPrime } from '../../shared/engine/series/prime-expansion.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { loadExpressionParser, parseRationalFunction } from '../../shared/engine/sets/rational-function.ts'

await loadExpressionParser()

function overPrimes(text: string, combine: 'sum' | 'product', exclude: number[] = []): Definition {
  const { numerator, denominator } = parseRationalFunction(text)
  return { type: 'over-primes', numerator: numerator.map(String), denominator: denominator.map(String), combine, exclude }
}

async function enclose(definition: Definition, digits: number, arithmetic: 'ball' | 'mpfr' = 'ball'): Promise<Outcome> {
  const [outcome] = await computeAll(await expansion.prepare({ definitions: [definition], method: 'expansion', arithmetic, goal: { digits } }))
  return outcome
}

const ends = (outcome: Outcome): [Rational, Rational] => [parseDecimal(outcome.enclosure.lo)!, parseDecimal(outcome.enclosure.hi)!]

describe('the expansion of a quotient', () => {
  it('has the coefficients of the geometric series, within the bound E-1', () => {
    fc.assert(
      fc.property(fc.array(fc.bigInt(-9n, 9n), { minLength: 3, maxLength: 5 }), fc.bigInt(-9n, 9n), (below, top) => {
        fc.pre(below[below.length - 1] !== 0n && top !== 0n)
        const { coefficient, radius, scale } = expandQuotient([top], below)
        // numerator = denominator times series, power by power: sum_i below[d - i] c_(j - i) is top at j = d, 0 elsewhere.
        const d = below.length - 1
        for (let j = 0; j <= 20; j++) {
          let total = rational(0)
          for (let i = 0; i <= d && i <= j; i++) total = add(total, multiply(rational(below[d - i]), coefficient(j - i)))
          expect(total).toEqual(rational(j === d ? top : 0n))
          const most = multiply(scale, { num: radius.num ** BigInt(j), den: radius.den ** BigInt(j) })
          expect(compare(magnitude(coefficient(j)), most)).toBeLessThanOrEqual(0)
        }
      }),
      { seed: 20_261_201 },
    )
  })

  it('bounds what it leaves out: the finite sum up to 10^5 never differs by more', () => {
    const f = parseRationalFunction('(p+3)/(p^3 - 2p + 5)')
    const series = expandQuotient(f.numerator, f.denominator)
    const [split, terms] = [50, 6]
    const far = primesUpTo(100_000).filter((p) => p > split)
    const exact = far.reduce((sum, p) => sum + Number(f.numerator.reduce((v, c, i) => v + Number(c) * p ** i, 0)) / f.denominator.reduce((v, c, i) => v + Number(c) * p ** i, 0), 0)
    let cut = 0
    for (let j = 2; j <= terms; j++) {
      const c = series.coefficient(j)
      cut += far.reduce((sum, p) => sum + p ** -j, 0) * (Number(c.num) / Number(c.den))
    }
    const bound = expansionTail(series, split, terms)
    expect(Math.abs(exact - cut)).toBeLessThan(Number(bound.num) / Number(bound.den))
    expect(Math.abs(exact - cut)).toBeGreaterThan((Number(bound.num) / Number(bound.den)) * 1e-4)
  })

  it('refuses what diverges, is 0, or has a pole', () => {
    expect(() => expandQuotient([1n], [0n, 1n])).toThrow(/diverges/)
    expect(() => expandQuotient([], [0n, 0n, 1n])).toThrow(/sum is 0/)
    expect(() => expandLogarithm([1n, 1n], [0n, 1n])).toThrow(/does not converge/)
    expect(() => expandLogarithm([2n, 0n, 1n], [0n, 0n, 2n])).toThrow(/does not converge/)
    expect(() => valueAtPrime([1n], [-3n, 1n], 3, 'sum')).toThrow(/pole at p = 3/)
    expect(() => valueAtPrime([-2n, 1n], [0n, 1n], 2, 'product')).toThrow(/factor at p = 2 is 0/)
  })
})

describe('sums and products over the primes', () => {
  it.each([
    ['1/(p(p-1))', 'sum'],
    ['1 - 2/(p^2+1)', 'product'],
    ['1000/(p^2-2)', 'sum'],
    ['1 - 5/p^2', 'product'],
  ] as const)('%s (%s): the brute sum or product up to 10^6 lies where its tail allows', async (text, combine) => {
    const [lo, hi] = ends(await enclose(overPrimes(text, combine), 20))
    const value = Number(lo.num) / Number(lo.den)
    const f = parseRationalFunction(text)
    const at = (p: number): number => f.numerator.reduce((v, c, i) => v + Number(c) * p ** i, 0) / f.denominator.reduce((v, c, i) => v + Number(c) * p ** i, 0)
    const brute = primesUpTo(1_000_000).reduce((total, p) => (combine === 'sum' ? total + at(p) : total * at(p)), combine === 'sum' ? 0 : 1)
    // Beyond 10^6 the terms are below 1000/n^2, or the factors that far from 1.
    expect(Math.abs(value - brute)).toBeLessThan(combine === 'sum' ? 1.1e-3 : 1e-5 * Math.abs(brute) + 1e-9)
    expect(compare(lo, hi)).toBeLessThan(0)
  })

  it('a prime left out is its term taken away, below the split and above it', async () => {
    for (const p of [3, 1009]) {
      const [lo, hi] = ends(await enclose(overPrimes('1/p^2', 'sum'), 40))
      const [lo2, hi2] = ends(await enclose(overPrimes('1/p^2', 'sum', [p]), 40))
      const term = rational(1, p * p)
      expect(compare(subtract(lo, term), hi2)).toBeLessThanOrEqual(0)
      expect(compare(lo2, subtract(hi, term))).toBeLessThanOrEqual(0)
    }
  })

  it('two precisions and two arithmetics meet, and each keeps its promise', async () => {
    const definition = overPrimes('1 - 1/(p(p-1))', 'product')
    const outcomes = [await enclose(definition, 25), await enclose(definition, 60), await enclose(definition, 30, 'mpfr')]
    for (const [i, asked] of [25, 60, 30].entries()) expect(outcomes[i].digits.truncated).toBeGreaterThanOrEqual(asked)
    for (const one of outcomes) for (const other of outcomes) expect(compare(ends(one)[0], ends(other)[1])).toBeLessThanOrEqual(0)
  })

  it('the same parameters give the same enclosure to the last digit, and unsound ones are refused', async () => {
    const definition = overPrimes('1/(p(p-1))', 'sum')
    const first = await enclose(definition, 30)
    const request = { definitions: [definition], method: 'expansion' as const, arithmetic: 'ball' as const, goal: { digits: 30 } }
    const [again] = await computeAll(await expansion.prepare({ ...request, parameters: first.parameters }))
    expect(again.enclosure).toEqual(first.enclosure)
    await expect(expansion.prepare({ ...request, parameters: { ...first.parameters, split: 3_000_000_000 } })).rejects.toThrow(/split/)
    const steep = { ...request, definitions: [overPrimes('1/(p^2-300)', 'sum')] }
    await expect(expansion.prepare({ ...steep, parameters: { ...first.parameters, split: 10 } })).rejects.toThrow(/beyond the radius/)
  })

  it('stays true, only wider, with parameters that nobody would choose', async () => {
    // Twin prime constant (J. W. Wrench, Math. Comp. 15 (1961) 396-398); Mertens constant (Rosser and Schoenfeld 1962, (2.10)).
    const cases: [Definition, string][] = [
      [overPrimes('1 - 1/(p-1)^2', 'product', [2]), '0.6601618158468695739278121'],
      [{ type: 'named', name: 'mertens' }, '0.26149721284764'],
    ]
    for (const [definition, truth] of cases) {
      for (const change of [{ powers: 2 }, { powers: 5, split: 7 }, { terms: 30 }, { terms: 12, powers: 4 }, { precision: 120 }] as Parameters[]) {
        const request = { definitions: [definition], method: 'expansion' as const, arithmetic: 'ball' as const, goal: { digits: 30 } }
        const usual = await expansion.prepare(request)
        const [outcome] = await computeAll(await expansion.prepare({ ...request, parameters: { ...usual.parameters, ...change } }))
        const [lo, hi] = ends(outcome)
        const value = parseDecimal(truth)!
        expect(compare(lo, add(value, rational(1n, 10n ** BigInt(truth.length - 2)))), JSON.stringify(change)).toBeLessThan(0)
        expect(compare(hi, value), JSON.stringify(change)).toBeGreaterThan(0)
        expect(outcome.digits.truncated).toBeLessThan(32)
      }
    }
  })

  it('refuses at once a pole or a zero factor at a prime', async () => {
    await expect(enclose(overPrimes('1/(p-3)^2', 'sum'), 20)).rejects.toThrow(/pole at p = 3/)
    await expect(enclose(overPrimes('1 - 1/(p-1)^2', 'product'), 20)).rejects.toThrow(/factor at p = 2 is 0/)
    await expect(enclose(overPrimes('1/p', 'sum'), 20)).rejects.toThrow(/diverges/)
  })

  it('a product of values near 1 has radius below what was asked', async () => {
    const [lo, hi] = ends(await enclose(overPrimes('1 - 1/p^2', 'product'), 30))
    expect(compare(subtract(hi, lo), multiply(ONE, rational(1n, 10n ** 30n)))).toBeLessThan(0)
  })
})
