import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import * as fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { checkText, correctDigits, printedGroups, readInterval } from '../../client/src/features/digit-check/check.ts'
import { DigitCheck } from '../../client/src/features/digit-check/components/digit-check.tsx'
import { checkDigits } from '../../shared/digit-check.ts'
import { readDigits } from '../../shared/digit-reading.ts'
import { decimalText } from '../../shared/digits.ts'

/** The sum of 1/(p log p) over the primes to 20 places, as computed with Arb 2.23 and, independently, PARI/GP 2.15. */
const PRIMES = { lo: '1.63661632335126086856', hi: '1.63661632335126086857' }

describe('correct digits', () => {
  test('truncated and rounded to the places asked for', () => {
    expect(correctDigits(PRIMES.lo, PRIMES.hi, 'truncated', 5)).toEqual({ places: 5, text: '1.63661' })
    expect(correctDigits(PRIMES.lo, PRIMES.hi, 'rounded', 5)).toEqual({ places: 5, text: '1.63662' })
    expect(correctDigits(PRIMES.lo, PRIMES.hi, 'truncated', 0)).toEqual({ places: 0, text: '1' })
    expect(correctDigits(PRIMES.lo, PRIMES.hi, 'rounded', 0)).toEqual({ places: 0, text: '2' })
  })
  test('beyond what the enclosure decides, the most that it decides', () => {
    expect(correctDigits(PRIMES.lo, PRIMES.hi, 'truncated', 40)).toEqual({ places: 19, text: '1.6366163233512608685' })
    expect(correctDigits('0.9', '2.1', 'truncated', 3)).toBeNull()
  })
  test('what it says should stand there is confirmed by the check itself', () => {
    const ends = fc.tuple(fc.bigInt({ min: -(10n ** 12n), max: 10n ** 12n }), fc.bigInt({ min: 0n, max: 10n ** 6n }))
    fc.assert(
      fc.property(ends, fc.constantFrom('truncated', 'rounded'), fc.integer({ min: 0, max: 12 }), ([low, width], reading, places) => {
        const [lo, hi] = [decimalText(low, 9), decimalText(low + width, 9)]
        const correct = correctDigits(lo, hi, reading, places)
        if (correct === null) return
        const read = readDigits(correct.text)
        expect(read.ok && checkDigits(read.number, reading, lo, hi).firstWrong).toBeNull()
      }),
    )
  })
})

describe('printed groups', () => {
  const groupsOf = (text: string) => {
    const checked = checkText(text, 'truncated', PRIMES.lo, PRIMES.hi)
    return checked.kind === 'checked' ? printedGroups(checked.result) : null
  }
  test('the first wrong digit is refuted where it stands, though it is possible alone', () => {
    // Of numbers from 1.49 to 1.51 the third digit can be 9, but not after 1.5.
    const checked = checkDigits({ negative: false, integer: '1', fraction: '59', uncertainty: null } as Parameters<typeof checkDigits>[0], 'truncated', '1.49', '1.51')
    expect(checked.firstWrong).toBe(2)
    expect(printedGroups(checked).flat().map(({ digits, verdict, firstWrong }) => [digits, verdict, firstWrong])).toEqual([['1', 'confirmed', false], ['5', 'undecided', false], ['9', 'refuted', true]])
  })
  test('groups of five after the point, cut where the verdict changes', () => {
    expect(groupsOf('1.63661 64')?.map((group) => group.map(({ digits, verdict }) => `${digits} ${verdict}`))).toEqual([
      ['1 confirmed'], ['63661 confirmed'], ['6 confirmed', '4 refuted'],
    ])
  })
  test('the first wrong digit begins a run of its own', () => {
    expect(groupsOf('1.6467')?.[1]).toEqual([
      { digits: '6', verdict: 'confirmed', place: 1, firstWrong: false },
      { digits: '4', verdict: 'refuted', place: 2, firstWrong: true },
      { digits: '6', verdict: 'confirmed', place: 3, firstWrong: false },
      { digits: '7', verdict: 'refuted', place: 4, firstWrong: false },
    ])
  })
})

describe('an interval as typed', () => {
  test.each(['[1.5, 1.6]', '1.5 1.6', '(1.5; 1.6)', '1.5\n1.6'])('%j is read', (text) => {
    expect(readInterval(text)).toEqual({ ok: true, lo: '1.5', hi: '1.6' })
  })
  test.each([['1.5', 'two decimal numbers'], ['[1.6, 1.5]', 'lower end'], ['[1.5e3, 2]', 'plain decimal']])('%j is refused', (text, reason) => {
    expect(readInterval(text)).toEqual({ ok: false, reason: expect.stringContaining(reason) as string })
  })
})

describe('the page', () => {
  test('tells each digit by a word and points at the first wrong one', async () => {
    render(<DigitCheck {...PRIMES} />)
    await userEvent.type(screen.getByRole('textbox', { name: 'Digits of the manuscript' }), '1.63671')
    expect(screen.getAllByRole('status')[0]).toHaveTextContent('Refuted. Wrong at place 4 after the point')
    expect(screen.getByText('refuted', { exact: false, selector: 'span.text-refused' })).toHaveTextContent('refuted, first wrong digit')
    expect(screen.getByText('1.63661')).toBeInTheDocument()
    await userEvent.click(screen.getByRole('radio', { name: 'rounded' }))
    expect(screen.getByText('1.63662')).toBeInTheDocument()
  })
  test('what can’t be read is said at the field and nothing is cleared', async () => {
    render(<DigitCheck {...PRIMES} />)
    const field = screen.getByRole('textbox', { name: 'Digits of the manuscript' })
    await userEvent.type(field, '1.2.3')
    expect(field).toBeInvalid()
    expect(screen.getByRole('alert')).toHaveTextContent('more than one point')
    expect(field).toHaveValue('1.2.3')
  })
})
