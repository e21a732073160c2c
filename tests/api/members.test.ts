import { beforeEach, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { select } from '../../server/db.ts'
import { browser, makeGroup, makeMember, PASSWORD, signedInAs, type Agent, type TestGroup, type TestMember } from '../support/people.ts'

const app = createApp()

describe('the members of a group', () => {
  let group: TestGroup
  let lead: TestMember
  let asLead: Agent
  beforeEach(async () => {
    group = await makeGroup()
    lead = await makeMember({ roles: ['lead'], group })
    asLead = await signedInAs(lead, app)
  })

  it('are listed for everybody in it, with what the reader may do with each', async () => {
    const researcher = await makeMember({ group })
    await makeMember()
    const forLead = (await asLead.get('/api/v1/group/members').expect(200)).body.items
    expect(forLead.map((item: { id: string }) => item.id).sort()).toEqual([lead.id, researcher.id].sort())
    expect(forLead.find((item: { id: string }) => item.id === researcher.id).abilities).toEqual({ changeRoles: true, endMembership: true })
    expect(JSON.stringify(forLead)).not.toMatch(/\$2[aby]\$/)
    const asResearcher = await signedInAs(researcher, app)
    const forResearcher = (await asResearcher.get('/api/v1/group/members').expect(200)).body.items
    expect(forResearcher.every((item: { abilities: object }) => Object.values(item.abilities).every((able) => able === false))).toBe(true)
  })

  it('are given and taken roles, which count from the next request on and stand in the audit trail', async () => {
    const member = await makeMember({ group })
    const asMember = await signedInAs(member, app)
    await asMember.get('/api/v1/audit').expect(403)
    const changed = await asLead.patch(`/api/v1/group/members/${member.id}`).send({ roles: ['lead', 'researcher', 'lead'] }).expect(200)
    expect(changed.body.roles).toEqual(['researcher', 'lead'])
    await asMember.get('/api/v1/audit').expect(200)
    const [entry] = await select<{ act: string; actor_id: string; detail: object }>('SELECT act, actor_id, detail FROM audit_entries WHERE subject_id = $id', { id: member.id })
    expect(entry).toEqual({ act: 'member.roles', actor_id: lead.id, detail: { from: ['researcher'], to: ['researcher', 'lead'] } })
  })

  it('keep their name when they leave, and cannot sign in any more', async () => {
    const member = await makeMember({ group, name: 'Somebody Who Left' })
    const asMember = await signedInAs(member, app)
    const { token } = (await asMember.post('/api/v1/access-tokens').send({ name: 'script', scopes: ['read'], days: 1 }).expect(201)).body
    await asMember.post('/api/v1/group/departure').send({ password: PASSWORD }).expect(204)
    await asMember.get('/api/v1/group').expect(401)
    await browser(app).post('/api/v1/session').send({ email: member.email, password: PASSWORD }).expect(401)
    await browser(app).get('/api/v1/group').set('Authorization', `Bearer ${token}`).expect(401)
    const listed = (await asLead.get('/api/v1/group/members')).body.items.find((item: { id: string }) => item.id === member.id)
    expect(listed).toMatchObject({ name: 'Somebody Who Left', state: 'left', abilities: { changeRoles: false, endMembership: false } })
  })

  it('can be sent away by a lead, and their address invited again', async () => {
    const member = await makeMember({ group })
    await asLead.delete(`/api/v1/group/members/${member.id}`).expect(204)
    await asLead.post('/api/v1/invitations').send({ email: member.email, name: 'Back again', roles: ['referee'] }).expect(201)
  })

  it('never leave the group without a lead, even when two leads step down at once', async () => {
    const second = await makeMember({ roles: ['lead'], group })
    const asSecond = await signedInAs(second, app)
    const [one, two] = await Promise.all([
      asLead.patch(`/api/v1/group/members/${lead.id}`).send({ roles: ['researcher'] }),
      asSecond.patch(`/api/v1/group/members/${second.id}`).send({ roles: ['researcher'] }),
    ])
    expect([one.status, two.status].sort()).toEqual([200, 409])
    expect([one, two].find(({ status }) => status === 409)?.body.code).toBe('last_lead')
  })
})

describe("a member's own account", () => {
  it('shows and changes name and wanted mails, and leaves the rest alone', async () => {
    const member = await makeMember()
    const agent = await signedInAs(member, app)
    expect((await agent.get('/api/v1/account').expect(200)).body.mailPreferences).toEqual({ 'claim-signed': true, 'claim-suspended': true, 'claim-withdrawn': true })
    const changed = await agent.patch('/api/v1/account').send({ name: '  New Name ', mailPreferences: { 'claim-signed': false }, roles: ['lead'] }).expect(200)
    expect(changed.body).toMatchObject({ name: 'New Name', roles: member.roles, mailPreferences: { 'claim-signed': false, 'claim-suspended': true } })
  })
})
