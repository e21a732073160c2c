import jwt from 'jsonwebtoken'
import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../../server/app.ts'
import { change, selectOne } from '../../../server/db.ts'
import { browser, makeGroup, makeMember, PASSWORD, signedInAs, type Agent, type TestGroup, type TestMember } from '../../support/people.ts'

const app = createApp()
const NOBODY = '00000000-0000-4000-8000-000000000000'

/** Paths of the fields that a 400 names. */
const fieldsOf = (response: { body: { fields?: { path: string }[] } }) => response.body.fields?.map(({ path }) => path).sort()

describe('without signing in', () => {
  it.each([
    ['get', '/group'], ['patch', '/group'], ['get', '/group/members'], ['patch', `/group/members/${NOBODY}`], ['delete', `/group/members/${NOBODY}`],
    ['post', '/group/departure'], ['get', '/sessions'], ['delete', `/sessions/${NOBODY}`], ['put', '/password'], ['get', '/account'], ['patch', '/account'],
    ['get', '/invitations'], ['post', '/invitations'], ['delete', `/invitations/${NOBODY}`], ['post', `/invitations/${NOBODY}/resend`],
    ['get', '/access-tokens'], ['post', '/access-tokens'], ['delete', `/access-tokens/${NOBODY}`],
    ['get', '/audit'], ['get', '/audit/export'], ['get', '/audit/check'], ['get', '/outbox'], ['post', `/outbox/${NOBODY}/resend`],
  ] as const)('%s %s is answered with 401', async (method, path) => {
    const response = await browser(app)[method](`/api/v1${path}`).send(method === 'get' ? undefined : {}).expect(401)
    expect(response.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(response.body.code).toBe('not_signed_in')
  })
})

describe('a session that is not one', () => {
  let member: TestMember
  let sessionId: string
  beforeAll(async () => {
    member = await makeMember()
    await signedInAs(member, app)
    sessionId = (await selectOne<{ id: string }>('SELECT id FROM sessions WHERE member_id = $id', { id: member.id }))!.id
  })
  const withCookie = (token: string) => request(app).get('/api/v1/group').set('Cookie', `merestone=${token}`)
  const expires = Math.floor(Date.now() / 1000) + 3600

  it('is refused when it is signed with another secret', async () => {
    await withCookie(jwt.sign({ sid: sessionId, exp: expires }, 'another secret that is long enough, too')).expect(401)
  })

  it('is refused when it is not signed at all', async () => {
    await withCookie(jwt.sign({ sid: sessionId, exp: expires }, '', { algorithm: 'none' })).expect(401)
    await withCookie('rubbish').expect(401)
  })

  it('is refused when its time has passed, in the cookie or in its row', async () => {
    const secret = process.env.SESSION_SECRET!
    await withCookie(jwt.sign({ sid: sessionId, exp: expires }, secret)).expect(200)
    await withCookie(jwt.sign({ sid: sessionId, exp: expires - 7200 }, secret)).expect(401)
    await change(`UPDATE sessions SET expires_at = now() - interval '1 second' WHERE id = $sessionId`, { sessionId })
    await withCookie(jwt.sign({ sid: sessionId, exp: expires }, secret)).expect(401)
  })

  it('is refused when it names no session', async () => {
    await withCookie(jwt.sign({ sid: NOBODY, exp: expires }, process.env.SESSION_SECRET!)).expect(401)
  })

  it("of somebody else cannot be ended by one who knows its id", async () => {
    const owner = await makeMember()
    const asOwner = await signedInAs(owner, app)
    const { id } = (await asOwner.get('/api/v1/sessions')).body.items[0]
    await (await signedInAs(await makeMember(), app)).delete(`/api/v1/sessions/${id}`).expect(404)
    await asOwner.get('/api/v1/group').expect(200)
  })
})

describe('signing in', () => {
  it('does not tell an unknown address from a wrong password', async () => {
    const member = await makeMember()
    const wrong = await browser(app).post('/api/v1/session').send({ email: member.email, password: 'not this one' }).expect(401)
    const unknown = await browser(app).post('/api/v1/session').send({ email: 'nobody@merestone.test', password: 'not this one' }).expect(401)
    const { requestId: _one, ...first } = wrong.body
    const { requestId: _two, ...second } = unknown.body
    expect(first).toEqual(second)
    await browser(app).post('/api/v1/password-resets').send({ email: 'nobody@merestone.test' }).expect(202)
  })

  it('names each field that is wrong', async () => {
    expect(fieldsOf(await browser(app).post('/api/v1/session').send({ email: 'x' }).expect(400))).toEqual(['email', 'password'])
    expect(fieldsOf(await browser(app).post('/api/v1/session').send([]).expect(400))).toEqual([''])
  })

  it('is refused after ten wrong passwords, the right one too, even all at once and from a new process', async () => {
    const member = await makeMember()
    const other = await makeMember()
    const tries = await Promise.all(Array.from({ length: 20 }, () => browser(app).post('/api/v1/session').send({ email: member.email, password: 'guess' })))
    expect(tries.filter(({ status }) => status === 401)).toHaveLength(10)
    expect(tries.filter(({ status }) => status === 429)).toHaveLength(10)
    const right = await browser(createApp()).post('/api/v1/session').send({ email: member.email, password: PASSWORD }).expect(429)
    expect(Number(right.headers['retry-after'])).toBeGreaterThan(60)
    await signedInAs(other, app)
    await change(`UPDATE sign_in_failures SET at = at - interval '16 minutes'`)
    await signedInAs(member, app)
  })

  it('leaves no way round the throttle through the old password of a change', async () => {
    const member = await makeMember()
    const agent = await signedInAs(member, app)
    for (let count = 0; count < 10; count += 1) {
      const response = await agent.put('/api/v1/password').send({ current: 'guess', next: 'long enough for all' }).expect(400)
      expect(fieldsOf(response)).toEqual(['current'])
    }
    await agent.put('/api/v1/password').send({ current: PASSWORD, next: 'long enough for all' }).expect(429)
  })
})

describe('a password', () => {
  it('that is too short, or longer than bcrypt reads, is refused at its field', async () => {
    const agent = await signedInAs(await makeMember(), app)
    for (const next of ['short', 'ü'.repeat(37)]) {
      expect(fieldsOf(await agent.put('/api/v1/password').send({ current: PASSWORD, next }).expect(400))).toEqual(['next'])
    }
  })

  it('cannot be reset by a made-up token, nor by more than three mails an hour', async () => {
    await browser(app).get(`/api/v1/password-resets/${'a'.repeat(43)}`).expect(410)
    await browser(app).post(`/api/v1/password-resets/${'a'.repeat(43)}`).send({ password: 'long enough for all' }).expect(410)
    const member = await makeMember()
    await Promise.all(Array.from({ length: 6 }, () => browser(app).post('/api/v1/password-resets').send({ email: member.email }).expect(202)))
    const mails = await selectOne<{ count: string }>(`SELECT count(*) AS count FROM outbox WHERE member_id = $id`, { id: member.id })
    expect(mails?.count).toBe('3')
  })
})

describe("another group's things", () => {
  let asStranger: Agent
  let group: TestGroup
  let asLead: Agent
  beforeAll(async () => {
    asStranger = await signedInAs(await makeMember({ roles: ['lead'] }), app)
    group = await makeGroup()
    asLead = await signedInAs(await makeMember({ roles: ['lead'], group }), app)
  })

  it('members: their roles cannot be changed nor their membership ended; the answer is that of a member who does not exist', async () => {
    const member = await makeMember({ group })
    const real = await asStranger.patch(`/api/v1/group/members/${member.id}`).send({ roles: ['lead'] }).expect(404)
    const made = await asStranger.patch(`/api/v1/group/members/${NOBODY}`).send({ roles: ['lead'] }).expect(404)
    expect(real.body.detail).toBe(made.body.detail)
    await asStranger.delete(`/api/v1/group/members/${member.id}`).expect(404)
  })

  it('invitations: cannot be sent again nor taken back', async () => {
    const { id } = (await asLead.post('/api/v1/invitations').send({ email: 'someone@merestone.test', name: 'Some One', roles: ['referee'] }).expect(201)).body
    await asStranger.post(`/api/v1/invitations/${id}/resend`).expect(404)
    await asStranger.delete(`/api/v1/invitations/${id}`).expect(404)
  })
})

describe('a member who is not a lead', () => {
  it.each([
    ['patch', '/group', { public: false }], ['patch', `/group/members/${NOBODY}`, { roles: ['lead'] }], ['delete', `/group/members/${NOBODY}`, {}],
    ['get', '/invitations', {}], ['post', '/invitations', { email: 'a@b.test', name: 'A', roles: ['lead'] }],
    ['get', '/audit', {}], ['get', '/audit/export', {}], ['get', '/audit/check', {}], ['get', '/outbox', {}], ['post', `/outbox/${NOBODY}/resend`, {}],
  ] as const)('may not %s %s', async (method, path, body) => {
    const agent = await signedInAs(await makeMember({ roles: ['researcher', 'referee'] }), app)
    expect((await agent[method](`/api/v1${path}`).send(body).expect(403)).body.code).toBe('role_needed')
  })

  it('cannot make themselves lead', async () => {
    const member = await makeMember({ roles: ['researcher'] })
    const agent = await signedInAs(member, app)
    await agent.patch(`/api/v1/group/members/${member.id}`).send({ roles: ['lead'] }).expect(403)
  })
})

describe('input that makes no sense', () => {
  let asLead: Agent
  beforeAll(async () => {
    asLead = await signedInAs(await makeMember({ roles: ['lead'] }), app)
  })

  it('is refused at its field', async () => {
    expect(fieldsOf(await asLead.patch('/api/v1/group').send({ confirmationsNeeded: 0, reminderDays: 1.5, public: 'yes' }).expect(400))).toEqual(['confirmationsNeeded', 'public', 'reminderDays'])
    expect(fieldsOf(await asLead.post('/api/v1/invitations').send({ email: 'x', name: ' ', roles: ['king'] }).expect(400))).toEqual(['email', 'name', 'roles.0'])
    expect(fieldsOf(await asLead.post('/api/v1/invitations').send({ email: 'x@y.test', name: 'X', roles: [] }).expect(400))).toEqual(['roles'])
    expect(fieldsOf(await asLead.post('/api/v1/access-tokens').send({ name: 'x', scopes: ['read', 'sign'], days: 9999 }).expect(400))).toEqual(['days', 'scopes.1'])
    expect(fieldsOf(await asLead.delete('/api/v1/sessions/17').expect(400))).toEqual(['id'])
    expect(fieldsOf(await asLead.get('/api/v1/audit').query({ limit: 5000, from: 'yesterday' }).expect(400))).toEqual(['from', 'limit'])
    expect(fieldsOf(await asLead.get('/api/v1/audit').query({ cursor: 'made-up' }).expect(400))).toEqual(['cursor'])
    expect(fieldsOf(await asLead.get('/api/v1/outbox?state=sent&state=failed').expect(400))).toEqual(['state'])
  })

  it('of more than a megabyte is refused as too large', async () => {
    expect((await asLead.patch('/api/v1/account').send({ name: 'x'.repeat(1_100_000) }).expect(413)).body.code).toBe('too_large')
  })

  it('with a zero character, which PostgreSQL cannot keep, is refused and no fault of the server', async () => {
    const response = await asLead.patch('/api/v1/account').send({ name: 'a\u0000b' })
    expect(response.status).toBe(400)
  })
})

describe('a request that another site makes a browser send', () => {
  it('is refused although the cookie comes along', async () => {
    const member = await makeMember()
    const agent = request.agent(app)
    await agent.post('/api/v1/session').set('X-Merestone', '1').send({ email: member.email, password: PASSWORD }).expect(200)
    expect((await agent.patch('/api/v1/account').send({ name: 'Forged' }).expect(403)).body.code).toBe('cross_site_request')
    await agent.patch('/api/v1/account').set('X-Merestone', '1').set('Sec-Fetch-Site', 'cross-site').send({ name: 'Forged' }).expect(403)
  })
})

describe('an access token', () => {
  it('that is made up is refused, also where no account is needed', async () => {
    const response = await request(app).get('/api/v1/session').set('Authorization', 'Bearer mst_made-up').expect(401)
    expect(response.body.code).toBe('token_refused')
    await request(app).get('/api/v1/keys').set('Authorization', 'Basic abc').expect(401)
  })

  it('past its time, or without the scope, is refused', async () => {
    const agent = await signedInAs(await makeMember(), app)
    const { id, token } = (await agent.post('/api/v1/access-tokens').send({ name: 'x', scopes: ['run'], days: 1 }).expect(201)).body
    const asProgram = () => request(app).get('/api/v1/group').set('Authorization', `Bearer ${token}`)
    expect((await asProgram().expect(403)).body.code).toBe('scope_needed')
    await change(`UPDATE access_tokens SET expires_at = now() - interval '1 second' WHERE id = $id`, { id })
    expect((await asProgram().expect(401)).body.code).toBe('token_refused')
  })

  it('that may not read sees what everybody sees, and its answers to what it may do', async () => {
    const agent = await signedInAs(await makeMember(), app)
    const withScope = async (scope: string) => {
      const { token } = (await agent.post('/api/v1/access-tokens').send({ name: scope, scopes: [scope], days: 1 }).expect(201)).body
      return (method: 'get' | 'post', path: string) => request(app)[method](path).set('Authorization', `Bearer ${token}`)
    }
    const [drafting, reading] = [await withScope('draft'), await withScope('read')]
    const definition = { type: 'series', set: { kind: 'almost-primes', k: 7, exclude: [2, 11] }, weight: {} }
    const { number } = (await drafting('post', '/api/v1/constants').send({ definition }).expect(201)).body
    await drafting('get', `/api/v1/constants/${number}`).expect(404)
    await drafting('get', `/constants/${number}`).set('Accept', 'text/html').expect(404)
    expect((await drafting('get', '/api/v1/constants').expect(200)).body.items).toEqual([])
    await reading('get', `/api/v1/constants/${number}`).expect(200)
  })

  it('of somebody else cannot be revoked', async () => {
    const { id } = (await (await signedInAs(await makeMember(), app)).post('/api/v1/access-tokens').send({ name: 'x', scopes: ['read'], days: 1 })).body
    await (await signedInAs(await makeMember(), app)).delete(`/api/v1/access-tokens/${id}`).expect(404)
  })
})
