import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { selectOne } from '../../server/db.ts'
import { browser, lastMailTo, makeMember, PASSWORD, signedInAs, type TestMember } from '../support/people.ts'

const app = createApp()
const NEXT = 'a quite different password'

/** The one-time token in the last mail to somebody. */
async function mailedToken(email: string): Promise<string> {
  const mail = await lastMailTo(email)
  return /\/(?:password-reset|invitations)\/([\w-]+)/.exec(mail?.text ?? '')?.[1] ?? ''
}

describe('signing in', () => {
  let member: TestMember
  beforeAll(async () => {
    member = await makeMember({ roles: ['researcher', 'lead'] })
  })

  it('answers who one is, with rights, and keeps it in a cookie that scripts cannot read', async () => {
    const response = await browser(app).post('/api/v1/session').send({ email: member.email.toUpperCase(), password: PASSWORD }).expect(200)
    expect(response.body.member).toMatchObject({ id: member.id, name: member.name, roles: ['researcher', 'lead'], group: { id: member.groupId } })
    expect(response.body.member.rights).toContain('members.manage')
    expect(response.headers['set-cookie']?.[0]).toMatch(/^merestone=.*HttpOnly.*SameSite=Lax/i)
  })

  it('tells a reader without account that nobody is signed in', async () => {
    const response = await browser(app).get('/api/v1/session').expect(200)
    expect(response.body).toEqual({ member: null, counts: { desk: 0, runs: 0 } })
  })

  it('ends on the server too: the cookie kept by a thief opens nothing afterwards', async () => {
    const agent = browser(app)
    const signedIn = await agent.post('/api/v1/session').send({ email: member.email, password: PASSWORD })
    const stolen = signedIn.headers['set-cookie']![0]!.split(';')[0]!
    await request(app).get('/api/v1/group').set('Cookie', stolen).expect(200)
    await agent.delete('/api/v1/session').expect(204)
    await agent.get('/api/v1/group').expect(401)
    await request(app).get('/api/v1/group').set('Cookie', stolen).expect(401)
  })

  it('lists where one is signed in, and ends another session', async () => {
    const [here, there] = [await signedInAs(member, app), await signedInAs(member, app)]
    const { items } = (await here.get('/api/v1/sessions').expect(200)).body
    expect(items.filter((item: { current: boolean }) => item.current)).toHaveLength(1)
    const other = (await there.get('/api/v1/sessions')).body.items.find((item: { current: boolean }) => item.current)
    await here.delete(`/api/v1/sessions/${other.id}`).expect(204)
    await there.get('/api/v1/group').expect(401)
    await here.get('/api/v1/group').expect(200)
  })
})

describe('a password', () => {
  it('is changed with the old one, which ends all other sessions', async () => {
    const member = await makeMember()
    const [here, there] = [await signedInAs(member, app), await signedInAs(member, app)]
    await here.put('/api/v1/password').send({ current: PASSWORD, next: NEXT }).expect(204)
    await here.get('/api/v1/group').expect(200)
    await there.get('/api/v1/group').expect(401)
    await browser(app).post('/api/v1/session').send({ email: member.email, password: PASSWORD }).expect(401)
    await browser(app).post('/api/v1/session').send({ email: member.email, password: NEXT }).expect(200)
  })

  it('is set anew by a mailed link that works once and ends every session', async () => {
    const member = await makeMember()
    const here = await signedInAs(member, app)
    await browser(app).post('/api/v1/password-resets').send({ email: member.email }).expect(202)
    const token = await mailedToken(member.email)
    const offer = await browser(app).get(`/api/v1/password-resets/${token}`).expect(200)
    expect(offer.body.email).toBe(member.email)
    const [first, second] = await Promise.all([1, 2].map(() => browser(app).post(`/api/v1/password-resets/${token}`).send({ password: NEXT })))
    expect([first!.status, second!.status].sort()).toEqual([204, 410])
    await here.get('/api/v1/group').expect(401)
    await browser(app).post('/api/v1/session').send({ email: member.email, password: NEXT }).expect(200)
  })

  it('is not kept in clear, nor is any token', async () => {
    const member = await makeMember()
    const agent = await signedInAs(member, app)
    await agent.put('/api/v1/password').send({ current: PASSWORD, next: NEXT }).expect(204)
    const row = await selectOne<{ password_hash: string }>('SELECT password_hash FROM members WHERE id = $id', { id: member.id })
    expect(row?.password_hash).toMatch(/^\$2[aby]\$1[1-9]\$/)
    const created = await agent.post('/api/v1/access-tokens').send({ name: 'script', scopes: ['read'], days: 30 }).expect(201)
    const found = await selectOne('SELECT 1 AS found FROM access_tokens t WHERE t::text LIKE $token', { token: `%${created.body.token}%` })
    expect(found).toBeUndefined()
  })
})

describe('an access token', () => {
  it('reads for its owner until it is revoked, and does nothing beyond its scopes', async () => {
    const member = await makeMember({ roles: ['lead'] })
    const agent = await signedInAs(member, app)
    const { id, token } = (await agent.post('/api/v1/access-tokens').send({ name: 'script', scopes: ['read'], days: 30 }).expect(201)).body
    const bearer = (method: 'get' | 'patch' | 'post', path: string) => request(app)[method](path).set('Authorization', `Bearer ${token}`)
    await bearer('get', '/api/v1/group').expect(200)
    const used = (await agent.get('/api/v1/access-tokens')).body.items[0]
    expect(used).toMatchObject({ id, state: 'active' })
    expect(used.lastUsedAt).not.toBeNull()
    expect(used.token).toBeUndefined()
    expect((await bearer('patch', '/api/v1/group').send({ reminderDays: 3 }).expect(403)).body.code).toBe('session_needed')
    expect((await bearer('get', '/api/v1/access-tokens').expect(403)).body.code).toBe('session_needed')
    await agent.delete(`/api/v1/access-tokens/${id}`).expect(204)
    expect((await bearer('get', '/api/v1/group').expect(401)).body.code).toBe('token_refused')
  })
})
