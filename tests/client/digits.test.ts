import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import {
  certifiedRounded, certifiedTruncated, decimalText, groupDigits, intervalText, isDecimal, latexEnclosure, latexInterval,
  latexNumber, parseDecimal, scaleEnclosure, splitEnclosure,
} from '../../shared/digits.ts'

/** Every run of the properties below uses this seed; change it to look elsewhere. */
const SEED = 20_260_401

const enclosureText = fc
  .record({ low: fc.bigInt(-(10n ** 24n), 10n ** 24n), width: fc.oneof(fc.bigInt(0n, 10n ** 3n), fc.bigInt(0n, 10n ** 20n)), places: fc.nat(24) })
  .map(({ low, width, places }) => ({ low, high: low + width, places, lo: decimalText(low, places), hi: decimalText(low + width, places) }))

describe('reading decimals', () => {
  test('keeps the fraction as written and drops leading zeros', () => {
    expect(parseDecimal('007.500')).toEqual({ negative: false, integer: '7', fraction: '500' })
    expect(parseDecimal('-0.25')).toEqual({ negative: true, integer: '0', fraction: '25' })
    expect(parseDecimal('-0.000')).toEqual({ negative: false, integer: '0', fraction: '000' })
  })
  test.each(['', '.', '1e5', '1,5', ' 1', '0x10', '--1', 'NaN'])('refuses %j', (text) => {
    expect(isDecimal(text)).toBe(false)
    expect(() => parseDecimal(text)).toThrow(RangeError)
  })
  test('refuses an enclosure that is upside down', () => {
    expect(() => scaleEnclosure('1.2', '1.1999')).toThrow(/above/)
  })
})

describe('splitting an enclosure', () => {
  test('certified digits, then what each end goes on with', () => {
    expect(splitEnclosure('1.63661632', '1.63661641')).toEqual({ negative: false, integer: '1', decimals: '636616', lowerNext: '32', upperNext: '41' })
  })
  test('ends of different length are padded with zeros, which are exact', () => {
    expect(splitEnclosure('0.5', '0.5001')).toEqual({ negative: false, integer: '0', decimals: '500', lowerNext: '0', upperNext: '1' })
  })
  test('no shared integer part: both ends whole', () => {
    expect(splitEnclosure('0.9999', '1.0001')).toEqual({ negative: false, integer: null, decimals: '', lowerNext: '0.9999', upperNext: '1.0001' })
    expect(splitEnclosure('-0.1', '0.1').integer).toBeNull()
    expect(splitEnclosure('-0.1', '0').integer).toBeNull()
  })
  test('integer part shared, first decimal not', () => {
    expect(splitEnclosure('1.2', '1.3')).toEqual({ negative: false, integer: '1', decimals: '', lowerNext: '2', upperNext: '3' })
  })
  test('an exact value has nothing after it', () => {
    expect(splitEnclosure('1.25', '1.250')).toEqual({ negative: false, integer: '1', decimals: '250', lowerNext: '', upperNext: '' })
  })
  test('negative numbers: the upper end is the one nearer to zero', () => {
    expect(splitEnclosure('-1.3326', '-1.3325')).toEqual({ negative: true, integer: '1', decimals: '332', lowerNext: '6', upperNext: '5' })
  })
  test('following digits are cut outward', () => {
    expect(splitEnclosure('1.2345678', '1.2346789', 3)).toMatchObject({ decimals: '234', lowerNext: '567', upperNext: '679' })
    expect(splitEnclosure('-1.2346789', '-1.2345678', 3)).toMatchObject({ decimals: '234', lowerNext: '679', upperNext: '567' })
  })
  test('a cut that would carry into the certified digits keeps more digits instead', () => {
    expect(splitEnclosure('1.20001', '1.29998', 3)).toMatchObject({ decimals: '2', lowerNext: '0001', upperNext: '9998' })
  })
})

describe('certified digits', () => {
  test('truncated and rounded differ where the digits fall on a boundary', () => {
    expect(certifiedTruncated('0.4499', '0.4501')).toEqual({ decimals: 1, text: '0.4' })
    expect(certifiedRounded('0.4499', '0.4501')).toEqual({ decimals: 3, text: '0.450' })
  })
  test('a tie at an end is not decided', () => {
    expect(certifiedRounded('0.25', '0.26')).toEqual({ decimals: 0, text: '0' })
    expect(certifiedRounded('0.2501', '0.26')).toEqual({ decimals: 1, text: '0.3' })
    expect(certifiedRounded('0.5', '0.6')).toEqual({ decimals: 0, text: null })
    expect(certifiedRounded('0.50', '0.51')).toEqual({ decimals: 1, text: '0.5' })
  })
  // Sum over the primes of 1/(p log p): printed as 1.6366… in Forum Math. Pi 11 (2023) e18, p. 2.
  test('the printed digits of a published value come out of an enclosure of it', () => {
    expect(certifiedTruncated('1.63661632335', '1.63661632336').text).toMatch(/^1\.6366/)
  })
})

describe('properties', () => {
  const run = (property: fc.IProperty<[{ low: bigint; high: bigint; places: number; lo: string; hi: string }]>) =>
    fc.assert(property, { seed: SEED, numRuns: 2_000 })

  test('decimal text reads back to the same integer', () => {
    run(fc.property(enclosureText, ({ low, high, places, lo, hi }) => {
      expect(scaleEnclosure(lo, hi)).toEqual({ low, high, places })
    }))
  })
  test('shown digits still enclose, whatever is cut', () => {
    fc.assert(fc.property(enclosureText, fc.integer({ min: 1, max: 6 }), ({ low, high, places, lo, hi }, show) => {
      const { negative, integer, decimals, lowerNext, upperNext } = splitEnclosure(lo, hi, show)
      const start = integer === null ? '' : `${negative ? '-' : ''}${integer}.${decimals}`
      const shownLow = parseDecimal(start + lowerNext)
      const shownHigh = parseDecimal(start + upperNext)
      const at = (end: typeof shownLow) => BigInt(`${end.integer}${end.fraction.padEnd(places, '0')}`) * (end.negative ? -1n : 1n)
      expect(at(shownLow) <= low).toBe(true)
      expect(at(shownHigh) >= high).toBe(true)
      expect(lowerNext.length).toBe(integer === null ? lowerNext.length : upperNext.length)
    }), { seed: SEED, numRuns: 2_000 })
  })
  test('every number of the enclosure truncates to the certified digits, and one more digit is not shared', () => {
    run(fc.property(enclosureText, ({ low, high, places, lo, hi }) => {
      const { decimals, text } = certifiedTruncated(lo, hi)
      if (text === null) return
      const cut = (value: bigint, to: number) => value / 10n ** BigInt(places - to)
      expect(cut(low, decimals)).toBe(cut(high, decimals))
      if (decimals < places) expect(cut(low, decimals + 1)).not.toBe(cut(high, decimals + 1))
    }))
  })
  test('both ends are strictly within half a unit of the rounded digits, and no longer rounding is', () => {
    run(fc.property(enclosureText, ({ low, high, places, lo, hi }) => {
      if (low === high) return
      const within = (candidate: bigint, to: number) => {
        const unit = 10n ** BigInt(places - to)
        return 2n * low > 2n * candidate * unit - unit && 2n * high < 2n * candidate * unit + unit
      }
      const { decimals, text } = certifiedRounded(lo, hi)
      if (text !== null) {
        const { negative, integer, fraction } = parseDecimal(text)
        const spelled = BigInt(integer + fraction)
        expect(within(negative ? -spelled : spelled, decimals)).toBe(true)
      }
      for (let longer = text === null ? 0 : decimals + 1; longer <= places; longer += 1) {
        const guess = low / 10n ** BigInt(places - longer)
        for (const step of [-1n, 0n, 1n, 2n]) expect(within(guess + step, longer)).toBe(false)
      }
    }))
  })
})

describe('copies', () => {
  test('groups of five from the point', () => {
    expect(groupDigits('636616323351')).toEqual(['63661', '63233', '51'])
    expect(groupDigits('')).toEqual([])
  })
  test('LaTeX with thin spaces', () => {
    expect(latexNumber('1.636616323351')).toBe('1.63661\\,63233\\,51')
    expect(latexNumber('-12')).toBe('-12')
    expect(latexEnclosure('1.63661632', '1.63661641')).toBe('1.63661\\,6\\ldots')
    expect(latexEnclosure('1.25', '1.25')).toBe('1.25')
    expect(latexEnclosure('0.9', '1.1')).toBe('[0.9,\\ 1.1]')
    expect(latexInterval('1.2', '1.3')).toBe('[1.2,\\ 1.3]')
  })
  test('the plain interval is what is stored', () => {
    expect(intervalText('1.20', '1.30')).toBe('[1.20, 1.30]')
  })
})
