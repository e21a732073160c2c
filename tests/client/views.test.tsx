import { act, render, screen, waitFor, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import type { ReactElement } from 'react'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import type { Claim } from '../../shared/schemas/claim.ts'
import type { DoAct } from '../../client/src/features/claims/queries.ts'
import { ApiError } from '../../client/src/lib/errors.ts'
import { ClaimView } from '../../client/src/pages/claim/claim-view.tsx'
import { ConstantView } from '../../client/src/pages/constant/constant-view.tsx'
import { DeskView } from '../../client/src/pages/desk/desk-view.tsx'
import { RegisterView } from '../../client/src/pages/register/register-view.tsx'
import type { RegisterViewProps } from '../../client/src/pages/register/register-view.tsx'
import { RunView } from '../../client/src/pages/run/run-view.tsx'
import { RunsView } from '../../client/src/pages/runs/runs-view.tsx'
import * as fixtures from './fixtures.ts'

const nothing = () => undefined
const done = () => Promise.resolve()
const noPages = { previous: null, next: null, turn: nothing }
const unreachable = new ApiError({ status: 0, code: 'unreachable', detail: 'The server can’t be reached.' })

async function show(view: ReactElement) {
  const result = render(<MemoryRouter>{view}</MemoryRouter>)
  // Formulas and charts come as their own chunks.
  await act(async () => {
    await new Promise((resolve) => setTimeout(resolve, 0))
  })
  return result
}

const register = (props: Partial<RegisterViewProps>) => (
  <RegisterView list={undefined} error={null} refetching={false} onRetry={nothing} filters={{}} filtered={false} onFilter={nothing} sorting={{ key: 'number', order: 'asc', to: () => '/register' }} pages={noPages} mayStart={false} {...props} />
)

describe('register', () => {
  test('says what it is waiting for', async () => {
    await show(register({}))
    expect(screen.getByText('Reading the register …')).toBeInTheDocument()
  })
  test('a failure says what is wrong and offers to try again', async () => {
    const retry = vi.fn()
    await show(register({ error: unreachable, onRetry: retry }))
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }))
    expect(retry).toHaveBeenCalledOnce()
  })
  test('an empty register says what belongs there and how to begin; a filter that fits nothing says so', async () => {
    const { unmount } = await show(register({ list: { items: [], next: null }, mayStart: true }))
    expect(screen.getByRole('link', { name: 'Begin with a run' })).toHaveAttribute('href', '/runs/new')
    unmount()
    await show(register({ list: { items: [], next: null }, filtered: true }))
    expect(screen.getByText('No constant fits these filters.')).toBeInTheDocument()
    expect(screen.getByRole('link', { name: 'Clear' })).toHaveAttribute('href', '/register')
  })
  test('a row leads to the constant and shows its digits, state and conflict', async () => {
    await show(register({ list: { items: fixtures.constantSummaries, next: null, total: 4 } }))
    const row = screen.getByRole('link', { name: 'MST-0002' }).closest('tr') as HTMLElement
    expect(row).toHaveTextContent('certified to 47 digits')
    expect(row).toHaveTextContent('signed')
    expect(row).toHaveTextContent('in conflict')
    expect(screen.getByText('4 constants')).toBeInTheDocument()
  })
  test('filters go to the address as they are typed', async () => {
    const filter = vi.fn()
    await show(register({ list: { items: [], next: null }, onFilter: filter }))
    await userEvent.type(screen.getByRole('searchbox'), '1.6366{Enter}')
    expect(filter).toHaveBeenCalledWith({ text: '1.6366' })
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Set' }), 'primes')
    expect(filter).toHaveBeenLastCalledWith({ text: '1.6366', set: 'primes' })
  })
  test('a filter that makes no sense is told at the filter, and asking again is not offered', async () => {
    await show(register({ filtered: true, filters: { k: 'abc' }, error: new ApiError({ status: 400, code: 'invalid_input', detail: 'Some entries need another look.', fields: [{ path: 'k', message: 'must be a number' }] }) }))
    expect(screen.getByRole('textbox', { name: 'k' })).toHaveAccessibleDescription('This must be a number.')
    expect(screen.getByText('These filters can’t be used')).toBeInTheDocument()
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull()
  })
  test('while newer rows are read the old ones stay', async () => {
    await show(register({ list: { items: fixtures.constantSummaries, next: null }, refetching: true }))
    expect(screen.getByRole('table')).toHaveAttribute('aria-busy', 'true')
  })
})

describe('constant', () => {
  test('best enclosure, claims, convergence, first members, how to cite', async () => {
    await show(<ConstantView number="MST-0003" constant={fixtures.constant} error={null} onRetry={nothing} mayStart />)
    expect(screen.getByRole('heading', { level: 1, name: 'MST-0003' })).toBeInTheDocument()
    expect(within(screen.getByRole('table', { name: 'Claims' })).getByRole('link', { name: 'MST-0003/1' })).toHaveAttribute('href', '/claims/MST-0003-1')
    expect(screen.getByText(/The set begins with 8, 12, 18/)).toBeInTheDocument()
    expect(screen.getByRole('link', { name: 'New run of this constant' })).toHaveAttribute('href', '/runs/new?constant=MST-0003')
  })
  test('an open conflict stands at the top', async () => {
    await show(<ConstantView number="MST-0003" constant={{ ...fixtures.constant, conflicts: [{ claims: ['MST-0003/1', 'MST-0003/2'], openedAt: '2026-05-01T00:00:00Z', closedAt: null }] }} error={null} onRetry={nothing} mayStart={false} />)
    expect(screen.getByText(/have no number in common/)).toBeInTheDocument()
  })
})

describe('runs', () => {
  test('an empty list says how to begin', async () => {
    await show(<RunsView list={{ items: [], next: null }} error={null} refetching={false} onRetry={nothing} state="" mine={false} onFilter={nothing} pages={noPages} mayStart />)
    expect(screen.getByRole('link', { name: 'Start the first' })).toBeInTheDocument()
  })
  const run = (props: Partial<Parameters<typeof RunView>[0]>) => <RunView run={undefined} error={null} onRetry={nothing} live={null} onSteer={nothing} steering={null} steerError={null} onDraft={done} {...props} />
  test('a working run shows how far it is, from the latest event, and can be stopped', async () => {
    const steer = vi.fn()
    await show(run({ run: fixtures.workingRun, live: { state: 'running', progress: 0.61, shards: { done: 39, total: 64 }, secondsLeft: 20, cpuSeconds: 50, enclosure: null }, onSteer: steer }))
    expect(screen.getByRole('progressbar')).toHaveAttribute('aria-valuenow', '61')
    expect(screen.getByText(/39 of 64 parts · about 20 s left/)).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Stop the run' }))
    expect(steer).toHaveBeenCalledWith('stop')
  })
  test('a failed run says why and can be resumed', async () => {
    await show(run({ run: fixtures.failedRun }))
    expect(screen.getByText(/ran out of memory twice/)).toBeInTheDocument()
    expect(screen.getByRole('button', { name: 'Resume the run' })).toBeEnabled()
  })
  test('a finished run shows enclosure, budget, certificate, and becomes a draft with its remark', async () => {
    const draft = vi.fn(done)
    await show(run({ run: fixtures.finishedRun, onDraft: draft }))
    expect(screen.getByRole('table', { name: 'Error budget' })).toHaveTextContent('T-2')
    expect(screen.getByRole('link', { name: 'Download the certificate' })).toHaveAttribute('href', `/api/v1/runs/${fixtures.finishedRun.id}/certificate`)
    await userEvent.type(screen.getByRole('textbox', { name: 'Remark' }), 'For Table 2.')
    await userEvent.click(screen.getByRole('button', { name: 'Draft a claim from this run' }))
    expect(draft).toHaveBeenCalledWith('For Table 2.')
  })
  test('a refused draft keeps what was typed', async () => {
    const draft = vi.fn(() => Promise.reject(new ApiError({ status: 409, code: 'taken', detail: 'There is a draft from this run already.' })))
    await show(run({ run: fixtures.finishedRun, onDraft: draft }))
    await userEvent.type(screen.getByRole('textbox', { name: 'Remark' }), 'For Table 2.')
    await userEvent.click(screen.getByRole('button', { name: 'Draft a claim from this run' }))
    expect(await screen.findByRole('alert')).toHaveTextContent('There is a draft from this run already.')
    expect(screen.getByRole('textbox', { name: 'Remark' })).toHaveValue('For Table 2.')
  })
})

describe('claim', () => {
  const claim = (of: Claim, props: { onAct?: DoAct; done?: string; onUpload?: (file: File) => Promise<unknown> } = {}) => (
    <ClaimView claim={of} done={props.done ?? ''} mayReadRuns onAct={props.onAct ?? done} onEdit={done} onDelete={done} onUpload={props.onUpload ?? done} onRemoveEvidence={done} onKeepDraft={done} />
  )
  test('a reader sees what it rests on and nothing to act with', async () => {
    await show(claim(fixtures.claimSigned))
    expect(screen.queryByRole('heading', { name: /For the (lead|referee)/ })).toBeNull()
    expect(screen.getByText(/An enclosure is as sound as/)).toHaveTextContent('the arithmetics ball and mpfr agree')
    expect(screen.getByText(/Signed with the key k-7f3a/)).toBeInTheDocument()
    expect(screen.getByRole('table', { name: 'The claim and its rechecks' })).toHaveTextContent('they meet')
  })
  test('what was done is told with what happens next', async () => {
    await show(claim(fixtures.claimForReferee, { done: 'Accepted. The claim is yours to check.' }))
    expect(screen.getByText(/Accepted\./).closest('[role=status]')).toHaveTextContent('Next: the referee: give a verdict.')
  })
  test('signing shows what is signed in full, asks for the password, and sends it with the version', async () => {
    const act = vi.fn(done)
    await show(claim(fixtures.claimForLead, { onAct: act }))
    await userEvent.click(screen.getByRole('button', { name: 'Sign MST-0003/1 …' }))
    const dialog = screen.getByRole('dialog', { name: 'Sign MST-0003/1' })
    expect(dialog).toHaveTextContent(fixtures.claimForLead.enclosure?.lo ?? '')
    expect(dialog).toHaveTextContent(fixtures.claimForLead.digest)
    await userEvent.click(within(dialog).getByRole('button', { name: 'Sign MST-0003/1' }))
    expect(await within(dialog).findByRole('alert')).toHaveTextContent('is needed')
    expect(act).not.toHaveBeenCalled()
    await userEvent.type(within(dialog).getByLabelText('Your password'), 'a stone in the ground')
    await userEvent.click(within(dialog).getByRole('button', { name: 'Sign MST-0003/1' }))
    expect(act).toHaveBeenCalledWith('sign', { version: 3, password: 'a stone in the ground' })
  })
  test('a wrong password is told at the field', async () => {
    const act = vi.fn(() => Promise.reject(new ApiError({ status: 400, code: 'wrong_password', detail: 'Nothing was signed.', fields: [{ path: 'password', message: 'This is not your password.' }] })))
    await show(claim(fixtures.claimForLead, { onAct: act }))
    await userEvent.click(screen.getByRole('button', { name: 'Sign MST-0003/1 …' }))
    await userEvent.type(screen.getByLabelText('Your password'), 'wrong')
    await userEvent.click(screen.getByRole('button', { name: 'Sign MST-0003/1' }))
    await waitFor(() => expect(screen.getByLabelText('Your password')).toHaveAccessibleDescription('This is not your password.'))
    expect(screen.getByLabelText('Your password')).toHaveValue('wrong')
  })
  test('returning asks for a reason and names the act', async () => {
    const act = vi.fn(done)
    await show(claim(fixtures.claimForLead, { onAct: act }))
    await userEvent.click(screen.getByRole('button', { name: 'Return …' }))
    const dialog = screen.getByRole('dialog', { name: 'Return MST-0003/1' })
    await userEvent.type(within(dialog).getByLabelText('Reason'), 'Say which table.')
    await userEvent.click(within(dialog).getByRole('button', { name: 'Return MST-0003/1' }))
    expect(act).toHaveBeenCalledWith('return', { reason: 'Say which table.' })
  })
  test('a referee confirms with the checklist, or objects with the same words', async () => {
    const act = vi.fn(done)
    await show(claim(fixtures.claimForReferee, { onAct: act }))
    await userEvent.click(screen.getByRole('checkbox', { name: 'T-2, discretisation' }))
    await userEvent.click(screen.getByRole('button', { name: 'Confirm MST-0003/1' }))
    expect(act).toHaveBeenCalledWith('confirm', {
      version: 3,
      remark: 'The recheck by mpfr meets it.',
      checklist: [{ item: 'T-2, discretisation', checked: true }, { item: 'T-3, truncation below', checked: false }],
    })
    await userEvent.click(screen.getByRole('button', { name: 'Object to MST-0003/1' }))
    expect(act).toHaveBeenLastCalledWith('object', { text: 'The recheck by mpfr meets it.' })
  })
  test('a recheck takes the other arithmetic unless told otherwise', async () => {
    const act = vi.fn(done)
    await show(claim(fixtures.claimForReferee, { onAct: act }))
    await userEvent.click(screen.getByRole('button', { name: 'Start the recheck' }))
    expect(act).toHaveBeenCalledWith('recheck', { method: 'transform', arithmetic: 'mpfr', digits: 36 })
  })
  test('a recheck offers the methods that are made for the definition', async () => {
    const definition = { ...fixtures.claimForReferee.definition, canonical: { type: 'over-primes' } }
    await show(claim({ ...fixtures.claimForReferee, definition, run: null }))
    const methods = within(screen.getByLabelText('Method')).getAllByRole('option')
    expect(methods.map((option) => option.textContent)).toEqual(['expansion in prime zeta values'])
  })
  test('an author answers an objection', async () => {
    const act = vi.fn(done)
    await show(claim(fixtures.claimReturned, { onAct: act }))
    await userEvent.type(screen.getByRole('textbox', { name: 'Your answer' }), 'It is truncated now.')
    await userEvent.click(screen.getByRole('button', { name: 'Answer the objection' }))
    expect(act).toHaveBeenCalledWith('answer', { objectionId: fixtures.claimReturned.objections[0]?.id, text: 'It is truncated now.' })
  })
  test('a draft is submitted in the version on the page, also after its remark was saved', async () => {
    const act = vi.fn(done)
    const { rerender } = await show(claim(fixtures.claimForAuthor, { onAct: act }))
    rerender(<MemoryRouter>{claim({ ...fixtures.claimForAuthor, version: 4, remark: 'Better.' }, { onAct: act })}</MemoryRouter>)
    expect(screen.getByRole('textbox', { name: 'Remark' })).toHaveValue('Better.')
    await userEvent.click(screen.getByRole('button', { name: 'Submit for review' }))
    expect(act).toHaveBeenCalledWith('submit', { version: 4 })
  })
  test('evidence that the server refuses is told at the field', async () => {
    const upload = vi.fn(() => Promise.reject(new ApiError({ status: 415, code: 'media_type', detail: 'A program can’t be evidence by itself; put it into an archive.' })))
    await show(claim(fixtures.claimForAuthor, { onUpload: upload }))
    await userEvent.upload(screen.getByLabelText('Add evidence'), new File(['x'], 'x.exe'))
    expect(await screen.findByText(/put it into an archive/)).toHaveAttribute('role', 'alert')
  })
  test('a conflict and a value from elsewhere are said where the digits stand', async () => {
    await show(claim({ ...fixtures.claimSigned, kind: 'stated', repeatedHere: false, statedValue: { digits: '1.03083', reading: 'truncated' }, conflicts: [{ claim: 'MST-0003/2', claimId: 'x', openedAt: '2026-05-01T00:00:00Z', closedAt: null }] }))
    expect(screen.getByText('Not repeated here.')).toBeInTheDocument()
    expect(screen.getByText('In conflict.').parentElement).toHaveTextContent('MST-0003/2')
    expect(screen.getByText(/^A value from elsewhere is as sound as its source/)).toBeInTheDocument()
  })
})

describe('desk', () => {
  test('shows what waits by role, the longest wait first', async () => {
    await show(<DeskView desk={fixtures.desk} error={null} onRetry={nothing} roles={['lead', 'referee']} />)
    const waiting = within(screen.getByRole('table', { name: 'To assign and to sign' })).getAllByRole('row').slice(1)
    expect(waiting.map((row) => within(row).getByRole('link').textContent)).toEqual(['Ask a referee for MST-0002/1', 'Sign MST-0003/1'])
    expect(screen.getByText(/Nothing to referee/)).toBeInTheDocument()
  })
  test('an empty desk says what comes here', async () => {
    await show(<DeskView desk={{ lead: [], referee: [], researcher: [], total: { lead: 0, referee: 0, researcher: 0 } }} error={null} onRetry={nothing} roles={['researcher']} />)
    expect(screen.getByText('Nothing waits for you.')).toBeInTheDocument()
    expect(screen.getByRole('link', { name: 'New run' })).toHaveAttribute('href', '/runs/new')
  })
})
