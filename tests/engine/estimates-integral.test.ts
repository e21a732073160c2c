import { describe, expect, it } from 'vitest'
import { contains, radius } from '../../shared/engine/arithmetic/arithmetic.ts'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { type Rational, add, compare, magnitude, multiply, parseRational, rational } from '../../shared/engine/arithmetic/rational.ts'
import { logPowerIntegral } from '../../shared/engine/estimates/log-power-integral.ts'

const arithmetic = createBallArithmetic(128)
const exact = (text: string): Rational => parseRational(text)!
const point = (text: string) => arithmetic.rational(exact(text))

describe('integrals of t^-sigma (log t)^-beta', () => {
  // PARI/GP 2.15, intnum at 50 digits; the third is eint1(2).
  it.each([
    ['3/2', '2', '20', null, '1.9151202328158043807814587288844031972275940211848E-7'],
    ['2', '3/2', '18', null, '1.8475702040188609622820279453728810805924080491356E-10'],
    ['11/10', '1', '20', null, '0.048900510708061119567239835228049522314492184963023'],
    ['1001/1000', '2', '15', null, '0.062036695956918530729784828659211548721117502344645'],
    ['3/2', '-3/2', '20', '44', '0.0093976557175222879116062541891703246676816034465984'],
    ['4', '-4', '9', null, '4.7923576050448569376508684911994304229010889162320E-9'],
    ['3/2', '2', '20', '21', '8.5409010155327835566878308855161371507268071760417E-8'],
    ['1001/1000', '1', '20', '60', '1.0594008651659271945998886078482424007181436275688'],
  ])('sigma %s, beta %s, log from %s to %s', (sigma, beta, from, to, value) => {
    const integral = logPowerIntegral(arithmetic, exact(sigma), exact(beta), point(from), to === null ? null : point(to))
    // The 50 printed digits are taken to be good to 10^-45 relative.
    const slack = multiply(magnitude(exact(value)), rational(1n, 10n ** 45n))
    expect(contains(arithmetic, arithmetic.addError(integral, arithmetic.rational(slack)), exact(value))).toBe(true)
    expect(compare(radius(arithmetic, integral), add(multiply(exact(value), exact('1e-22')), exact('1e-36')))).toBe(-1)
  })

  it('has a closed form at sigma = 1', () => {
    const half = logPowerIntegral(arithmetic, rational(1), rational(2), point('4'), point('8'))
    expect(contains(arithmetic, half, rational(1, 8))).toBe(true)
    expect(contains(arithmetic, logPowerIntegral(arithmetic, rational(1), rational(3), point('4'), null), rational(1, 32))).toBe(true)
    expect(() => logPowerIntegral(arithmetic, rational(1), rational(1), point('4'), null)).toThrow(/diverges/)
  })

  it('adds up over neighbouring intervals', () => {
    const [sigma, beta] = [rational(5, 3), rational(-1, 2)]
    const whole = logPowerIntegral(arithmetic, sigma, beta, point('9'), null)
    const parts = arithmetic.add(
      logPowerIntegral(arithmetic, sigma, beta, point('9'), point('10.001')),
      logPowerIntegral(arithmetic, sigma, beta, point('10.001'), null),
    )
    const difference = arithmetic.subtract(whole, parts)
    expect(contains(arithmetic, difference, rational(0))).toBe(true)
  })
})
