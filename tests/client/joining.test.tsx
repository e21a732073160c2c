import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import type { ReactNode } from 'react'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { ApiError } from '../../client/src/lib/errors.ts'
import { InvitationView } from '../../client/src/pages/invitation/invitation-view.tsx'
import { AskResetView } from '../../client/src/pages/password-reset/ask-reset-view.tsx'
import { SetPasswordView } from '../../client/src/pages/password-reset/set-password-view.tsx'
import type { InvitationOffer } from '../../shared/schemas/member.ts'

const show = (view: ReactNode) => render(<MemoryRouter>{view}</MemoryRouter>)
const have = <Data,>(data: Data) => ({ data, error: null, onRetry: () => undefined })
const gone = { data: undefined, error: new ApiError({ status: 410, code: 'link_used', detail: 'This link has been used or has expired.', fields: undefined, requestId: undefined }), onRetry: () => undefined }
const offer: InvitationOffer = { email: 'nora@harrow.example', name: 'Nora Lind', group: 'Harrow Institute', roles: ['referee'], invitedBy: 'Ilse Varga', expiresAt: '2026-03-08T08:00:00Z' }

describe('an invitation', () => {
  test('says who invites to what, and joins with a name and a password', async () => {
    const accept = vi.fn(() => Promise.resolve())
    show(<InvitationView offer={have(offer)} signedInAs={null} onAccept={accept} />)
    expect(screen.getByText(/Ilse Varga invites you to take part in Harrow Institute as a referee/)).toBeInTheDocument()
    await userEvent.type(screen.getByLabelText('Password'), 'seven quiet lighthouses')
    await userEvent.click(screen.getByRole('button', { name: 'Join Harrow Institute' }))
    expect(accept).toHaveBeenCalledWith({ name: 'Nora Lind', password: 'seven quiet lighthouses' })
  })
  test('refuses a short password at its field', async () => {
    const accept = vi.fn(() => Promise.resolve())
    show(<InvitationView offer={have(offer)} signedInAs={null} onAccept={accept} />)
    await userEvent.type(screen.getByLabelText('Password'), 'short')
    await userEvent.click(screen.getByRole('button', { name: 'Join Harrow Institute' }))
    expect(screen.getByLabelText('Password')).toBeInvalid()
    expect(accept).not.toHaveBeenCalled()
  })
  test('warns whoever is signed in as somebody else', () => {
    show(<InvitationView offer={have(offer)} signedInAs="Ilse Varga" onAccept={() => Promise.resolve()} />)
    expect(screen.getByText('You are signed in as Ilse Varga.')).toBeInTheDocument()
  })
  test('that is used up says what to do', () => {
    show(<InvitationView offer={gone} signedInAs={null} onAccept={() => Promise.resolve()} />)
    expect(screen.getByRole('alert')).toHaveTextContent('This link has been used or has expired.')
    expect(screen.getByRole('link', { name: 'sign in' })).toHaveAttribute('href', '/sign-in')
  })
})

describe('a forgotten password', () => {
  test('is answered alike for every address', async () => {
    const ask = vi.fn(() => Promise.resolve())
    show(<AskResetView onAsk={ask} />)
    await userEvent.type(screen.getByLabelText('E-mail address'), 'Nora@Harrow.example')
    await userEvent.click(screen.getByRole('button', { name: 'Mail me a link' }))
    expect(ask).toHaveBeenCalledWith({ email: 'nora@harrow.example' })
    expect(screen.getByRole('status')).toHaveTextContent('If nora@harrow.example belongs to a member')
  })
  test('what is no address is told at the field', async () => {
    show(<AskResetView onAsk={() => Promise.resolve()} />)
    await userEvent.type(screen.getByLabelText('E-mail address'), 'nora')
    await userEvent.click(screen.getByRole('button', { name: 'Mail me a link' }))
    expect(screen.getByLabelText('E-mail address')).toHaveAccessibleDescription(/Write an e-mail address\./)
  })
  test('a new one is set by the link, and signing in is what comes next', async () => {
    const set = vi.fn(() => Promise.resolve())
    show(<SetPasswordView offer={have({ email: 'nora@harrow.example', expiresAt: '2026-03-08T08:00:00Z' })} onSet={set} />)
    await userEvent.type(screen.getByLabelText('New password'), 'seven quiet lighthouses')
    await userEvent.click(screen.getByRole('button', { name: 'Set the password' }))
    expect(set).toHaveBeenCalledWith({ password: 'seven quiet lighthouses' })
    expect(screen.getByRole('link', { name: 'Sign in' })).toBeInTheDocument()
  })
  test('a used link leads to a new one', () => {
    show(<SetPasswordView offer={gone} onSet={() => Promise.resolve()} />)
    expect(screen.getByRole('link', { name: 'Ask for a new link' })).toHaveAttribute('href', '/password-reset')
  })
})
