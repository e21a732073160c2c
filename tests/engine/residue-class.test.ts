import { describe, expect, it } from 'vitest'
import { type Arithmetic, overlaps } from '../../shared/engine/arithmetic/arithmetic.ts'
import { type Ball, createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { compare, rational } from '../../shared/engine/arithmetic/rational.ts'
import { characters, isReal, units, upToConjugation } from '../../shared/engine/series/characters.ts'
import type { DirichletSeries, SeriesPoint } from '../../shared/engine/series/dirichlet.ts'
import { primeSeries } from '../../shared/engine/series/families.ts'
import { PrimeZeta } from '../../shared/engine/series/prime-zeta.ts'
import { residueClassSeries } from '../../shared/engine/series/residue-class.ts'
import { ZetaPoint } from '../../shared/engine/series/zeta.ts'
import { createZetaContext } from '../../shared/engine/series/zeta-context.ts'

const ONE = rational(1)

function pointAt(arithmetic: Arithmetic<Ball>, excess: Ball, split = 60): SeriesPoint<Ball> {
  const context = createZetaContext(arithmetic, { terms: Math.ceil(arithmetic.precision / 2.5), split })
  return new PrimeZeta(new ZetaPoint(context, excess, arithmetic.log(excess)))
}

function value(series: DirichletSeries, at: SeriesPoint<Ball>): Ball {
  series.prepare?.(at.point.context)
  return series.evaluate(at)
}

describe('Dirichlet characters', () => {
  it('are phi(q) distinct multiplicative maps for every q up to 100', () => {
    for (let q = 1; q <= 100; q++) {
      const [group, all] = [units(q), characters(q)]
      expect(new Set(all.map((chi) => chi.exponents.join())).size).toBe(group.length)
      const broken = all.filter((chi) => group.some((a) => group.some((b) => (chi.exponents[a % q] + chi.exponents[b % q]) % chi.order !== chi.exponents[(a * b) % q])))
      expect(broken).toEqual([])
      const chosen = upToConjugation(all)
      const real = chosen.filter(isReal).length
      expect(1 + real + 2 * (chosen.length - real)).toBe(group.length)
    }
  })
})

describe('primes in a residue class', () => {
  const arithmetic = createBallArithmetic(200)

  it.each([[3, 2], [4, 1], [5, 2], [8, 7], [12, 5], [35, 3], [97, 5]])('q = %i, a = %i: the sum of p^-2 up to 10^6 with a trivial tail contains the value', (q, a) => {
    const found = value(residueClassSeries(q, a, [], ONE), pointAt(arithmetic, arithmetic.rational(ONE)))
    const scale = 10n ** 40n
    let brute = 0n
    for (const p of primesUpTo(1_000_000)) if (p % q === a) brute += scale / BigInt(p * p)
    const low = rational(brute, scale)
    // Each term was cut off by less than 10^-40, and sum over n > 10^6 of n^-2 < 10^-6.
    const high = rational(brute + 10n ** 5n + 10n ** 34n, scale)
    expect(compare(arithmetic.upper(found), low)).toBeGreaterThan(0)
    expect(compare(arithmetic.lower(found), high)).toBeLessThan(0)
  })

  it.each([4, 9, 10, 21])('q = %i: the classes add up to all primes that do not divide q, near the pole too', (q) => {
    for (const excess of [rational(3, 2), rational(1, 7), rational(1n, 10n ** 12n)]) {
      const at = pointAt(arithmetic, arithmetic.rational(excess))
      const parts = units(q).map((a) => value(residueClassSeries(q, a, [], ONE), at))
      const total = parts.reduce((x, y) => arithmetic.add(x, y))
      const divisors = [2, 3, 5, 7].filter((p) => q % p === 0)
      expect(overlaps(arithmetic, total, value(primeSeries(divisors, ONE), at))).toBe(true)
      expect(total.rad < 1n << 60n).toBe(true)
    }
  })

  it('does not depend on where the small primes are split off, nor on the precision', () => {
    const fine = createBallArithmetic(260)
    const coarseValue = value(residueClassSeries(14, 3, [], ONE), pointAt(arithmetic, arithmetic.rational(rational(1, 3)), 50))
    const fineValue = value(residueClassSeries(14, 3, [], ONE), pointAt(fine, fine.rational(rational(1, 3)), 120))
    expect(compare(arithmetic.lower(coarseValue), fine.upper(fineValue))).toBeLessThanOrEqual(0)
    expect(compare(fine.lower(fineValue), arithmetic.upper(coarseValue))).toBeLessThanOrEqual(0)
  })

  it('leaves out excluded primes of the class and no others', () => {
    const at = pointAt(arithmetic, arithmetic.rational(ONE))
    const whole = value(residueClassSeries(4, 1, [], ONE), at)
    const without = value(residueClassSeries(4, 1, [3, 5, 1009], ONE), at)
    const difference = arithmetic.subtract(whole, without)
    // 1009 = 1 mod 4, 3 is not.
    const expected = arithmetic.rational(rational(1n * 1009n ** 2n + 25n, 25n * 1009n ** 2n))
    expect(overlaps(arithmetic, difference, expected)).toBe(true)
  })

  it('q = 4 at s = 2 against PARI/GP 2.15 (zetahurwitz, 60 digits): 0.0538137635740576702806782873415365622856755…', () => {
    const found = value(residueClassSeries(4, 1, [], ONE), pointAt(arithmetic, arithmetic.rational(ONE)))
    expect(compare(arithmetic.lower(found), parseDecimal('0.0538137635740576702806782873415365622856756')!)).toBeLessThan(0)
    expect(compare(arithmetic.upper(found), parseDecimal('0.0538137635740576702806782873415365622856755')!)).toBeGreaterThan(0)
  })
})
