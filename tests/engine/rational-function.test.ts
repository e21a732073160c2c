import { describe, expect, it } from 'vitest'
import { commonDivisor, exactQuotient, multiply, primitivePart } from '../../shared/engine/arithmetic/polynomial.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { loadExpressionParser, parseRationalFunction } from '../../shared/engine/sets/rational-function.ts'
import { Random } from '../support/random.ts'

await loadExpressionParser()

describe('an expression in p', () => {
  it.each([
    ['1/(p*(p-1))', [1n], [0n, -1n, 1n]],
    ['1 - 1/(p-1)^2', [0n, -2n, 1n], [1n, -2n, 1n]],
    ['(p^2-1)/(p-1)', [1n, 1n], [1n]],
    ['p(p+1)', [0n, 1n, 1n], [1n]],
    ['0.5/p^2', [1n], [0n, 0n, 2n]],
    ['-p^-2', [-1n], [0n, 0n, 1n]],
    ['2/(4 - 4p)', [-1n], [-2n, 2n]],
    ['0.12345678901234567890123456789 p', [0n, 12345678901234567890123456789n], [100000000000000000000000000000n]],
  ])('reads %s exactly, in lowest terms', (text, numerator, denominator) => {
    expect(parseRationalFunction(text)).toEqual({ numerator, denominator })
  })

  it.each([
    ['2^p', /exponent/],
    ['p^(1/2)', /exponent/],
    ['sin(p)', /sin/],
    ['p!', /factorial/],
    ['x + 1', /"x"/],
    ['1/(p-p)', /division by 0/],
    ['1/p + ', /not an expression/],
    ['('.repeat(5_000), /nested too deep/],
    ['a = 3', /quotient of polynomials/],
    ['(p+1)^61', /beyond 60/],
    ['(p+1)^40 (p+2)^40', /degree/],
  ])('refuses %s and says why', (text, reason) => {
    expect(() => parseRationalFunction(text)).toThrow(EngineRefusal)
    expect(() => parseRationalFunction(text)).toThrow(reason)
  })

  it('takes out at once a large common factor with large coefficients', () => {
    const nines = '9'.repeat(90)
    const common = `(${nines} p^40 + 3*p^7 + ${nines} - 4)`
    const begun = performance.now()
    const { numerator, denominator } = parseRationalFunction(`(${common} (p^3 + ${nines}))/(${common} (2*p^9 - p + ${nines} - 7))`)
    expect(performance.now() - begun).toBeLessThan(1_000)
    expect(numerator).toEqual([BigInt(nines), 0n, 0n, 1n])
    expect(denominator).toEqual([BigInt(nines) - 7n, -1n, 0n, 0n, 0n, 0n, 0n, 0n, 0n, 2n])
  })

  it('finds common factors that a single prime would mistake, and none where there is none', () => {
    // Modulo 2^61 - 1 the two are equal; over the rationals they are coprime.
    const prime = 2n ** 61n - 1n
    expect(commonDivisor([1n, 1n], [1n + prime, 1n])).toEqual([1n])
    // The leading coefficient vanishes modulo 2^61 - 1.
    expect(commonDivisor([3n, prime], multiply([3n, prime], [5n, 1n]))).toEqual([3n, prime])
    expect(commonDivisor([], [4n, 2n])).toEqual([2n, 1n])
    expect(commonDivisor([6n], [4n, 2n])).toEqual([1n])
  })

  it('common factors of random products are found, with what more they share', () => {
    const random = new Random()
    for (let i = 0; i < 60; i++) {
      const factor = (): bigint[] => [...Array.from({ length: random.whole(1, 6) }, () => random.signed(70)), random.big(70) + 1n]
      const [f, g, h] = [factor(), factor(), factor()]
      const found = commonDivisor(multiply(f, g), multiply(f, h))
      // f divides it, it divides both, and what is left has no common factor: a divisor of f g and f h above f is shared by g and h.
      expect(commonDivisor(found, f), String(random.seed)).toEqual(primitivePart(f))
      expect(exactQuotient(primitivePart(multiply(f, g)), found).length, String(random.seed)).toBeGreaterThan(0)
      const rest = [g, h].map((part) => exactQuotient(primitivePart(multiply(f, part)), found))
      expect(commonDivisor(rest[0], rest[1]), String(random.seed)).toEqual([1n])
    }
  })

  it('tells at once that large polynomials are coprime', () => {
    const nines = '9'.repeat(150)
    const begun = performance.now()
    const { denominator } = parseRationalFunction(`(p^30+3*p^7+${nines})/(p^30-p^11+7*${nines}-1)/(p^29+5*p+${nines}-2)`)
    expect(denominator).toHaveLength(60)
    expect(performance.now() - begun).toBeLessThan(1_000)
  })
})
