import { render, screen, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { describe, expect, test, vi } from 'vitest'
import { MailForm } from '../../client/src/features/account/components/mail-form.tsx'
import { NameForm } from '../../client/src/features/account/components/name-form.tsx'
import { PasswordForm } from '../../client/src/features/account/components/password-form.tsx'
import { SessionList } from '../../client/src/features/account/components/session-list.tsx'
import { TokenForm } from '../../client/src/features/account/components/token-form.tsx'
import { TokenList } from '../../client/src/features/account/components/token-list.tsx'
import { deviceInWords } from '../../client/src/features/account/device.ts'
import { askingMails } from '../../client/src/features/account/mails.ts'
import { ApiError } from '../../client/src/lib/errors.ts'
import type { AccessToken, OwnSession } from '../../shared/schemas/session.ts'

const refused = (path: string, message: string) => new ApiError({ status: 400, code: 'invalid_input', detail: 'Some entries need another look.', fields: [{ path, message }] })

describe('name', () => {
  test('an empty one is told at the field and not sent', async () => {
    const save = vi.fn(() => Promise.resolve())
    render(<NameForm name="Ilse Varga" onSave={save} />)
    await userEvent.clear(screen.getByRole('textbox', { name: 'Name' }))
    await userEvent.click(screen.getByRole('button', { name: 'Save name' }))
    expect(screen.getByRole('textbox', { name: 'Name' })).toBeInvalid()
    expect(save).not.toHaveBeenCalled()
  })
  test('after saving the page says so', async () => {
    render(<NameForm name="Ilse Varga" onSave={() => Promise.resolve()} />)
    await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), ' II')
    await userEvent.click(screen.getByRole('button', { name: 'Save name' }))
    expect(screen.getByRole('status')).toHaveTextContent('Saved. From now on you appear as Ilse Varga II')
  })
})

describe('mail preferences', () => {
  test('only what does not ask for an act can be switched off', async () => {
    const save = vi.fn(() => Promise.resolve())
    render(<MailForm preferences={{ 'claim-signed': true, 'claim-suspended': true, 'claim-withdrawn': true }} roles={['lead']} email="a@b.example" onSave={save} />)
    expect(screen.getAllByRole('checkbox')).toHaveLength(3)
    expect(screen.getByText('A claim is endorsed and waits for your signature')).toBeInTheDocument()
    expect(screen.queryByText('You are asked to referee a claim')).toBeNull()
    await userEvent.click(screen.getByRole('checkbox', { name: /withdrawn/ }))
    await userEvent.click(screen.getByRole('button', { name: 'Save mail preferences' }))
    expect(save).toHaveBeenCalledWith({ 'claim-signed': true, 'claim-suspended': true, 'claim-withdrawn': false })
  })
  test('everybody is reminded', () => {
    expect(askingMails(['researcher']).some((words) => words.startsWith('A reminder'))).toBe(true)
  })
})

describe('password', () => {
  test('a refused one is told at its field, and what was typed stays', async () => {
    render(<PasswordForm email="a@b.example" onSave={() => Promise.reject(refused('current', 'is not your password'))} />)
    await userEvent.type(screen.getByLabelText('Password now'), 'wrong')
    await userEvent.type(screen.getByLabelText('New password'), 'seven quiet lighthouses')
    await userEvent.click(screen.getByRole('button', { name: 'Change password' }))
    expect(screen.getByLabelText('Password now')).toHaveAccessibleDescription('This is not your password.')
    expect(screen.getByLabelText('New password')).toHaveValue('seven quiet lighthouses')
  })
  test('a short one is refused before it is sent', async () => {
    const save = vi.fn(() => Promise.resolve())
    render(<PasswordForm email="a@b.example" onSave={save} />)
    await userEvent.type(screen.getByLabelText('Password now'), 'old one')
    await userEvent.type(screen.getByLabelText('New password'), 'short')
    await userEvent.click(screen.getByRole('button', { name: 'Change password' }))
    expect(screen.getByLabelText('New password')).toBeInvalid()
    expect(save).not.toHaveBeenCalled()
  })
})

const session = (id: string, current: boolean): OwnSession => ({ id, current, address: '203.0.113.7', userAgent: 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', createdAt: '2026-03-01T08:00:00Z', lastSeenAt: '2026-03-01T09:00:00Z', expiresAt: '2026-04-01T08:00:00Z' })

describe('sessions', () => {
  test('every one but this can be ended', async () => {
    const end = vi.fn(() => Promise.resolve())
    render(<SessionList sessions={[session('one', true), session('two', false)]} onEnd={end} />)
    await userEvent.click(screen.getByRole('button', { name: 'End the session with Firefox on Linux from 203.0.113.7' }))
    expect(end).toHaveBeenCalledWith(['two'])
    expect(screen.getByRole('status')).toHaveTextContent('Ended.')
  })
  test('all others together are ended after one question', async () => {
    const end = vi.fn(() => Promise.resolve())
    render(<SessionList sessions={[session('one', true), session('two', false), session('three', false)]} onEnd={end} />)
    await userEvent.click(screen.getByRole('button', { name: 'End the 2 others' }))
    expect(end).not.toHaveBeenCalled()
    await userEvent.click(within(screen.getByRole('dialog', { name: 'End 2 sessions' })).getByRole('button', { name: 'End 2 sessions' }))
    expect(end).toHaveBeenCalledWith(['two', 'three'])
  })
  test.each([
    ['Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/138.0.0.0 Safari/537.36 Edg/138.0.0.0', 'Edge on Windows'],
    ['Mozilla/5.0 (Macintosh; Intel Mac OS X 10_15_7) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.0 Safari/605.1.15', 'Safari on macOS'],
    ['curl/8.5.0', 'curl'],
    ['', 'an unnamed program'],
  ])('%s is %s', (userAgent, words) => {
    expect(deviceInWords(userAgent)).toBe(words)
  })
})

describe('access tokens', () => {
  const token = (state: AccessToken['state']): AccessToken => ({ id: 'one', name: 'nightly', scopes: ['read'], state, createdAt: '2026-03-01T08:00:00Z', expiresAt: '2026-05-01T08:00:00Z', lastUsedAt: null })
  test('one is made with its scopes and days', async () => {
    const create = vi.fn(() => Promise.resolve())
    render(<TokenForm onCreate={create} />)
    await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), 'nightly')
    await userEvent.click(screen.getByRole('checkbox', { name: 'run' }))
    await userEvent.selectOptions(screen.getByRole('combobox'), 'a year')
    await userEvent.click(screen.getByRole('button', { name: 'Make an access token' }))
    expect(create).toHaveBeenCalledWith({ name: 'nightly', scopes: ['read', 'run'], days: 365 })
  })
  test('without a scope none is made', async () => {
    const create = vi.fn(() => Promise.resolve())
    render(<TokenForm onCreate={create} />)
    await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), 'nightly')
    await userEvent.click(screen.getByRole('checkbox', { name: 'read' }))
    await userEvent.click(screen.getByRole('button', { name: 'Make an access token' }))
    expect(screen.getByRole('alert')).toHaveTextContent('Choose at least one.')
    expect(create).not.toHaveBeenCalled()
  })
  test('revoking asks once; a refusal keeps the question open with its reason', async () => {
    const revoke = vi.fn(() => Promise.reject(new ApiError({ status: 503, code: 'not_available', detail: 'The database is restarting.', fields: undefined, requestId: undefined })))
    render(<TokenList tokens={[token('active')]} onRevoke={revoke} />)
    await userEvent.click(screen.getByRole('button', { name: 'Revoke nightly' }))
    await userEvent.click(screen.getByRole('button', { name: 'Revoke the token' }))
    expect(revoke).toHaveBeenCalledWith('one')
    expect(screen.getByRole('dialog', { name: 'Revoke “nightly”' })).toHaveTextContent('The database is restarting.')
  })
  test('an empty list says what belongs there, a revoked token has nothing left to revoke', () => {
    const { rerender } = render(<TokenList tokens={[]} onRevoke={() => Promise.resolve()} />)
    expect(screen.getByText('No access token yet.')).toBeInTheDocument()
    rerender(<TokenList tokens={[token('revoked')]} onRevoke={() => Promise.resolve()} />)
    expect(screen.queryByRole('button')).toBeNull()
  })
})
