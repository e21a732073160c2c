import { render, screen, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { markTells } from '../../client/src/features/estimates/doubt-words.ts'
import { DoubtWork } from '../../client/src/features/estimates/components/doubt-work.tsx'
import { ClaimDoubts } from '../../client/src/features/claims/components/claim-doubts.tsx'
import { ApiError } from '../../client/src/lib/errors.ts'
import type { EstimateDoubt } from '../../shared/schemas/estimate.ts'

type Resting = EstimateDoubt['claims'][number]

const claim = (number: string, fate: Resting['fate'], more: Partial<Resting> = {}): Resting => ({
  id: number, number, kind: 'enclosure', text: `the constant of ${number}`, state: fate === 'falls' ? 'signed' : fate === 'waits' ? 'in-review' : 'suspended', author: { id: 'a', name: 'Ilse Varga' }, through: [], fate, ...more,
})
const again = (constant: string, more: Partial<EstimateDoubt['again'][number]> = {}): EstimateDoubt['again'][number] => ({
  constant, definition: { canonical: { type: 'series' }, latex: '', text: `the constant ${constant}`, aliases: [] }, goal: { digits: 8 }, other: null, run: null, ...more,
})
const before: EstimateDoubt = {
  estimate: 'theta-one', doubt: null, digest: 'a'.repeat(64), again: [again('MST-0001')],
  claims: [claim('MST-0001/1', 'falls'), claim('MST-0001/2', 'falls', { kind: 'order', through: ['MST-0001/1'] }), claim('MST-0002/1', 'waits')],
}
const after: EstimateDoubt = {
  ...before, doubt: { id: 'd', by: { id: 'l', name: 'Maren Holt' }, at: '2026-03-01T08:00:00Z', reason: 'a gap' },
  claims: [claim('MST-0001/1', 'fallen'), claim('MST-0001/2', 'fallen'), claim('MST-0002/1', 'waits')],
  again: [again('MST-0001', { other: { claimNumber: 'MST-0001/3', digits: 5 } }), again('MST-0004'), again('MST-0005', { run: { id: 'r', state: 'running' } })],
}

function show(doubt: EstimateDoubt, acts: Partial<Parameters<typeof DoubtWork>[0]> = {}) {
  const onMark = vi.fn(async () => after)
  const onLift = vi.fn(async () => ({ reinstated: ['MST-0001/1'], kept: [{ claimNumber: 'MST-0001/2', reason: 'It is in conflict.' }], now: before }))
  const onRunAgain = vi.fn(async () => undefined)
  render(<MemoryRouter><DoubtWork doubt={doubt} onMark={onMark} onLift={onLift} onRunAgain={onRunAgain} {...acts} /></MemoryRouter>)
  return { onMark, onLift, onRunAgain }
}

describe('before an estimate is marked', () => {
  test('all that falls is shown, an order with what it rests on, and what is held', () => {
    show(before)
    expect(screen.getByText(/^Marking it suspends 2 claims of your group and holds back 1 more on the way to the register/)).toBeInTheDocument()
    const falls = screen.getByRole('table', { name: 'In force: they fall' })
    expect(within(falls).getAllByRole('link').map(({ textContent }) => textContent)).toEqual(['MST-0001/1', 'MST-0001/2'])
    expect(within(falls).getByText('rests on it through MST-0001/1')).toBeInTheDocument()
    expect(within(screen.getByRole('table', { name: /Before the register/ })).getByRole('link', { name: 'MST-0002/1' })).toHaveAttribute('href', '/claims/MST-0002-1')
  })

  test('it is marked with a reason, by a button that says what happens', async () => {
    const { onMark } = show(before)
    await userEvent.click(screen.getByRole('button', { name: 'Mark in doubt …' }))
    const act = screen.getByRole('button', { name: 'Mark in doubt and suspend 2 claims' })
    await userEvent.click(act)
    expect(onMark).not.toHaveBeenCalled()
    expect(screen.getByRole('alert')).toHaveTextContent(/needed/)
    await userEvent.type(screen.getByLabelText('Reason'), 'a gap')
    await userEvent.click(act)
    expect(onMark).toHaveBeenCalledWith('a gap')
    expect(await screen.findByText(/2 claims are suspended/)).toBeInTheDocument()
  })

  test('a refusal is told and what was typed stays', async () => {
    const refusal = new ApiError({ status: 409, code: 'changed_meanwhile', detail: 'What rests on this estimate has changed since you read the list.', fields: undefined, requestId: undefined })
    show(before, { onMark: () => Promise.reject(refusal) })
    await userEvent.click(screen.getByRole('button', { name: 'Mark in doubt …' }))
    await userEvent.type(screen.getByLabelText('Reason'), 'a gap')
    await userEvent.click(screen.getByRole('button', { name: /^Mark in doubt and/ }))
    expect(await screen.findByText(/has changed since you read the list/)).toBeInTheDocument()
    expect(screen.getByLabelText('Reason')).toHaveValue('a gap')
  })

  test('of another lead who was quicker one is told, though the form is gone by then', async () => {
    const onMark = () => {
      rerender(<MemoryRouter><DoubtWork doubt={after} onMark={onMark} onLift={never} onRunAgain={never} /></MemoryRouter>)
      return Promise.reject(new ApiError({ status: 409, code: 'in_doubt_already', detail: 'Maren Holt has marked this estimate already.', fields: undefined, requestId: undefined }))
    }
    const never = () => Promise.reject(new Error('not asked for'))
    const { rerender } = render(<MemoryRouter><DoubtWork doubt={before} onMark={onMark} onLift={never} onRunAgain={never} /></MemoryRouter>)
    await userEvent.click(screen.getByRole('button', { name: 'Mark in doubt …' }))
    await userEvent.type(screen.getByLabelText('Reason'), 'a gap')
    await userEvent.click(screen.getByRole('button', { name: /^Mark in doubt and/ }))
    expect(await screen.findByText(/Maren Holt has marked this estimate already/)).toBeInTheDocument()
    expect(screen.getByRole('heading', { name: 'What has fallen with it' })).toBeInTheDocument()
  })

  test('where nothing rests on it, it says what marking is still for', () => {
    expect(markTells({ ...before, claims: [] })).toMatch(/keeps new runs of your group from using it/)
    expect(markTells({ ...before, claims: [claim('MST-0002/1', 'waits')] })).toMatch(/^Marking it holds back 1 claim of your group/)
  })
})

describe('while it is in doubt', () => {
  test('constants are run again, one or all that no run is at work on', async () => {
    const { onRunAgain } = show(after)
    expect(screen.getByRole('link', { name: 'MST-0001/3' }).closest('td')).toHaveTextContent('MST-0001/3, 5 digits')
    expect(screen.getByRole('link', { name: 'at work' })).toHaveAttribute('href', '/runs/r')
    await userEvent.click(screen.getAllByRole('button', { name: 'Run again' })[1]!)
    expect(onRunAgain.mock.calls).toEqual([[after.again[1]]])
    await userEvent.click(screen.getByRole('button', { name: 'Run all 2 again without it' }))
    expect(onRunAgain.mock.calls.slice(1)).toEqual([[after.again[0]], [after.again[1]]])
  })

  test('a run that is refused ends the row of runs and says of which constant', async () => {
    const onRunAgain = vi.fn().mockRejectedValue(new ApiError({ status: 429, code: 'too_many_runs', detail: 'You already have 8 runs waiting.', fields: undefined, requestId: undefined }))
    show(after, { onRunAgain })
    await userEvent.click(screen.getByRole('button', { name: 'Run all 2 again without it' }))
    expect(await screen.findByRole('alert')).toHaveTextContent('No run of MST-0001 was started. You already have 8 runs waiting.')
    expect(onRunAgain).toHaveBeenCalledTimes(1)
  })

  test('the doubt is lifted with a reason, and what is chosen comes back', async () => {
    const { onLift } = show(after)
    await userEvent.click(screen.getByRole('button', { name: 'Lift the doubt …' }))
    await userEvent.type(screen.getByLabelText('Reason'), 'closed')
    await userEvent.click(screen.getByRole('checkbox', { name: 'MST-0001/2' }))
    await userEvent.click(screen.getByRole('button', { name: 'Lift the doubt and reinstate 1 claim' }))
    expect(onLift).toHaveBeenCalledWith({ reason: 'closed', reinstate: ['MST-0001/1'] })
    expect(await screen.findByText(/In force again: MST-0001\/1. MST-0001\/2 stays suspended: It is in conflict./)).toBeInTheDocument()
  })
})

test('a claim says which of its estimates is in doubt, where and why', () => {
  render(<MemoryRouter><ClaimDoubts doubts={[{ estimate: 'theta-one', title: 'Somebody 2018', group: { id: 'g', name: 'Haldern Institute' }, at: '2026-03-01T08:00:00Z', reason: 'a gap' }]} /></MemoryRouter>)
  expect(screen.getByRole('link', { name: 'Somebody 2018' })).toHaveAttribute('href', '/estimates/theta-one')
  expect(screen.getByText('a gap')).toBeInTheDocument()
})
