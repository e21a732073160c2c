import { describe, expect, it } from 'vitest'
import { certifiedDigits, lowerDecimal, parseDecimal, scientificUpper, upperDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { binomial, bitLength, ceilDivide, ceilShift, factorial, floorDivide, floorShift, gcd, isqrt, nearestShift } from '../../shared/engine/arithmetic/integers.ts'
import { isPrime, moebius, primeDivisors, primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { add, compare, divide, multiply, parseRational, rational, subtract, toText } from '../../shared/engine/arithmetic/rational.ts'
import { Random } from '../support/random.ts'

const random = new Random()
const seed = `seed ${random.seed}`

describe('integers', () => {
  it('round in the direction that their names say', () => {
    for (let i = 0; i < 3000; i++) {
      const [n, d, shift] = [random.signed(300), random.big(120) + 1n, random.whole(-40, 200)]
      const [floor, ceil] = [floorDivide(n, d), ceilDivide(n, d)]
      expect(floor * d <= n && n < (floor + 1n) * d, seed).toBe(true)
      expect(ceil * d >= n && n > (ceil - 1n) * d, seed).toBe(true)
      const scale = 1n << BigInt(Math.abs(shift))
      expect(floorShift(n, shift), seed).toBe(shift >= 0 ? floorDivide(n, scale) : n * scale)
      expect(ceilShift(n, shift), seed).toBe(shift >= 0 ? ceilDivide(n, scale) : n * scale)
      const twice = 2n * (nearestShift(n, Math.abs(shift)) * scale - n)
      expect(twice <= scale && twice >= -scale, seed).toBe(true)
    }
  })

  it('know their bit lengths and roots', () => {
    for (let i = 0; i < 2000; i++) {
      const n = random.big(400)
      expect(bitLength(-n), seed).toBe(n === 0n ? 0 : n.toString(2).length)
      const root = isqrt(n)
      expect(root * root <= n && n < (root + 1n) * (root + 1n), seed).toBe(true)
    }
  })

  it('have the usual factorials, binomials and divisors', () => {
    expect(factorial(20)).toBe(2432902008176640000n)
    expect(binomial(50, 25)).toBe(126410606437752n)
    expect(gcd(-84n, 36n)).toBe(12n)
    expect(primesUpTo(30)).toEqual([2, 3, 5, 7, 11, 13, 17, 19, 23, 29])
    expect(primeDivisors(2 ** 3 * 3 * 101 * 101)).toEqual([2, 3, 101])
    expect([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 30].map(moebius)).toEqual([1, -1, -1, 0, -1, 1, -1, 0, 0, 1, -1])
    expect([0, 1, 2, 9, 97, 2 ** 31 - 1, 2.5].map(isPrime)).toEqual([false, false, true, false, true, true, false])
  })
})

describe('rationals', () => {
  it('obey the laws of a field, in lowest terms', () => {
    for (let i = 0; i < 500; i++) {
      const [a, b, c] = [random.fraction(200), random.fraction(200), random.fraction(200)]
      expect(multiply(a, add(b, c)), seed).toEqual(add(multiply(a, b), multiply(a, c)))
      expect(add(subtract(a, b), b), seed).toEqual(a)
      if (b.num !== 0n) expect(multiply(divide(a, b), b), seed).toEqual(a)
      expect(gcd(a.num, a.den), seed).toBe(1n)
      expect(parseRational(toText(a)), seed).toEqual(a)
    }
  })

  it('read exactly what is written, and nothing else', () => {
    expect(parseRational('-0.125')).toEqual(rational(-1, 8))
    expect(parseRational('12e-3')).toEqual(rational(3, 250))
    expect(parseRational('4/6')).toEqual(rational(2, 3))
    for (const text of ['', '.', '1/0', '1/-2', '0x10', 'NaN', '1,5', '1e999999', '--1', '1 2']) expect(parseRational(text), text).toBeNull()
  })
})

describe('decimals', () => {
  it('bracket the number within one unit of the last place', () => {
    for (let i = 0; i < 2000; i++) {
      const [a, places] = [random.fraction(150), random.whole(0, 60)]
      const [lo, hi] = [parseDecimal(lowerDecimal(a, places))!, parseDecimal(upperDecimal(a, places))!]
      expect(compare(lo, a) <= 0 && compare(a, hi) <= 0, seed).toBe(true)
      expect(compare(multiply(subtract(hi, lo), rational(10n ** BigInt(places))), rational(1)) <= 0, seed).toBe(true)
    }
  })

  it('write magnitudes rounded up', () => {
    expect(scientificUpper(rational(1, 3))).toBe('3.4e-1')
    expect(scientificUpper(rational(999, 1000))).toBe('1.0e0')
    expect(scientificUpper(rational(1))).toBe('1.0e0')
    expect(scientificUpper(rational(0))).toBe('0')
    for (let i = 0; i < 1000; i++) {
      const a = rational(random.big(300) + 1n, random.big(300) + 1n)
      const written = parseRational(scientificUpper(a))!
      expect(compare(written, a) >= 0 && compare(written, multiply(a, rational(11, 10))) <= 0, seed).toBe(true)
    }
  })

  it('count the digits that all numbers of an interval share', () => {
    const digits = (lo: string, hi: string) => certifiedDigits(parseDecimal(lo)!, parseDecimal(hi)!, 30)
    expect(digits('1.23456', '1.23457')).toEqual({ truncated: 4, rounded: 4 })
    expect(digits('0.99999', '1.00001')).toEqual({ truncated: -1, rounded: 4 })
    expect(digits('-1.25', '-1.24')).toEqual({ truncated: 1, rounded: 0 })
    expect(digits('-0.2', '0.3')).toEqual({ truncated: 0, rounded: 0 })
    expect(digits('2.5', '2.5')).toEqual({ truncated: 30, rounded: 30 })
    expect(digits('1', '3')).toEqual({ truncated: -1, rounded: -1 })
  })
})
