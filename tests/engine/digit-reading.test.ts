import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { MOST_DIGITS, plainDecimal, readDigits } from '../../shared/digit-reading.ts'

// How numbers are printed and pasted is common practice, no source; the digits of the sum over the primes are those in Forum Math. Pi 11 (2023) e18, p. 2.

function reading(text: string): string {
  const result = readDigits(text)
  if (!result.ok) return `refused: ${result.reason}`
  const { continues, uncertainty } = result.number
  return plainDecimal(result.number) + (continues ? '…' : '') + (uncertainty === null ? '' : ` ± ${uncertainty}`)
}

describe('reads digits however they are printed', () => {
  it.each([
    ['plain', '1.6366163', '1.6366163'],
    ['white space around', '  1.6366163\n', '1.6366163'],
    ['groups of five', '1.63661 63233 51260 8', '1.6366163233512608'],
    ['a first group that counts the units', '1.6366 16323 35126', '1.63661632335126'],
    ['lines that break anywhere', '1.63661 632\n33 51260\r\n8', '1.6366163233512608'],
    ['no-break, thin and narrow spaces', '1.63661\u00a063233\u200951260\u202f8', '1.6366163233512608'],
    ['LaTeX thin spaces', '1.63661\\,63233\\,51260\\,8', '1.6366163233512608'],
    ['other LaTeX spaces', '1.63661\\;63233\\:51260~8', '1.6366163233512608'],
    ['a LaTeX table row', '& $1.63661\\,63233$ \\\\', '1.6366163233'],
    ['siunitx', '\\num{1.63661}', '1.63661'],
    ['a decimal comma', '1,63661 63233', '1.6366163233'],
    ['a decimal comma in braces', '1{,}63661\\,63233', '1.6366163233'],
    ['a decimal comma after a nought', '0,636', '0.636'],
    ['a decimal comma before dots', '1,636…', '1.636…'],
    ['commas between groups after a point', '1.63661,63233', '1.6366163233'],
    ['thousands by commas', '1,234.5', '1234.5'],
    ['thousands by commas, whole', '1,636,616', '1636616'],
    ['thousands by points before a comma', '1.234.567,89', '1234567.89'],
    ['thousands by apostrophes', '1’636.5', '1636.5'],
    ['thousands by spaces', '9 999 939 830.657 757', '9999939830.657757'],
    ['a raised point', '1·6366', '1.6366'],
    ['three dots', '1.6366...', '1.6366…'],
    ['spaced dots', '1.6366 . . .', '1.6366…'],
    ['an ellipsis', '1.6366 …', '1.6366…'],
    ['LaTeX dots', '1.6366\\ldots', '1.6366…'],
    ['LaTeX dots with braces and a full stop', '1.6366\\dots{}.', '1.6366…'],
    ['a full stop that ends the sentence', '1.6366.', '1.6366'],
    ['a comma that ends the clause', '1.6366,', '1.6366'],
    ['an equals sign before it', '= 1.6366', '1.6366'],
    ['an approximate sign before it', '≈ 1.6366', '1.6366'],
    ['a name before the sign', '$f(\\mathcal P) \\approx 1.6366\\ldots$', '1.6366…'],
    ['an uncertainty in brackets', '1.63661(3)', '1.63661 ± 3'],
    ['an uncertainty of two places, spaced', '1.63661 (12).', '1.63661 ± 12'],
    ['an uncertainty after plus-minus', '1.6366 ± 0.0002', '1.6366 ± 2'],
    ['an uncertainty after LaTeX plus-minus', '1.6366\\pm 0.01', '1.6366 ± 100'],
    ['a negative number', '-0.25', '-0.25'],
    ['a negative number with a true minus', '−1.33258', '-1.33258'],
    ['a plus sign', '+1.5', '1.5'],
    ['no nought before the point', '.5', '0.5'],
    ['noughts in front', '001.50', '1.50'],
    ['an exponent', '1.6e-3', '0.0016'],
    ['a power of ten', '1.6 \\times 10^{-3}', '0.0016'],
    ['an exponent that its digits cover', '1.63661E2', '163.661'],
  ])('%s', (_, text, expected) => expect(reading(text)).toBe(expected))
})

describe('refuses what can be read in two ways, and says why', () => {
  it.each([
    ['no digits', 'about one', 'no digits'],
    ['digits of another script', '١٫٦', 'no digits'],
    ['a comma that may be either', '1,636', 'may be a decimal mark or may group thousands'],
    ['point and comma that may be either', '1.636,616', 'Either the point or the comma'],
    ['two numbers', '1.6366 1.1448', 'more than one number'],
    ['a table of k and value', '1 1.6366', 'not one whole number'],
    ['two whole numbers', '1 2', 'not one whole number'],
    ['points between groups', '1.636.616', 'more than one point'],
    ['groups of unequal size', '1.6366 1632 33512', 'unequal size'],
    ['a long and a short group', '1.6366163233512 61', 'unequal size'],
    ['an interval', '[1.63, 1.64]', 'interval'],
    ['a number on both sides', '1.6366 = 1.63661', 'both sides'],
    ['digits after dots', '1.63…66', 'follows the dots'],
    ['a footnote mark', '1.6366²', '“²”'],
    ['a letter', '1.6366x', '“x”'],
    ['an unknown command', '\\foo 1.6366', '\\foo'],
    ['digits that an exponent leaves out', '6.0e5', 'not written out'],
    ['an uncertainty finer than the number', '1.6 ± 0.002', 'more places'],
    ['dots and an uncertainty', '1.6366…(2)', 'exclude each other'],
    ['too many digits', `0.${'1'.repeat(MOST_DIGITS)}`, 'more than 10,000 digits'],
  ])('%s', (_, text, reason) => expect(reading(text)).toMatch(new RegExp(`^refused: .*${reason.replace(/[\\^$.*+?()[\]{}|]/g, '\\$&')}`)))
})

describe('whatever is pasted', () => {
  it('reads back a number in groups of any regular size, with any separator', () => {
    fc.assert(
      fc.property(
        fc.stringMatching(/^\d{1,4}$/), fc.stringMatching(/^\d{0,60}$/), fc.integer({ min: 2, max: 10 }), fc.constantFrom(' ', '\\,', '\u2009', '\n', '\\;', '~'), fc.constantFrom('', '…', '\\ldots', ' ...'),
        (integer, fraction, size, separator, dots) => {
          const groups = fraction.match(new RegExp(`\\d{1,${size}}`, 'g')) ?? []
          const expected = `${integer.replace(/^0+(?=\d)/, '')}${fraction === '' ? '' : `.${fraction}`}${dots === '' ? '' : '…'}`
          expect(reading(`${integer}.${groups.join(separator)}${dots}`)).toBe(expected)
        },
      ),
    )
  })

  it('answers and never throws', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'0123456789.,(){}\\ +-=±×e^…\n\'[]') })), (text) => {
      const result = readDigits(text)
      if (result.ok) expect(plainDecimal(result.number)).toMatch(/^-?(0|[1-9]\d*)(\.\d+)?$/)
      else expect(result.reason).not.toBe('')
    }), { numRuns: 3_000 })
  })

  it.each(Object.entries({
    spaces: `1.5${' '.repeat(99_000)}x`, dots: `1.5${'.'.repeat(99_000)}x`, 'spaced dots': `1.5${'. '.repeat(49_000)}x`, lines: `1.5${'\n '.repeat(49_000)}x`,
    commands: '\\hspace{'.repeat(12_000), rows: '\\\\['.repeat(33_000), groups: `1.${'12345 '.repeat(16_000)}`, brackets: '(1'.repeat(49_000), thousands: "1'".repeat(49_000),
  }))('takes little time on a long run of %s', (_, text) => {
    const begun = performance.now()
    expect(readDigits(text).ok).toBe(false)
    expect(performance.now() - begun).toBeLessThan(500)
  })
})
