import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { readSubject } from '../../client/src/features/digit-check/subject.ts'
import { compatibilityWords } from '../../client/src/features/look-up/compatibility.ts'
import type { LookUpItem } from '../../client/src/features/look-up/queries.ts'
import { DigitCheckView } from '../../client/src/pages/digit-check/digit-check-view.tsx'
import type { Against } from '../../client/src/pages/digit-check/digit-check-view.tsx'
import { LookUpView } from '../../client/src/pages/look-up/look-up-view.tsx'

const found: LookUpItem = {
  constant: {
    number: 'MST-0001', definition: { canonical: {}, latex: '\\sum_p \\frac{1}{p\\log p}', text: 'sum over primes p of 1/(p log p)', aliases: [] },
    best: { lo: '1.636616', hi: '1.636617', digits: { truncated: 5, rounded: 5 } }, state: 'signed', inConflict: false, group: { id: 'g', name: 'Institute' }, changedAt: '2026-03-01T08:00:00Z',
  },
  compatibleTo: 4, ruledOutAt: null,
}

describe('look-up', () => {
  test.each([
    [{ compatibleTo: 12, ruledOutAt: null }, 'compatible to 12 digits'],
    [{ compatibleTo: 1, ruledOutAt: null }, 'compatible to 1 digit'],
    [{ compatibleTo: 6, ruledOutAt: 7 }, 'ruled out at place 7'],
    [{ compatibleTo: 0, ruledOutAt: 0 }, 'ruled out at the units'],
    [{ compatibleTo: 0, ruledOutAt: -1 }, 'ruled out before the point'],
  ])('%j is told as %s', (item, words) => {
    expect(compatibilityWords(item)).toBe(words)
  })
  test('what was found leads to the constant and to the check of each digit', () => {
    render(<MemoryRouter><LookUpView digits="1.6366" reading="truncated" found={{ data: [found], error: null, onRetry: () => undefined }} unreadable={null} busy={false} onLookUp={() => undefined} /></MemoryRouter>)
    expect(screen.getByRole('link', { name: 'MST-0001' })).toHaveAttribute('href', '/constants/MST-0001')
    expect(screen.getByRole('link', { name: 'Check the digits against MST-0001' })).toHaveAttribute('href', '/digit-check?against=MST-0001&digits=1.6366&reading=truncated')
  })
  test('digits and reading are looked up as they were typed; what can’t be read is told at the field', async () => {
    const lookUp = vi.fn()
    const { rerender } = render(<MemoryRouter><LookUpView digits="" reading="truncated" found={null} unreadable={null} busy={false} onLookUp={lookUp} /></MemoryRouter>)
    await userEvent.type(screen.getByRole('textbox', { name: 'Leading digits' }), '1,6366')
    await userEvent.click(screen.getByRole('radio', { name: 'rounded' }))
    await userEvent.click(screen.getByRole('button', { name: 'Look up' }))
    expect(lookUp).toHaveBeenCalledWith('1,6366', 'rounded')
    rerender(<MemoryRouter><LookUpView digits="1.2.3" reading="rounded" found={null} unreadable="There is more than one point." busy={false} onLookUp={lookUp} /></MemoryRouter>)
    expect(screen.getByRole('textbox', { name: 'Leading digits' })).toHaveValue('1.2.3')
    expect(screen.getByRole('textbox', { name: 'Leading digits' })).toBeInvalid()
  })
  test('an empty answer says what to try', () => {
    render(<MemoryRouter><LookUpView digits="7.7" reading="truncated" found={{ data: [], error: null, onRetry: () => undefined }} unreadable={null} busy={false} onLookUp={() => undefined} /></MemoryRouter>)
    expect(screen.getByText('No constant of the register is near these digits.')).toBeInTheDocument()
  })
})

describe('what digits are held against', () => {
  test.each([
    ['', { kind: 'none' }],
    ['MST-0042', { kind: 'constant', number: 'MST-0042' }],
    ['mst 42', { kind: 'constant', number: 'MST-0042' }],
    ['MST-0042/1', { kind: 'claim', number: 'MST-0042/1' }],
    ['mst-0042-1', { kind: 'claim', number: 'MST-0042/1' }],
    ['[1.5, 1.6]', { kind: 'interval', lo: '1.5', hi: '1.6' }],
  ])('%j is understood', (text, subject) => {
    expect(readSubject(text)).toEqual(subject)
  })
  test.each(['MST', 'MST-0042/', '42', '[1.6, 1.5]', 'primes'])('%j is refused with a reason', (text) => {
    expect(readSubject(text)).toMatchObject({ kind: 'unreadable' })
  })

  const show = (against: Against, onSubject = vi.fn()) => {
    render(<MemoryRouter><DigitCheckView subject="MST-0001" against={against} value={{ text: '', reading: 'truncated' }} onSubject={onSubject} onChange={() => undefined} /></MemoryRouter>)
    return onSubject
  }
  test('a constant of which nothing is signed offers its claims instead', () => {
    show({ status: 'without-enclosure', number: 'MST-0001', claims: ['MST-0001/1'] })
    expect(screen.getByRole('link', { name: 'MST-0001/1' })).toHaveAttribute('href', '/digit-check?against=MST-0001%2F1')
    expect(screen.queryByRole('textbox', { name: 'Digits of the manuscript' })).toBeNull()
  })
  test('with an enclosure there is a field for the digits', async () => {
    const choose = show({ status: 'ready', lo: '1.636616', hi: '1.636617', of: null })
    expect(screen.getByRole('textbox', { name: 'Digits of the manuscript' })).toBeInTheDocument()
    const field = screen.getByRole('textbox', { name: 'Against' })
    await userEvent.clear(field)
    await userEvent.type(field, 'MST-0002{Enter}')
    expect(choose).toHaveBeenCalledWith('MST-0002')
  })
})
