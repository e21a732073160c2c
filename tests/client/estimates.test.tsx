import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { estimateFiltersOf, filterEstimates, shortTitle } from '../../client/src/features/estimates/estimate-filters.ts'
import { Printed } from '../../client/src/components/formula/printed.tsx'
import { printedText } from '../../shared/printed-text.ts'
import { EstimateView } from '../../client/src/pages/estimate/estimate-view.tsx'
import { EstimatesView } from '../../client/src/pages/estimates/estimates-view.tsx'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import type { Estimate } from '../../shared/schemas/estimate.ts'

const estimate = (more: Partial<Estimate> = {}): Estimate => ({
  id: 'theta-one', title: 'Somebody 2018, k = 1, x >= 908994923', statementLatex: '|\\theta(x)-x| < 0.001\\,\\frac{x}{\\log x}', statement: '|theta(x) - x| < 0.001 x / log x',
  validFor: 'x >= 908994923', conditional: false, condition: null, source: 'A journal 45 (2018), Theorem 4.2', checked: 'Checked to 10^8.', state: 'in-force', stateSince: null, doubts: [], abilities: { doubt: false }, uses: 0, usedBy: [], ...more,
})
const have = <Data,>(data: Data) => ({ data, error: null, onRetry: () => undefined })
const all = [estimate(), estimate({ id: 'theta-two', title: 'Another 1976', conditional: true, condition: 'the Riemann hypothesis' }), estimate({ id: 'theta-three', title: 'Third 2021', state: 'in-doubt', stateSince: '2026-03-01T08:00:00Z', doubts: [{ group: { id: 'g', name: 'Haldern Institute' }, own: false, at: '2026-03-01T08:00:00Z', reason: 'Lemma 4 has a gap.', lifted: null }], uses: 1, usedBy: [{ claimNumber: 'MST-0001/1', usedAt: 'x >= 10^9' }] })]
const idsOf = (search: string) => filterEstimates(all, estimateFiltersOf(new URLSearchParams(search))).map(({ id }) => id)

describe('filters', () => {
  test.each([
    ['', ['theta-one', 'theta-two', 'theta-three']],
    ['conditional=yes', ['theta-two']],
    ['conditional=no&state=in-force', ['theta-one']],
    ['state=in-doubt', ['theta-three']],
    ['use=used', ['theta-three']],
    ['text=riemann', ['theta-two']],
    ['text=journal+2021', ['theta-three']],
    ['conditional=perhaps&state=gone', ['theta-one', 'theta-two', 'theta-three']],
  ])('%j finds %j', (search, ids) => {
    expect(idsOf(search)).toEqual(ids)
  })
  test('every estimate of the library is found by its own id', () => {
    const views = ESTIMATES.map((each) => estimate(each))
    for (const { id } of ESTIMATES) expect(filterEstimates(views, estimateFiltersOf(new URLSearchParams({ text: id }))).map((found) => found.id)).toContain(id)
  })
})

describe('print', () => {
  test('a range has its signs and its thin spaces', () => {
    expect(printedText('1427 <= x <= 10^19')).toBe('1427\u00a0≤\u00a0x\u00a0≤\u00a010^19')
    expect(printedText('x >= 908994923')).toBe('x\u00a0≥\u00a0908\u202f994\u202f923')
    expect(printedText('1.101 * 10^26')).toBe('1.101\u00a0·\u00a010^26')
  })
  test('functions have their letters, small numbers their power of ten; identifiers and decimals stay as they are', () => {
    expect(printedText('theta(x) - x < 6.3417e-9 sqrt(x)')).toBe('θ(x) − x\u00a0<\u00a06.3417\u00a0·\u00a010^-9 √(x)')
    expect(printedText('theta-johnston-2022, arXiv:1511.02032, 1.93378')).toBe('theta-johnston-2022, arXiv:1511.02032, 1.93378')
  })
  test('powers are raised', () => {
    const { container } = render(<Printed text="x >= e^28, radius 10^-40" />)
    expect([...container.querySelectorAll('sup')].map((sup) => sup.textContent)).toEqual(['28', '−40'])
    expect(container).toHaveTextContent('x ≥ e28, radius 10−40')
  })
  test('a title leaves its range to the column beside it', () => {
    expect(shortTitle('Dusart 2018, k = 1, x >= 908994923')).toBe('Dusart 2018, k = 1')
    expect(shortTitle('Buthe 2018, theta below x')).toBe('Buthe 2018, theta below x')
  })
})

describe('the library', () => {
  const show = (filters: string, onFilter = vi.fn()) => {
    render(<MemoryRouter><EstimatesView estimates={have(all)} filters={estimateFiltersOf(new URLSearchParams(filters))} onFilter={onFilter} /></MemoryRouter>)
    return onFilter
  }
  test('says what each is conditional on and whether it is in force', () => {
    show('')
    expect(screen.getByText('on the Riemann hypothesis')).toBeInTheDocument()
    expect(screen.getByText(/in doubt/, { selector: 'span' })).toHaveTextContent('in doubt since 1 March 2026')
    expect(screen.getByText('3 estimates')).toBeInTheDocument()
  })
  test('choosing a filter keeps the others', async () => {
    const filter = show('text=theta')
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Conditional' }), 'yes')
    expect(filter).toHaveBeenCalledWith({ text: 'theta', conditional: 'yes' })
  })
  test('where nothing fits, there is a way back', () => {
    show('text=nothing-like-it')
    expect(screen.getByText('No estimate fits these filters.')).toBeInTheDocument()
    expect(screen.getByRole('link', { name: 'Show all 3' })).toHaveAttribute('href', '/estimates')
  })
})

describe('one estimate', () => {
  test('names the claims that rest on it, and the point where it was used', () => {
    render(<MemoryRouter><EstimateView estimate={have(all[2] as Estimate)} /></MemoryRouter>)
    expect(screen.getByRole('link', { name: 'MST-0001/1' })).toHaveAttribute('href', '/claims/MST-0001-1')
    expect(screen.getByText(/^In doubt at Haldern Institute since/)).toHaveTextContent('In doubt at Haldern Institute since 1 March 2026.')
    expect(screen.getByText('Lemma 4 has a gap.')).toBeInTheDocument()
  })
  test('a doubt that was lifted is told with both reasons, and the estimate is in force', () => {
    const lifted = { group: { id: 'g', name: 'Haldern Institute' }, own: true, at: '2026-03-01T08:00:00Z', reason: 'Lemma 4 has a gap.', lifted: { at: '2026-03-09T08:00:00Z', reason: 'A corrigendum closes it.' } }
    render(<MemoryRouter><EstimateView estimate={have(estimate({ doubts: [lifted] }))} /></MemoryRouter>)
    expect(screen.queryByText(/^In doubt at/)).not.toBeInTheDocument()
    expect(screen.getByText('A corrigendum closes it.')).toBeInTheDocument()
  })
  test('where only the latest claims are listed, it says of how many', () => {
    render(<MemoryRouter><EstimateView estimate={have({ ...(all[2] as Estimate), uses: 1_204 })} /></MemoryRouter>)
    expect(screen.getByText('the latest 1 of 1204')).toBeInTheDocument()
  })
  test('a conditional one says so before anything else', () => {
    render(<MemoryRouter><EstimateView estimate={have(all[1] as Estimate)} /></MemoryRouter>)
    expect(screen.getByText('Conditional.')).toBeInTheDocument()
    expect(screen.getByText('No claim in force rests on it.')).toBeInTheDocument()
  })
})
