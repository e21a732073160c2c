import { render, screen, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { useState } from 'react'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { Button } from '../../client/src/components/ui/button.tsx'
import { Dialog } from '../../client/src/components/ui/dialog.tsx'
import { ErrorView, Progress } from '../../client/src/components/ui/feedback.tsx'
import { Field, TextInput } from '../../client/src/components/ui/field.tsx'
import { Table } from '../../client/src/components/ui/table.tsx'
import { durationInWords, secondsInWords } from '../../client/src/components/ui/time.tsx'
import { StateMark } from '../../client/src/components/state-mark/state-mark.tsx'
import { STATE_WORDS } from '../../shared/words.ts'
import type { MarkedState } from '../../client/src/components/state-mark/state-mark.tsx'
import { ApiError } from '../../client/src/lib/errors.ts'
import { sentence } from '../../client/src/lib/sentence.ts'
import { claimState } from '../../shared/schemas/claim.ts'

describe('state mark', () => {
  test('every state of a claim has its word', () => {
    expect(claimState.options.filter((state) => !(state in STATE_WORDS))).toEqual([])
  })
  test.each(Object.entries(STATE_WORDS))('%s is drawn with its word beside it', (state, word) => {
    const { container } = render(<StateMark state={state as MarkedState} />)
    expect(container).toHaveTextContent(word)
    expect(container.querySelector('svg')).toHaveAttribute('aria-hidden', 'true')
  })
  test('no two states look alike', () => {
    const drawings = (Object.keys(STATE_WORDS) as MarkedState[]).map((state) => render(<StateMark state={state} />).container.querySelector('svg')?.innerHTML)
    expect(new Set(drawings).size).toBe(drawings.length)
  })
})

describe('field', () => {
  test('label, hint and error belong to the control', () => {
    render(<Field label="Digits" hint="at most 1000" error="Write a whole number.">{(control) => <TextInput {...control} />}</Field>)
    const input = screen.getByRole('textbox', { name: 'Digits' })
    expect(input).toBeInvalid()
    expect(input).toHaveAccessibleDescription('at most 1000 Write a whole number.')
    expect(screen.getByRole('alert')).toHaveTextContent('Write a whole number.')
  })
})

describe('what schemas say, as sentences', () => {
  test.each([['is needed', 'This is needed.'], ['write a whole number', 'Write a whole number.'], ['k must be at least 1', 'k must be at least 1.'], ['', '']])('%j', (words, text) => {
    expect(sentence(words)).toBe(text)
  })
})

describe('button', () => {
  test('while it works it says so and can’t be pressed', async () => {
    const press = vi.fn()
    render(<Button busy="Signing …" onClick={press}>Sign</Button>)
    await userEvent.click(screen.getByRole('button', { name: 'Signing …' }))
    expect(press).not.toHaveBeenCalled()
  })
})

describe('dialog', () => {
  function Asking() {
    const [open, setOpen] = useState(false)
    return (
      <>
        <button type="button" onClick={() => setOpen(true)}>ask</button>
        <Dialog open={open} title="Sign MST-0042/2" onClose={() => setOpen(false)}>
          <button type="button" onClick={() => setOpen(false)}>Not now</button>
        </Dialog>
      </>
    )
  }
  test('names the act and goes away', async () => {
    render(<Asking />)
    expect(screen.queryByRole('dialog')).toBeNull()
    await userEvent.click(screen.getByText('ask'))
    expect(screen.getByRole('dialog', { name: 'Sign MST-0042/2' })).toBeInTheDocument()
    await userEvent.click(screen.getByText('Not now'))
    expect(screen.queryByRole('dialog')).toBeNull()
  })
})

describe('error view', () => {
  test('shows the server’s reason, the request to quote, and a way on', async () => {
    const retry = vi.fn()
    render(<ErrorView title="The claim could not be read" error={new ApiError({ status: 503, code: 'busy', detail: 'The database is restarting.', requestId: 'r-17' })} onRetry={retry} />)
    expect(screen.getByRole('alert')).toHaveTextContent('The database is restarting.')
    expect(screen.getByText('r-17')).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }))
    expect(retry).toHaveBeenCalledOnce()
  })
})

describe('progress', () => {
  test('tells how far it is, rounded down', () => {
    render(<Progress share={0.9999} label="Share done" />)
    expect(screen.getByRole('progressbar', { name: 'Share done' })).toHaveAttribute('aria-valuenow', '99')
  })
})

describe('table', () => {
  const rows = [{ number: 'MST-0001', k: 1 }, { number: 'MST-0002', k: 2 }]
  const table = (onTurn = vi.fn()) => (
    <MemoryRouter>
      <Table
        caption="Register"
        rows={rows}
        rowKey={(row) => row.number}
        onTurn={onTurn}
        sorting={{ key: 'number', order: 'asc', to: (key, order) => `/register?sort=${key}&order=${order}` }}
        columns={[
          { key: 'number', header: 'Number', sortable: true, cell: (row) => <a href={`/${row.number}`}>{row.number}</a> },
          { key: 'k', header: 'k', sortable: true, cell: (row) => row.k },
        ]}
      />
    </MemoryRouter>
  )
  test('heads say how it is sorted and link to the other ways', () => {
    render(table())
    const head = screen.getByRole('columnheader', { name: /Number/ })
    expect(head).toHaveAttribute('aria-sort', 'ascending')
    expect(within(head).getByRole('link')).toHaveAttribute('href', '/register?sort=number&order=desc')
    expect(within(screen.getByRole('columnheader', { name: 'k' })).getByRole('link')).toHaveAttribute('href', '/register?sort=k&order=asc')
  })
  test('arrow keys go from row to row, Page Down turns the page', async () => {
    const turn = vi.fn()
    const user = userEvent.setup()
    render(table(turn))
    screen.getByRole('link', { name: 'MST-0001' }).focus()
    await user.keyboard('{ArrowDown}')
    expect(screen.getByRole('link', { name: 'MST-0002' })).toHaveFocus()
    await user.keyboard('{ArrowUp}{PageDown}')
    expect(screen.getByRole('link', { name: 'MST-0001' })).toHaveFocus()
    expect(turn).toHaveBeenCalledWith('next')
  })
})

describe('durations', () => {
  test.each([[30, 'under a minute'], [60, '1 minute'], [7_300, '2 hours'], [86_400 * 3.9, '3 days']])('%d s is %s', (seconds, words) => {
    expect(durationInWords(seconds)).toBe(words)
  })
  test.each([[0.02, '0.1 s'], [3.14, '3.1 s'], [12.4, '12 s'], [120, '2 min'], [200, '3 min 20 s'], [7_500, '2 h 05 min']])('%d s is read as %s', (seconds, words) => {
    expect(secondsInWords(seconds)).toBe(words)
  })
})
