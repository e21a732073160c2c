import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkDigits, intervalOfDigits, summaryOfCheck, type PrintedAs } from '../../shared/digit-check.ts'
import { readDigits } from '../../shared/digit-reading.ts'
import { decimalText, scaleEnclosure } from '../../shared/digits.ts'

function check(text: string, reading: PrintedAs, lo: string, hi: string) {
  const result = readDigits(text)
  if (!result.ok) throw new Error(result.reason)
  return checkDigits(result.number, reading, lo, hi)
}
/** Verdicts as letters, c r u, in the order of the digits. */
const letters = (text: string, reading: PrintedAs, lo: string, hi: string) => check(text, reading, lo, hi).digits.map(({ verdict }) => verdict[0]).join('')

// Digits of the sum of 1/(p log p) over the primes, computed with Arb and PARI/GP for published-value checks; the printed 1.6366…
// is that of Forum Math. Pi 11 (2023) e18, p. 2.
const PRIMES = { lo: '1.63661632335126086856', hi: '1.63661632335126086857' }

describe('digits of the sum over the primes', () => {
  it('confirms what is printed', () => {
    const result = check('1.6366…', 'truncated', PRIMES.lo, PRIMES.hi)
    expect(result).toMatchObject({ whole: 'confirmed', firstWrong: null, confirmed: 4 })
    expect(summaryOfCheck(result, 'truncated')).toBe('Every digit is confirmed, read as truncated.')
  })

  it('points at the first wrong place', () => {
    const result = check('1.63661 63238 51260', 'truncated', PRIMES.lo, PRIMES.hi)
    expect(result).toMatchObject({ whole: 'refuted', firstWrong: 10, confirmed: 9 })
    expect(result.digits[10]).toEqual({ digit: '8', place: 10, verdict: 'refuted' })
    expect(summaryOfCheck(result, 'truncated')).toContain('place 10 after the point')
  })

  it('tells truncated from rounded', () => {
    expect(check('1.63662', 'rounded', PRIMES.lo, PRIMES.hi).whole).toBe('confirmed')
    expect(check('1.63662', 'truncated', PRIMES.lo, PRIMES.hi)).toMatchObject({ whole: 'refuted', firstWrong: 5 })
    expect(check('1.63661', 'rounded', PRIMES.lo, PRIMES.hi)).toMatchObject({ whole: 'refuted', firstWrong: 5 })
  })

  it('leaves undecided what the enclosure does not decide', () => {
    expect(letters('1.636616323351260868563', 'truncated', PRIMES.lo, PRIMES.hi)).toBe(`${'c'.repeat(20)}uu`)
  })
})

describe('at the corners', () => {
  it.each([
    ['an end that is the next digit exactly', '1.2', 'truncated', '1.25', '1.3', 'cu'],
    ['a carry through all places', '1.999', 'truncated', '1.9999', '2.0001', 'uuuu'],
    ['a carry that is certain', '1.999', 'truncated', '2', '2.0001', 'rrrr'],
    ['a tie rounds either way', '0.3', 'rounded', '0.25', '0.25', 'cu'],
    ['a tie at the lower end', '0.2', 'rounded', '0.25', '0.26', 'cu'],
    ['just above a tie', '0.2', 'rounded', '0.2500001', '0.26', 'cr'],
    ['more places than the enclosure has', '0.5000', 'truncated', '0.5', '0.5', 'ccccc'],
    ['ten digits possible', '0.57', 'truncated', '0.5', '0.6', 'cuu'],
    ['nine possible, the tenth not', '0.59', 'truncated', '0.50', '0.589', 'ccr'],
    ['whole digits missing in front', '1.6', 'truncated', '21.6', '21.6', 'rcc'],
    ['whole digits too many', '21.6', 'truncated', '1.6', '1.6', 'rcc'],
    ['about zero', '0.1', 'truncated', '-0.2', '0.3', 'cu'],
    ['a negative number cut towards zero', '-1.2', 'truncated', '-1.29', '-1.21', 'cc'],
    ['a negative number rounded', '-1.3', 'rounded', '-1.29', '-1.26', 'cc'],
  ] as const)('%s', (_, text, reading, lo, hi, expected) => expect(letters(text, reading, lo, hi)).toBe(expected))

  it('judges the sign', () => {
    expect(check('1.5', 'truncated', '-1.6', '-1.5')).toMatchObject({ sign: 'refuted', whole: 'refuted', firstWrong: 0 })
    expect(check('-1.5', 'truncated', '-1.6', '-1.5')).toMatchObject({ sign: 'confirmed' })
    expect(check('0.1', 'truncated', '-0.2', '0.3').sign).toBe('undecided')
    expect(check('0.0', 'truncated', '-0.01', '0.01')).toMatchObject({ sign: 'confirmed', whole: 'confirmed' })
  })

  it('finds that digits which are possible one by one are not possible together', () => {
    expect(check('2.9', 'truncated', '1.9', '2.05')).toMatchObject({ whole: 'refuted', firstWrong: 1 })
    expect(letters('2.9', 'truncated', '1.9', '2.05')).toBe('uu')
  })

  it('holds a stated uncertainty against the enclosure', () => {
    expect(check('1.6366(1)', 'rounded', '1.63661', '1.63662').uncertainty).toBe('confirmed')
    expect(check('1.6360(3)', 'rounded', '1.63661', '1.63662').uncertainty).toBe('refuted')
    expect(check('1.6366(1)', 'rounded', '1.6366', '1.7').uncertainty).toBe('undecided')
  })
})

const scaledEnclosure = fc.record({ places: fc.integer({ min: 1, max: 3 }), low: fc.integer({ min: -3_000, max: 3_000 }), width: fc.integer({ min: 0, max: 60 }) })
const printed = fc.record({ negative: fc.boolean(), value: fc.integer({ min: 0, max: 4_000 }), places: fc.integer({ min: 0, max: 3 }) })

/** The integers that |x| 10^places gives when cut or rounded, for every multiple of 10^-4 in [lo, hi] (in these units): a plain search. */
function possible(lo: number, hi: number, places: number, reading: PrintedAs): number[] {
  const unit = 10 ** (4 - places)
  const found = new Set<number>()
  for (let x = lo; x <= hi; x += 1) {
    const size = Math.abs(x)
    if (reading === 'truncated') found.add(Math.floor(size / unit))
    else {
      found.add(Math.floor((size + unit / 2) / unit))
      found.add(Math.ceil((size - unit / 2) / unit))
    }
  }
  return [...found]
}

describe('against every number of the enclosure', () => {
  it('agrees with a search, digit by digit', () => {
    fc.assert(fc.property(scaledEnclosure, printed, fc.constantFrom<PrintedAs>('truncated', 'rounded'), (enclosure, { negative, value, places }, reading) => {
      const lo = decimalText(BigInt(enclosure.low), enclosure.places)
      const hi = decimalText(BigInt(enclosure.low + enclosure.width), enclosure.places)
      const text = decimalText(BigInt(value), places)
      const result = check(`${negative ? '-' : ''}${text}`, reading, lo, hi)
      const scale = 10 ** (4 - enclosure.places)
      const candidates = possible(enclosure.low * scale, (enclosure.low + enclosure.width) * scale, places, reading)
      const cut = (number: number, place: number) => Math.floor(number / 10 ** (places - place))
      for (const { digit, place, verdict } of result.digits) {
        const there = candidates.map((candidate) => cut(candidate, place) % 10 === Number(digit))
        expect([place, verdict]).toEqual([place, there.every(Boolean) ? 'confirmed' : there.some(Boolean) ? 'undecided' : 'refuted'])
      }
      const fits = (place: number) => candidates.some((candidate) => cut(candidate, place) === cut(value, place))
      if (result.sign !== 'refuted') expect(result.firstWrong).toBe(result.digits.find(({ place }) => !fits(place))?.place ?? null)
    }), { numRuns: 1_000 })
  })

  it('turns printed digits into the interval of all numbers that print so', () => {
    fc.assert(fc.property(printed, fc.constantFrom<PrintedAs>('truncated', 'rounded'), ({ negative, value, places }, reading) => {
      const text = `${negative ? '-' : ''}${decimalText(BigInt(value), places)}`
      const read = readDigits(text)
      if (!read.ok) throw new Error(read.reason)
      const { lo, hi } = intervalOfDigits(read.number, reading)
      const { low, high, places: scale } = scaleEnclosure(lo, hi)
      expect(high - low).toBe(10n ** BigInt(scale - places))
      // The middle prints as given; beyond either end nothing does.
      const middle = decimalText((low + high) * 5n, scale + 1)
      if (value !== 0 || reading === 'rounded') expect(checkDigits({ ...read.number, negative: value !== 0 && negative }, reading, middle, middle).whole).toBe('confirmed')
    }))
  })
})
