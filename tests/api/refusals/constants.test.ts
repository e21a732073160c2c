import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../../server/app.ts'
import { select } from '../../../server/db.ts'
import { browser, makeMember, signedInAs, type Agent } from '../../support/people.ts'
import { series } from '../../support/register.ts'

const app = createApp()

describe('a list is refused', () => {
  it.each([
    ['/constants?kind=primes', 'kind'],
    ['/constants/export?format=csv&sett=primes', 'sett'],
    ['/claims?states=signed', 'states'],
  ])('where the address asks for what there is not: %s', async (path, field) => {
    const { body } = await request(app).get(`/api/v1${path}`).expect(400)
    expect(body.fields).toEqual([{ path: field, message: 'is nothing that can be asked for here' }])
  })
})

describe('stating a constant is refused', () => {
  let agent: Agent
  beforeAll(async () => {
    agent = await signedInAs(await makeMember(), app)
  })

  it('without an account', async () => {
    const response = await browser(app).post('/api/v1/constants').send({ definition: series({ kind: 'primes' }) }).expect(401)
    expect(response.body.code).toBe('not_signed_in')
  })

  it('to a referee', async () => {
    const referee = await signedInAs(await makeMember({ roles: ['referee'] }), app)
    const response = await referee.post('/api/v1/constants').send({ definition: series({ kind: 'primes' }) }).expect(403)
    expect(response.body.code).toBe('role_needed')
  })

  it.each([
    ['k = 0', series({ kind: 'almost-primes', k: 0 }), 'definition.set.k'],
    ['k = 10^9', series({ kind: 'almost-primes', k: 1_000_000_000 }), 'definition.set.k'],
    ['an exclusion that is no prime', series({ kind: 'primes', exclude: [2, 9] }), 'definition.set.exclude'],
    ['a residue that shares a factor with the modulus', series({ kind: 'residue-class', modulus: 10, residue: 5 }), 'definition.set.residue'],
    ['a modulus that is too large', series({ kind: 'residue-class', modulus: 1009, residue: 5 }), 'definition.set.modulus'],
    ['a sum that diverges: 1/p', series({ kind: 'primes' }, { logPower: '0' }), 'definition.weight.logPower'],
    ['a sum that diverges: 1/(n log n) over all integers', series({ kind: 'integers' }), 'definition.weight.logPower'],
    ['a power below 1', series({ kind: 'primes' }, { power: '1/2' }), 'definition.weight.power'],
    ['a weight that is no number', series({ kind: 'primes' }, { power: 'pi' }), 'definition.weight.power'],
    ['an expression that is no rational function', { type: 'over-primes', expression: 'sin(p)', combine: 'sum', exclude: [] }, 'definition.expression'],
    ['a product that diverges', { type: 'over-primes', expression: '1 + 1/p', combine: 'product', exclude: [] }, 'definition.expression'],
    ['an exclusion from a product that is no prime', { type: 'over-primes', expression: '1/p^2', combine: 'sum', exclude: [4] }, 'definition.exclude'],
    ['an unknown kind of set', series({ kind: 'perfect' }), 'definition.set.kind'],
  ])('for %s, at the field, and nothing is stored', async (_name, definition, path) => {
    const [before] = await select<{ n: number }>('SELECT count(*)::int AS n FROM constants')
    const { body } = await agent.post('/api/v1/constants').send({ definition }).expect(400)
    expect(body.fields.map((field: { path: string }) => field.path)).toContain(path)
    expect(body.fields[0].message.length).toBeGreaterThan(10)
    const [after] = await select<{ n: number }>('SELECT count(*)::int AS n FROM constants')
    expect(after).toEqual(before)
  })
})

describe('the register refuses', () => {
  it.each([
    ['a set that there is not', 'set=perfect', 'set'],
    ['a k beside a set that has none', 'set=smooth&k=3', 'k'],
    ['a k of 0', 'k=0', 'k'],
    ['a power that is no number', 'power=pi', 'power'],
    ['an exclusion that is no prime', 'exclude=2,4', 'exclude'],
    ['text that says nothing', 'text=%21%21%21', 'text'],
    ['a negative number of digits', 'minDigits=-1', 'minDigits'],
    ['a page of a million rows', 'limit=1000000', 'limit'],
    ['an unknown state', 'state=perfect', 'state'],
    ['an unknown sorting', 'sort=beauty', 'sort'],
    ['a cursor that is none', 'cursor=abc', 'cursor'],
  ])('%s', async (_name, query, path) => {
    const { body } = await request(app).get(`/api/v1/constants?${query}`).expect(400)
    expect(body.fields.map((field: { path: string }) => field.path)).toContain(path)
  })

  it('a cursor of another query', async () => {
    const agent = await signedInAs(await makeMember(), app)
    for (const k of [2, 3, 4]) await agent.post('/api/v1/constants').send({ definition: series({ kind: 'almost-primes', k }) })
    const { body } = await agent.get('/api/v1/constants?limit=1')
    await agent.get(`/api/v1/constants?limit=2&cursor=${body.next}`).expect(200)
    const other = await agent.get(`/api/v1/constants?limit=1&k=3&cursor=${body.next}`).expect(400)
    expect(other.body.fields).toEqual([{ path: 'cursor', message: 'belongs to a list with other filters or sorting: begin at the first page' }])
    await request(app).get(`/api/v1/constants?limit=1&cursor=${body.next}`).expect(400)
  })

  it('a cursor that was made or changed by hand', async () => {
    const { body } = await (await signedInAs(await makeMember(), app)).get('/api/v1/constants?limit=1')
    const inside = JSON.parse(Buffer.from(body.next, 'base64url').toString())
    for (const changed of [{ ...inside, key: ['x', 'y'] }, { ...inside, seal: 'ä'.repeat(16) }, { key: [1, 1] }, null, 7]) {
      const cursor = Buffer.from(JSON.stringify(changed)).toString('base64url')
      const refused = await request(app).get(`/api/v1/constants?limit=1&cursor=${cursor}`).expect(400)
      expect(refused.body.fields[0].path).toBe('cursor')
    }
  })

  it('a number that is none, and one that is not given', async () => {
    await request(app).get('/api/v1/constants/42').expect(400)
    await request(app).get('/api/v1/constants/MST-00042').expect(404)
    await request(app).get('/api/v1/constants/MST-9999').expect(404)
  })
})

describe('the look-up refuses', () => {
  const ask = (text: string) => request(app).post('/api/v1/look-ups').set('X-Merestone', '1').send({ text, reading: 'rounded' })

  it('what is no number, and more digits than it reads', async () => {
    expect((await ask('one and a half').expect(400)).body.fields[0].path).toBe('text')
    expect((await ask(`1.${'3'.repeat(20_000)}`).expect(400)).body.fields[0].path).toBe('text')
  })

  it('10 MB of digits', async () => {
    expect((await ask(`1.${'3'.repeat(10_000_000)}`).expect(413)).body.code).toBe('too_large')
  })
})
