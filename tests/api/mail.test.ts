import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createApp } from '../../server/app.ts'
import { change, inTransaction, select, selectOne } from '../../server/db.ts'
import { startCatcher, type Catcher } from '../../server/mail/catcher/catcher.ts'
import { deliverDue } from '../../server/mail/deliver.ts'
import { queueMail } from '../../server/mail/outbox.ts'
import { openTransport, type Envelope, type MailTransport } from '../../server/mail/transport.ts'
import { makeGroup, makeMember, signedInAs, type TestGroup, type TestMember } from '../support/people.ts'

const app = createApp()

/** A transport that does as it is told, and remembers. */
function fakeTransport(answer: (envelope: Envelope) => Promise<void> = async () => undefined): MailTransport & { sent: Envelope[] } {
  const sent: Envelope[] = []
  return { sent, send: async (envelope) => answer(envelope).then(() => void sent.push(envelope)), close: () => undefined }
}

const claim = { number: 'MST-0001/1', constant: 'the sum of 1/(n log n) over the primes', path: '/claims/MST-0001-1' }
const queueSigned = (member: TestMember, dedupeKey?: string) =>
  inTransaction((transaction) =>
    queueMail(transaction, 'claim-signed', { memberId: member.id }, { ...claim, lead: 'Lead Üllő' }, { groupId: member.groupId, ...(dedupeKey !== undefined && { dedupeKey }) }),
  )
const due = () => change(`UPDATE outbox SET next_attempt_at = now() WHERE state = 'waiting'`)
const statesOf = async (member: TestMember) =>
  (await select<{ state: string }>('SELECT state FROM outbox WHERE member_id = $id ORDER BY created_at', { id: member.id })).map(({ state }) => state)

describe('the outbox', () => {
  let group: TestGroup
  let member: TestMember
  beforeEach(async () => {
    await change('DELETE FROM outbox')
    group = await makeGroup()
    member = await makeMember({ group })
  })

  it('holds a mail if and only if the change that it tells of was committed', async () => {
    await inTransaction(async (transaction) => {
      await queueMail(transaction, 'claim-signed', { memberId: member.id }, { ...claim, lead: 'L' }, { groupId: group.id })
      throw new Error('undone')
    }).catch(() => undefined)
    expect(await statesOf(member)).toEqual([])
    await queueSigned(member)
    expect(await statesOf(member)).toEqual(['waiting'])
  })

  it('writes a mail with a key once', async () => {
    await Promise.all([queueSigned(member, 'signed:1'), queueSigned(member, 'signed:1')])
    expect(await statesOf(member)).toEqual(['waiting'])
  })

  it('leaves out what a person has switched off, but never what asks for an act, and nobody who has left', async () => {
    await change(`UPDATE members SET mail_preferences = '{"claim-signed": false, "referee-assigned": false}' WHERE id = $id`, { id: member.id })
    await queueSigned(member)
    await inTransaction((transaction) => queueMail(transaction, 'referee-assigned', { memberId: member.id }, { ...claim, lead: 'L', note: '' }, { groupId: group.id }))
    const gone = await makeMember({ group })
    await change(`UPDATE members SET state = 'left' WHERE id = $id`, { id: gone.id })
    await queueSigned(gone)
    const templates = await select<{ template: string }>('SELECT template FROM outbox')
    expect(templates).toEqual([{ template: 'referee-assigned' }])
  })

  it('is sent by four workers at once, each mail exactly once', async () => {
    const members = await Promise.all(Array.from({ length: 25 }, () => makeMember({ group })))
    await Promise.all(members.map((each) => queueSigned(each)))
    const transport = fakeTransport()
    await Promise.all([1, 2, 3, 4].map(() => deliverDue(transport)))
    expect(transport.sent.map(({ to }) => to.address).sort()).toEqual(members.map(({ email }) => email).sort())
    expect(await deliverDue(transport)).toBe(0)
  })

  it('tries again later when the server is away, and gives the mail of a dead worker to another after its lease', async () => {
    await queueSigned(member)
    const away = fakeTransport(async () => Promise.reject(new Error('connect ECONNREFUSED')))
    await deliverDue(away)
    const row = await selectOne<{ state: string; attempts: number; last_error: string; wait: string }>(
      'SELECT state, attempts, last_error, extract(epoch FROM next_attempt_at - now()) AS wait FROM outbox WHERE member_id = $id', { id: member.id },
    )
    expect(row).toMatchObject({ state: 'waiting', attempts: 1, last_error: 'connect ECONNREFUSED' })
    expect(Number(row?.wait)).toBeGreaterThan(50)
    const transport = fakeTransport()
    expect(await deliverDue(transport)).toBe(0)
    await change(`UPDATE outbox SET state = 'sending', lease_until = now() - interval '1 second'`)
    expect(await deliverDue(transport)).toBe(1)
    expect(await statesOf(member)).toEqual(['sent'])
  })

  it('stops after sixteen attempts', async () => {
    await queueSigned(member)
    const away = fakeTransport(async () => Promise.reject(new Error('connect ECONNREFUSED')))
    for (let attempt = 1; attempt <= 16; attempt += 1) {
      await due()
      await deliverDue(away)
    }
    expect(await statesOf(member)).toEqual(['failed'])
  })

  it('is shown to leads without the text of the mails, and sent again by them', async () => {
    const asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
    await queueSigned(member)
    const waiting = (await asLead.get('/api/v1/outbox').expect(200)).body.items[0]
    expect(waiting).toMatchObject({ recipient: { email: member.email }, template: 'claim-signed', state: 'waiting', abilities: { resend: false } })
    expect(Object.keys(waiting)).not.toContain('text')
    await asLead.post(`/api/v1/outbox/${waiting.id}/resend`).expect(409)
    await deliverDue(fakeTransport())
    const copy = (await asLead.post(`/api/v1/outbox/${waiting.id}/resend`).expect(201)).body
    expect(copy).toMatchObject({ state: 'waiting', attempts: 0, subject: waiting.subject })
    expect((await asLead.get('/api/v1/outbox').query({ state: 'sent' }).expect(200)).body.items).toHaveLength(1)
    const stranger = await signedInAs(await makeMember({ roles: ['lead'] }), app)
    expect((await stranger.get('/api/v1/outbox').expect(200)).body.items).toEqual([])
    await stranger.post(`/api/v1/outbox/${waiting.id}/resend`).expect(404)
  })

  it('is paged', async () => {
    const asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
    for (let count = 0; count < 3; count += 1) await queueSigned(member)
    const first = (await asLead.get('/api/v1/outbox').query({ limit: 2 }).expect(200)).body
    const second = (await asLead.get('/api/v1/outbox').query({ limit: 2, cursor: first.next }).expect(200)).body
    expect(new Set([...first.items, ...second.items].map(({ id }: { id: string }) => id)).size).toBe(3)
    expect(second.next).toBeNull()
  })

  it('forgets a one-time link once it is sent, and a lead cannot send it again from there', async () => {
    const asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
    await asLead.post('/api/v1/invitations').send({ email: 'guest@merestone.test', name: 'Guest', roles: ['referee'] }).expect(201)
    const transport = fakeTransport()
    await deliverDue(transport)
    expect(transport.sent[0]?.text).toMatch(/\/invitations\/[\w-]{43}/)
    const row = await selectOne<{ text: null; html: null }>(`SELECT text, html FROM outbox WHERE recipient_email = 'guest@merestone.test'`)
    expect(row).toEqual({ text: null, html: null })
    const item = (await asLead.get('/api/v1/outbox')).body.items[0]
    expect((await asLead.post(`/api/v1/outbox/${item.id}/resend`).expect(409)).body.code).toBe('not_resendable')
  })
})

describe('over SMTP to the catcher', () => {
  const folder = mkdtempSync(join(tmpdir(), 'merestone-mail-'))
  let catcher: Catcher
  let transport: MailTransport
  beforeAll(async () => {
    await change('DELETE FROM outbox')
    catcher = await startCatcher({ folder, smtpPort: 0, readerPort: 0 })
    transport = openTransport(`smtp://127.0.0.1:${catcher.smtpPort}`)
  })
  afterAll(async () => {
    transport.close()
    await catcher.close()
    rmSync(folder, { recursive: true, force: true })
  })

  const reader = (path: string) => fetch(`http://127.0.0.1:${catcher.readerPort}${path}`)

  it('a mail arrives with both its parts, its letters and its link whole, and can be read in a browser', async () => {
    const member = await makeMember({ name: 'Zoë Ångström' })
    await queueSigned(member)
    expect(await deliverDue(transport)).toBe(1)
    const [mail] = (await (await reader('/messages.json')).json()) as { id: string; to: string; subject: string; text: string; html: string; messageId: string }[]
    expect(mail?.to).toContain('Zoë Ångström')
    expect(mail?.subject).toBe('Claim MST-0001/1 is signed')
    expect(mail?.text).toContain('Lead Üllő has signed claim MST-0001/1')
    expect(mail?.text).toContain('http://merestone.test/claims/MST-0001-1')
    expect(mail?.html).toContain('href="http://merestone.test/claims/MST-0001-1"')
    const page = await reader(`/messages/${mail!.id}`)
    expect(page.headers.get('content-security-policy')).toContain("default-src 'none'")
    expect(await page.text()).toContain('Claim MST-0001/1 is signed')
    expect((await reader('/messages/../../package.json')).status).toBe(404)
  })

  it('a mailbox that does not exist is shown as bounced, on the mail and on the member', async () => {
    const group = await makeGroup()
    const member = await makeMember({ group })
    await change('UPDATE members SET email = $email WHERE id = $id', { email: `bounce-${member.email}`, id: member.id })
    await queueSigned(member)
    await deliverDue(transport)
    const asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
    const item = (await asLead.get('/api/v1/outbox').expect(200)).body.items[0]
    expect(item).toMatchObject({ state: 'bounced', attempts: 1, abilities: { resend: true } })
    expect(item.lastError).toMatch(/No such mailbox/)
    const listed = (await asLead.get('/api/v1/group/members')).body.items.find(({ id }: { id: string }) => id === member.id)
    expect(listed.mailBouncedAt).not.toBeNull()
  })
})
