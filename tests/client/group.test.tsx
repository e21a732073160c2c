import { render, screen, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { actWords } from '../../client/src/features/audit/act-words.ts'
import { auditFiltersOf, auditQueryOf } from '../../client/src/features/audit/audit-filters.ts'
import { AuditFiltersForm } from '../../client/src/features/audit/components/audit-filters-form.tsx'
import { AuditTable } from '../../client/src/features/audit/components/audit-table.tsx'
import { ChainCheck } from '../../client/src/features/audit/components/chain-check.tsx'
import { GroupHead } from '../../client/src/features/group/components/group-head.tsx'
import { RulesForm } from '../../client/src/features/group/components/rules-form.tsx'
import { InvitationTable } from '../../client/src/features/invitations/components/invitation-table.tsx'
import { InviteForm } from '../../client/src/features/invitations/components/invite-form.tsx'
import { LeaveGroup } from '../../client/src/features/members/components/leave-group.tsx'
import { MemberTable } from '../../client/src/features/members/components/member-table.tsx'
import { OutboxTable } from '../../client/src/features/outbox/components/outbox-table.tsx'
import { ApiError } from '../../client/src/lib/errors.ts'
import type { AuditEntry, Group, OutboxItem } from '../../shared/schemas/group.ts'
import type { Invitation, Member } from '../../shared/schemas/member.ts'

const group: Group = {
  id: 'g', name: 'Harrow Institute', confirmationsNeeded: 1, recheckNeeded: true, reminderDays: 7, public: true,
  abilities: { setRules: true, manageMembers: true, readAudit: true, manageOutbox: true, leave: true },
}
const member = (id: string, name: string, more: Partial<Member> = {}): Member => ({
  id, name, email: `${id}@harrow.example`, roles: ['researcher'], state: 'active', joinedAt: '2026-03-01T08:00:00Z', leftAt: null, mailBouncedAt: null,
  abilities: { changeRoles: true, endMembership: true }, ...more,
})
const done = () => Promise.resolve()
const refusal = (detail: string, fields?: ApiError['fields']) => new ApiError({ status: 409, code: 'refused', detail, fields, requestId: undefined })

describe('pages of the group', () => {
  test('only those that are open to the reader are named', () => {
    const { rerender } = render(<MemoryRouter><GroupHead group={group} /></MemoryRouter>)
    expect(screen.getAllByRole('link').map((link) => link.textContent)).toEqual(['Members and rules', 'Audit trail', 'Outgoing mail', 'Keys'])
    rerender(<MemoryRouter><GroupHead group={{ ...group, abilities: { ...group.abilities, readAudit: false, manageOutbox: false } }} /></MemoryRouter>)
    expect(screen.getAllByRole('link').map((link) => link.textContent)).toEqual(['Members and rules', 'Keys'])
  })
})

describe('members', () => {
  test('roles are changed in a dialog that says whose, and the page says what they are now', async () => {
    const change = vi.fn(done)
    render(<MemberTable members={[member('a', 'Ilse Varga'), member('b', 'Tomas Brandt')]} ownId="a" onChangeRoles={change} onEnd={done} />)
    await userEvent.click(screen.getByRole('button', { name: 'Change the roles of Tomas Brandt' }))
    const dialog = screen.getByRole('dialog', { name: 'Change the roles of Tomas Brandt' })
    await userEvent.click(within(dialog).getByRole('checkbox', { name: 'referee' }))
    await userEvent.click(within(dialog).getByRole('button', { name: 'Change the roles' }))
    expect(change).toHaveBeenCalledWith('b', ['researcher', 'referee'])
    expect(screen.getByRole('status')).toHaveTextContent('Tomas Brandt is now researcher, referee.')
  })
  test('the last role can’t be taken, and a refusal keeps the dialog open', async () => {
    const change = vi.fn(() => Promise.reject(refusal('The group would be left without a lead.')))
    render(<MemberTable members={[member('a', 'Ilse Varga', { roles: ['lead'] })]} ownId="a" onChangeRoles={change} onEnd={done} />)
    await userEvent.click(screen.getByRole('button', { name: 'Change the roles of Ilse Varga' }))
    await userEvent.click(screen.getByRole('checkbox', { name: 'lead' }))
    await userEvent.click(screen.getByRole('button', { name: 'Change the roles' }))
    expect(screen.getByRole('alert')).toHaveTextContent('Choose at least one role.')
    expect(change).not.toHaveBeenCalled()
    await userEvent.click(screen.getByRole('checkbox', { name: 'referee' }))
    await userEvent.click(screen.getByRole('button', { name: 'Change the roles' }))
    expect(screen.getByRole('dialog')).toHaveTextContent('The group would be left without a lead.')
  })
  test('ending a membership asks once and names the person', async () => {
    const end = vi.fn(done)
    render(<MemberTable members={[member('a', 'Ilse Varga'), member('b', 'Tomas Brandt')]} ownId="a" onChangeRoles={done} onEnd={end} />)
    await userEvent.click(screen.getAllByRole('button', { name: 'End the membership of Tomas Brandt' })[0] as HTMLElement)
    expect(end).not.toHaveBeenCalled()
    await userEvent.click(within(screen.getByRole('dialog')).getByRole('button', { name: 'End the membership of Tomas Brandt' }))
    expect(end).toHaveBeenCalledWith('b')
  })
  test('an address that sends mail back is marked; former members are named below', () => {
    render(<MemberTable members={[member('a', 'Ilse Varga', { mailBouncedAt: '2026-03-02T08:00:00Z' }), member('b', 'Tomas Brandt', { state: 'left', leftAt: '2026-03-05T08:00:00Z' })]} ownId={null} onChangeRoles={done} onEnd={done} />)
    expect(screen.getByText(/mail comes back since/)).toBeInTheDocument()
    expect(screen.getByText(/Former members: /)).toHaveTextContent('Tomas Brandt (until 5 March 2026)')
  })
})

describe('rules', () => {
  test('a number out of range is told at its field; what is saved is sent whole', async () => {
    const save = vi.fn(done)
    render(<RulesForm group={group} onSave={save} />)
    const confirmations = screen.getByRole('spinbutton', { name: 'Confirmations needed' })
    await userEvent.clear(confirmations)
    await userEvent.type(confirmations, '0')
    await userEvent.click(screen.getByRole('button', { name: 'Save the rules' }))
    expect(confirmations).toHaveAccessibleDescription(/At least one\./)
    await userEvent.clear(confirmations)
    await userEvent.type(confirmations, '2')
    await userEvent.click(screen.getByRole('checkbox', { name: 'Signed claims are public' }))
    await userEvent.click(screen.getByRole('button', { name: 'Save the rules' }))
    expect(save).toHaveBeenCalledWith({ confirmationsNeeded: 2, recheckNeeded: true, reminderDays: 7, public: false })
  })
})

const invitation: Invitation = {
  id: 'i', email: 'new@harrow.example', name: 'Nora Lind', roles: ['referee'], state: 'open', invitedBy: { id: 'a', name: 'Ilse Varga' },
  createdAt: '2026-03-01T08:00:00Z', expiresAt: '2026-03-08T08:00:00Z', abilities: { resend: true, revoke: true },
}

describe('invitations', () => {
  test('a server’s word on an address is shown at the address, and nothing typed is lost', async () => {
    render(<InviteForm onInvite={() => Promise.reject(refusal('Some entries need another look.', [{ path: 'email', message: 'is a member already' }]))} />)
    await userEvent.type(screen.getByRole('textbox', { name: 'E-mail address' }), 'new@harrow.example')
    await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), 'Nora Lind')
    await userEvent.click(screen.getByRole('button', { name: 'Send the invitation' }))
    expect(screen.getByRole('textbox', { name: 'E-mail address' })).toHaveAccessibleDescription('This is a member already.')
    expect(screen.getByRole('textbox', { name: 'Name' })).toHaveValue('Nora Lind')
  })
  test('after sending the page says what happens next and the form is empty for the next one', async () => {
    render(<InviteForm onInvite={() => Promise.resolve(invitation)} />)
    await userEvent.type(screen.getByRole('textbox', { name: 'E-mail address' }), 'new@harrow.example')
    await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), 'Nora Lind')
    await userEvent.click(screen.getByRole('button', { name: 'Send the invitation' }))
    expect(screen.getByRole('status')).toHaveTextContent('Nora Lind is invited. A mail with a link goes to new@harrow.example.')
    expect(screen.getByRole('textbox', { name: 'Name' })).toHaveValue('')
  })
  test('a pending one can be sent again and taken back', async () => {
    const resend = vi.fn(done)
    const revoke = vi.fn(done)
    render(<InvitationTable invitations={[invitation]} onResend={resend} onRevoke={revoke} />)
    await userEvent.click(screen.getByRole('button', { name: 'Send the invitation of Nora Lind again' }))
    expect(resend).toHaveBeenCalledWith('i')
    await userEvent.click(screen.getByRole('button', { name: 'Take back the invitation of Nora Lind' }))
    expect(revoke).not.toHaveBeenCalled()
    await userEvent.click(screen.getByRole('button', { name: 'Take back the invitation' }))
    expect(revoke).toHaveBeenCalledWith('i')
  })
})

describe('leaving', () => {
  test('needs the password, and a wrong one is told at the field', async () => {
    render(<LeaveGroup group="Harrow Institute" onLeave={() => Promise.reject(refusal('', [{ path: 'password', message: 'is not your password' }]))} />)
    await userEvent.click(screen.getByRole('button', { name: 'Leave Harrow Institute …' }))
    await userEvent.type(screen.getByLabelText('Your password'), 'wrong')
    await userEvent.click(screen.getByRole('button', { name: 'Leave Harrow Institute' }))
    expect(screen.getByLabelText('Your password')).toHaveAccessibleDescription('This is not your password.')
  })
})

const entry: AuditEntry = {
  seq: 7, at: '2026-03-01T08:00:00Z', actor: { id: 'a', name: 'Ilse Varga' }, act: 'claim.sign', subject: { kind: 'claim', id: '1', label: 'MST-0042/1' }, reason: null,
  digest: 'ab'.repeat(32), detail: { from: 'endorsed', to: 'signed' }, hash: 'cd'.repeat(32), previousHash: 'ef'.repeat(32),
}

describe('audit trail', () => {
  test('an entry reads as a sentence and leads to its subject', () => {
    render(<MemoryRouter><AuditTable entries={[entry, { ...entry, seq: 6, actor: null, act: 'claim.new-act' }]} onTurn={() => undefined} busy={false} /></MemoryRouter>)
    const [first, second] = screen.getAllByRole('row').slice(1)
    expect(first).toHaveTextContent('Ilse Varga')
    expect(first).toHaveTextContent('signed MST-0042/1')
    expect(within(first as HTMLElement).getByRole('link')).toHaveAttribute('href', '/claims/MST-0042-1')
    // An act that has no words yet is shown by its name, never hidden.
    expect(second).toHaveTextContent('claim.new-act')
    expect(second).toHaveTextContent('Merestone')
  })
  test('what somebody did to their own account names nobody twice', () => {
    expect(actWords('member.join', true)).toEqual({ words: 'joined the group', names: false })
    expect(actWords('member.roles', false)).toEqual({ words: 'changed the roles of', names: true })
  })
  test('days in the address are whole days in the reader’s zone', () => {
    const query = auditQueryOf(auditFiltersOf(new URLSearchParams('from=2026-03-01&to=2026-03-01&act=claim.&other=x')))
    expect(query).toEqual({ act: 'claim.', from: new Date(2026, 2, 1).toISOString(), to: new Date(2026, 2, 2).toISOString() })
    expect(auditQueryOf({ from: 'soon' }).from).toBeUndefined()
  })
  test('choosing filters at once, and empty filters stay out of the address', async () => {
    const filter = vi.fn()
    render(<MemoryRouter><AuditFiltersForm filters={{ text: 'MST' }} members={[member('a', 'Ilse Varga')]} onFilter={filter} clearTo="/group/audit" /></MemoryRouter>)
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'By' }), 'Ilse Varga')
    expect(filter).toHaveBeenCalledWith({ text: 'MST', actor: 'a' })
  })
  test('the chain check names the first broken entry', () => {
    const { rerender } = render(<ChainCheck result={{ entries: 12, head: 'cd'.repeat(32), broken: null }} error={null} checking={false} onCheck={() => undefined} />)
    expect(screen.getAllByRole('status')[0]).toHaveTextContent('The chain holds. 12 entries')
    rerender(<ChainCheck result={{ entries: 4, head: 'cd'.repeat(32), broken: { seq: 5, reason: 'it is not linked to the entry before it' } }} error={null} checking={false} onCheck={() => undefined} />)
    expect(screen.getByRole('alert')).toHaveTextContent('The chain breaks at entry 5. The reason: it is not linked to the entry before it.')
  })
})

const mail: OutboxItem = {
  id: 'm', recipient: { name: 'Nora Lind', email: 'nora@harrow.example' }, template: 'referee-assigned', subject: 'Please referee MST-0042/1', state: 'bounced', attempts: 3,
  createdAt: '2026-03-01T08:00:00Z', sentAt: null, nextAttemptAt: null, lastError: '550 no such mailbox', abilities: { resend: true },
}

describe('outgoing mail', () => {
  test('a mail that came back shows why and can be sent again', async () => {
    const resend = vi.fn(done)
    render(<OutboxTable items={[mail]} onResend={resend} onTurn={() => undefined} busy={false} />)
    expect(screen.getByText('came back')).toBeInTheDocument()
    expect(screen.getByText(/550 no such mailbox/)).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Send “Please referee MST-0042/1” to Nora Lind again' }))
    expect(resend).toHaveBeenCalledWith('m')
    expect(screen.getByRole('status')).toHaveTextContent('goes to Nora Lind once more')
  })
  test('one with a one-time link has no way to be sent again', () => {
    render(<OutboxTable items={[{ ...mail, abilities: { resend: false } }]} onResend={done} onTurn={() => undefined} busy={false} />)
    expect(screen.queryByRole('button')).toBeNull()
  })
})
