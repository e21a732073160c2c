import { describe, expect, it } from 'vitest'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { loadExpressionParser, parseRationalFunction } from '../../shared/engine/sets/rational-function.ts'

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

  it('tells at once that large polynomials are coprime', () => {
    const nines = '9'.repeat(150)
    const begun = performance.now()
    const { denominator } = parseRationalFunction(`(p^30+3*p^7+${nines})/(p^30-p^11+7*${nines}-1)/(p^29+5*p+${nines}-2)`)
    expect(denominator).toHaveLength(60)
    expect(performance.now() - begun).toBeLessThan(1_000)
  })
})
