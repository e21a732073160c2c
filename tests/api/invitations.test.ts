import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { change, selectOne } from '../../server/db.ts'
import { browser, lastMailTo, makeGroup, makeMember, signedInAs, type Agent, type TestGroup } from '../support/people.ts'

const app = createApp()
const CHOSEN = 'chosen by the newcomer'

describe('an invitation', () => {
  let group: TestGroup
  let asLead: Agent
  let count = 0
  beforeAll(async () => {
    group = await makeGroup()
    asLead = await signedInAs(await makeMember({ roles: ['lead'], group, name: 'The Lead' }), app)
  })

  async function invited(): Promise<{ id: string; email: string; token: string }> {
    count += 1
    const email = `newcomer-${count}@merestone.test`
    const { id } = (await asLead.post('/api/v1/invitations').send({ email, name: 'New Comer', roles: ['referee'] }).expect(201)).body
    return { id, email, token: await tokenFor(email) }
  }

  async function tokenFor(email: string): Promise<string> {
    return /\/invitations\/([\w-]+)/.exec((await lastMailTo(email))?.text ?? '')?.[1] ?? ''
  }

  it('is mailed, shows what one is invited to, and makes a member who is signed in at once', async () => {
    const { email, token } = await invited()
    const offer = await browser(app).get(`/api/v1/invitations/accept/${token}`).expect(200)
    expect(offer.body).toMatchObject({ email, name: 'New Comer', group: group.name, roles: ['referee'], invitedBy: 'The Lead' })
    const newcomer = browser(app)
    const accepted = await newcomer.post(`/api/v1/invitations/accept/${token}`).send({ name: 'New Comer', password: CHOSEN }).expect(201)
    expect(accepted.body.member).toMatchObject({ email, roles: ['referee'], group: { id: group.id } })
    await newcomer.get('/api/v1/group').expect(200)
    await browser(app).post('/api/v1/session').send({ email, password: CHOSEN }).expect(200)
  })

  it('works once, even when it is used twice at the same moment', async () => {
    const { email, token } = await invited()
    const uses = await Promise.all([1, 2].map(() => browser(app).post(`/api/v1/invitations/accept/${token}`).send({ name: 'New Comer', password: CHOSEN })))
    expect(uses.map(({ status }) => status).sort()).toEqual([201, 410])
    const members = await selectOne<{ count: string }>('SELECT count(*) AS count FROM members WHERE email = $email', { email })
    expect(members?.count).toBe('1')
  })

  it('is void after its time, and after it was taken back', async () => {
    const old = await invited()
    await change(`UPDATE invitations SET expires_at = now() - interval '1 second' WHERE id = $id`, { id: old.id })
    await browser(app).get(`/api/v1/invitations/accept/${old.token}`).expect(410)
    const revoked = await invited()
    await asLead.delete(`/api/v1/invitations/${revoked.id}`).expect(204)
    expect((await browser(app).post(`/api/v1/invitations/accept/${revoked.token}`).send({ name: 'X', password: CHOSEN }).expect(410)).body.code).toBe('link_used')
  })

  it('is sent again with a new link, which voids the old one', async () => {
    const { id, email, token } = await invited()
    await change(`UPDATE invitations SET expires_at = now() - interval '1 second' WHERE id = $id`, { id })
    const again = await asLead.post(`/api/v1/invitations/${id}/resend`).expect(200)
    expect(again.body.state).toBe('open')
    await browser(app).get(`/api/v1/invitations/accept/${token}`).expect(410)
    await browser(app).get(`/api/v1/invitations/accept/${await tokenFor(email)}`).expect(200)
  })

  it('is listed with its state for leads only', async () => {
    const [open, revoked] = [await invited(), await invited()]
    await asLead.delete(`/api/v1/invitations/${revoked.id}`).expect(204)
    const { items } = (await asLead.get('/api/v1/invitations').expect(200)).body
    const stateOf = (id: string) => items.find((item: { id: string }) => item.id === id)?.state
    expect([stateOf(open.id), stateOf(revoked.id)]).toEqual(['open', 'revoked'])
    const asReferee = await signedInAs(await makeMember({ roles: ['referee'], group }), app)
    await asReferee.get('/api/v1/invitations').expect(403)
  })

  it('stands beside no second one for the same address', async () => {
    const { email } = await invited()
    const second = await asLead.post('/api/v1/invitations').send({ email, name: 'New Comer', roles: ['lead'] }).expect(409)
    expect(second.body.code).toBe('already_invited')
  })
})
