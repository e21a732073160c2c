import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test } from 'vitest'
import { ErrorBudget } from '../../client/src/components/charts/error-budget.tsx'
import { funnel } from '../../client/src/components/charts/funnel.ts'
import { Nest } from '../../client/src/components/charts/nest.tsx'
import { nest } from '../../client/src/components/charts/nest-layout.ts'
import { exponentTicks, log10OfText } from '../../client/src/components/charts/scale.ts'

describe('logarithms for drawing', () => {
  test.each([['1', 0], ['1e-42', -42], ['0.001', -3], ['3.1e-42', Math.log10(3.1) - 42], ['0.00071', Math.log10(7.1) - 4], ['250', Math.log10(2.5) + 2]])('%s', (text, log) => {
    expect(log10OfText(text)).toBeCloseTo(log, 10)
  })
  test('zero and what is no number have none', () => {
    expect(log10OfText('0.000')).toBeNull()
    expect(log10OfText('NaN')).toBeNull()
  })
  test('ticks are whole exponents', () => {
    expect(exponentTicks(-48.5, 0, 4)).toEqual([-39, -26, -13, 0])
  })
})

describe('funnel', () => {
  test('distances are told beyond what a double resolves', () => {
    const points = funnel([
      { at: '10', lo: '1.5', hi: '1.7' },
      { at: '20', lo: `1.6${'0'.repeat(39)}1`, hi: `1.6${'0'.repeat(39)}3` },
    ])
    expect(points[0]?.above).toBeCloseTo(-1, 6)
    expect(points[1]?.above).toBeCloseTo(-41, 6)
    expect(points[1]?.below).toBeCloseTo(-41, 6)
  })
})

describe('nest', () => {
  test('widest first, each magnified against the row above', () => {
    const rows = nest([
      { label: 'narrow', lo: `1.6366${'0'.repeat(30)}1`, hi: `1.6366${'0'.repeat(30)}2` },
      { label: 'wide', lo: '1.6366', hi: '1.6367' },
    ])
    expect(rows.map((row) => row.label)).toEqual(['wide', 'narrow'])
    expect(rows[1]?.magnification).toBe(31)
    expect(rows[1]?.conflict).toBe(false)
    for (const row of rows) {
      expect(row.start).toBeGreaterThan(0)
      expect(row.end).toBeLessThan(1)
      expect(row.start).toBeLessThan(row.end)
    }
  })
  test('enclosures that do not meet share a window in which the gap is seen', () => {
    const [, second] = nest([{ label: 'a', lo: '1.1', hi: '1.2' }, { label: 'b', lo: '1.3', hi: '1.35' }])
    expect(second?.conflict).toBe(true)
    expect(second?.above?.end).toBeLessThan(second?.start ?? 0)
  })
  test('a common end point is no conflict, and equal enclosures lie on each other', () => {
    expect(nest([{ label: 'a', lo: '1.1', hi: '1.2' }, { label: 'b', lo: '1.2', hi: '1.25' }])[1]?.conflict).toBe(false)
    const [one, other] = nest([{ label: 'a', lo: '1', hi: '1' }, { label: 'b', lo: '1', hi: '1' }])
    expect(one?.start).toBe(other?.start)
  })
})

describe('error budget', () => {
  test('the bars come with the table of the same numbers and the statement of each bound', () => {
    render(
      <MemoryRouter>
        <ErrorBudget items={[{ source: 'tail', bound: 'P-1', statement: 'Beyond x the sum is at most …', magnitude: '4.0e-8' }]} radius="4.1e-8" />
      </MemoryRouter>,
    )
    const table = screen.getByRole('table', { name: 'Error budget' })
    expect(table).toHaveTextContent('Tail4.0 · 10−8P-1Beyond x the sum is at most …')
    expect(table).toHaveTextContent('Radius4.1 · 10−8')
  })
})

describe('a chart', () => {
  test('has the table of the same numbers one key away', async () => {
    const user = userEvent.setup()
    render(
      <MemoryRouter>
        <Nest enclosures={[{ label: 'MST-0001/1', lo: '1.6', hi: '1.7' }, { label: 'MST-0001/2', lo: '1.72', hi: '1.73' }]} />
      </MemoryRouter>,
    )
    screen.getByRole('button', { name: 'Show as table' }).focus()
    await user.keyboard('t')
    expect(screen.getByRole('table')).toHaveTextContent('does not meet')
    await user.click(screen.getByRole('button', { name: 'Show as chart' }))
    expect(screen.queryByRole('table')).toBeNull()
  })
})
