import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { allConstants, narrowing } from '../../server/queries/constant.ts'
import { constantQuery } from '../../shared/schemas/constant.ts'
import { select } from '../../server/db.ts'
import { makeGroup, makeMember, signedInAs, type Agent, type TestMember } from '../support/people.ts'
import { makeClaim, makeConstant, series } from '../support/register.ts'

const app = createApp()
const over = (set: Record<string, unknown>, weight: Record<string, string> = {}) => ({ definition: series(set, weight) })
const numbers = (body: { items: { number: string }[] }) => body.items.map(({ number }) => number)

describe('stating a constant', () => {
  let member: TestMember
  let agent: Agent

  beforeAll(async () => {
    member = await makeMember()
    agent = await signedInAs(member, app)
  })

  it('gives it a number and both readings, with its convergence and first members', async () => {
    const { body } = await agent.post('/api/v1/constants').send(over({ kind: 'almost-primes', k: 3 })).expect(201)
    expect(body).toMatchObject({ state: 'stated', best: null, inConflict: false, claims: [], narrowing: [], statedBy: member.name, group: { id: member.groupId } })
    expect(body.number).toMatch(/^MST-\d{4}$/)
    expect(body.definition.text).toContain('exactly 3 prime factors')
    expect(body.definition.latex).toContain('\\Omega(n) = 3')
    expect(body.convergence).toContain('b > 0')
    // The integers below 31 with three prime factors, counted by hand.
    expect(body.firstMembers.slice(0, 7)).toEqual(['8', '12', '18', '20', '27', '28', '30'])
    expect(body.cite.plain).toContain(body.number)
    expect(body.cite.bibtex).toContain(`@misc{${body.number},`)
  })

  it.each([
    ['k = 1 is the primes', over({ kind: 'almost-primes', k: 1, exclude: [] }), over({ kind: 'primes' })],
    ['the order and repetition of exclusions', over({ kind: 'primes', exclude: [5, 3, 5] }), over({ kind: 'primes', exclude: [3, 5] })],
    ['one half, however written', over({ kind: 'primes', exclude: [7] }, { logPower: '0.5' }), over({ kind: 'primes', exclude: [7] }, { logPower: '2/4' })],
  ])('knows a number again: %s', async (_name, first, second) => {
    const one = await agent.post('/api/v1/constants').send(first).expect(201)
    const two = await agent.post('/api/v1/constants').send(second).expect(200)
    expect(two.body.number).toBe(one.body.number)
  })

  it('knows the twin prime constant by name and by expression', async () => {
    const named = await agent.post('/api/v1/constants').send({ definition: { type: 'named', name: 'twin-prime' } }).expect(201)
    const typed = await agent.post('/api/v1/constants').send({ definition: { type: 'over-primes', expression: '1 - 1/(p-1)^2', combine: 'product', exclude: [2] } })
    expect(typed.body).toMatchObject({ number: named.body.number })
    expect(typed.body.number).toBe(named.body.number)
    expect(named.body.definition.aliases).toContain('twin prime constant')
  })

  it('numbers without gap or double, however many state at once', async () => {
    const sets = Array.from({ length: 24 }, (_, index) => ({ kind: 'almost-primes', k: 10 + (index % 12) }))
    const answers = await Promise.all(sets.map((set) => agent.post('/api/v1/constants').send(over(set))))
    expect(answers.map(({ status }) => status).sort()).toEqual([...Array(12).fill(200), ...Array(12).fill(201)])
    const rows = await select<{ number: number }>('SELECT number FROM constants ORDER BY number')
    expect(rows.map(({ number }) => number)).toEqual(rows.map((_, index) => index + 1))
    const stated = answers.map(({ body }) => body.number)
    expect(new Set(stated).size).toBe(12)
  })

  it('leaves a trace in the audit trail', async () => {
    const rows = await select('SELECT act, subject_label, actor_name FROM audit_entries WHERE act = $act AND actor_id = $id ORDER BY seq LIMIT 1', { act: 'constant.state', id: member.id })
    expect(rows[0]).toMatchObject({ act: 'constant.state', actor_name: member.name })
  })
})

describe('the best enclosure', () => {
  it('is the exact intersection of what is signed, and nothing else counts', async () => {
    const lead = await makeMember({ roles: ['lead'] })
    const agent = await signedInAs(lead, app)
    const constant = await makeConstant(lead, series({ kind: 'primes', exclude: [2, 11] }))
    const address = `/api/v1/constants/MST-${String(constant.number).padStart(4, '0')}`
    await makeClaim(lead, constant, { lo: '0.91520', hi: '0.9154' })
    // Endorsed, but not signed.
    await makeClaim(lead, constant, { lo: '0.91531', hi: '0.91532', state: 'endorsed' })
    // Differs from the first in a place that no double holds.
    const narrow = await makeClaim(lead, constant, { lo: '0.9152999999999999999999999999999999999998', hi: '0.9153000000000000000000000000000000000001' })
    const suspended = await makeClaim(lead, constant, { lo: '0.5', hi: '0.6', state: 'suspended' })

    const { body } = await agent.get(address).expect(200)
    expect(body.best).toEqual({ lo: '0.9152999999999999999999999999999999999998', hi: '0.9153000000000000000000000000000000000001', digits: { truncated: 3, rounded: 39 } })
    expect(body.state).toBe('signed')
    expect(body.narrowing.map(({ digits, claim }: { digits: number; claim: string }) => [digits, claim.split('/')[1]])).toEqual([[3, '1'], [3, String(narrow.ordinal)]])
    expect(suspended.ordinal).toBe(4)
  })

  it('is absent where signed enclosures have no common point', async () => {
    const lead = await makeMember({ roles: ['lead'] })
    const constant = await makeConstant(lead, series({ kind: 'primes', exclude: [2, 13] }))
    await makeClaim(lead, constant, { lo: '0.3', hi: '0.4' })
    await makeClaim(lead, constant, { lo: '0.5', hi: '0.6' })
    const { body } = await (await signedInAs(lead, app)).get(`/api/v1/constants/MST-${String(constant.number).padStart(4, '0')}`)
    expect(body.best).toBeNull()
    expect(body.state).toBe('signed')
  })
})

describe('who sees what', () => {
  it('shows readers without account what published groups have signed, and nothing else', async () => {
    const open = await makeMember({ roles: ['lead'] })
    const closed = await makeMember({ roles: ['lead'], group: await makeGroup({ public: false }) })
    const referee = await makeMember({ roles: ['referee'], group: { id: closed.groupId, name: '' } })
    const published = await makeConstant(open, series({ kind: 'primes', exclude: [17] }))
    const secret = await makeConstant(closed, series({ kind: 'primes', exclude: [19] }))
    const draft = await makeConstant(open, series({ kind: 'primes', exclude: [23] }))
    await makeClaim(open, published, { lo: '1.5', hi: '1.6' })
    await makeClaim(closed, published, { lo: '1.55', hi: '1.56' })
    await makeClaim(closed, secret, { lo: '1.5', hi: '1.6' })
    await makeClaim(open, draft, { lo: '1.5', hi: '1.6', state: 'draft' })

    const at = (constant: { number: number }) => `/api/v1/constants/MST-${String(constant.number).padStart(4, '0')}`
    const anyone = (await request(app).get(at(published)).expect(200)).body
    expect(anyone.best).toMatchObject({ lo: '1.5', hi: '1.6' })
    expect(anyone.runs).toEqual([])
    await request(app).get(at(secret)).expect(404)
    await request(app).get(at(draft)).expect(404)
    const list = (await request(app).get('/api/v1/constants?text=primes&limit=100').expect(200)).body
    expect(list.items.map(({ definition }: { definition: { text: string } }) => definition.text)).not.toContain(secret.text)

    const inside = await signedInAs(closed, app)
    expect((await inside.get(at(published))).body.best).toMatchObject({ lo: '1.55', hi: '1.56' })
    expect((await inside.get(at(secret))).body.state).toBe('signed')
    // A constant is known to every group, so that nobody states it again; the other group's draft is not.
    expect((await inside.get(at(draft))).body).toMatchObject({ state: 'stated', best: null })
    // A referee sees of the group's own work what is signed.
    await makeClaim(closed, draft, { lo: '1.5', hi: '1.6', state: 'in-review' })
    expect((await inside.get(at(draft))).body.state).toBe('in-review')
    expect((await (await signedInAs(referee, app)).get(at(draft))).body.state).toBe('stated')
  })

  it('follows a group that begins or ceases to publish, and opens the register to a new group', async () => {
    const lead = await makeMember({ roles: ['lead'] })
    const constant = await makeConstant(lead, series({ kind: 'primes', exclude: [29] }))
    await makeClaim(lead, constant, { lo: '1.61', hi: '1.62' })
    const address = `/api/v1/constants/MST-${String(constant.number).padStart(4, '0')}`
    const late = await signedInAs(await makeMember(), app)
    expect((await late.get(address)).body.best).toMatchObject({ lo: '1.61' })
    const agent = await signedInAs(lead, app)
    const publish = (value: boolean) => agent.patch('/api/v1/group').send({ public: value }).expect(200)
    await publish(false)
    await request(app).get(address).expect(404)
    expect((await late.get(address)).body.best).toBeNull()
    await publish(true)
    await request(app).get(address).expect(200)
  })
})

describe('the register', () => {
  let agent: Agent
  let member: TestMember
  const stated: Record<string, string> = {}

  beforeAll(async () => {
    member = await makeMember({ roles: ['lead'] })
    agent = await signedInAs(member, app)
    const put = async (name: string, set: Record<string, unknown>, weight: Record<string, string> = {}, enclosure?: [string, string]) => {
      const constant = await makeConstant(member, series(set, weight))
      stated[name] = `MST-${String(constant.number).padStart(4, '0')}`
      if (enclosure) await makeClaim(member, constant, { lo: enclosure[0], hi: enclosure[1] })
    }
    // First digits as in Lichtman, "Almost primes and the Banks-Martin conjecture", J. Number Theory 211 (2020), table of f(N_k).
    await put('primes', { kind: 'primes' }, {}, ['1.636616323351260868', '1.636616323351260870'])
    await put('semiprimes', { kind: 'almost-primes', k: 2 }, {}, ['1.14481657340', '1.14481657341'])
    await put('odd3', { kind: 'almost-primes', k: 3, exclude: [2] })
    await put('squarefree3', { kind: 'squarefree-almost-primes', k: 3 })
    await put('square', { kind: 'primes' }, { power: '2', logPower: '0' }, ['0.45224742', '0.45224743'])
    await put('residue', { kind: 'residue-class', modulus: 4, residue: 1 })
  })

  const find = async (query: string) => numbers((await agent.get(`/api/v1/constants?limit=100&${query}`).expect(200)).body)

  it.each([
    ['set=squarefree-almost-primes', 'squarefree3'],
    ['set=almost-primes&k=3&exclude=2', 'odd3'],
    ['power=2&logPower=0', 'square'],
    ['power=4/2&set=primes', 'square'],
    ['minDigits=16', 'primes'],
    [`text=${encodeURIComponent('odd, k = 3')}`, 'odd3'],
    [`text=${encodeURIComponent('squarefree almost primes')}`, 'squarefree3'],
    [`text=${encodeURIComponent('semiprimes')}`, 'semiprimes'],
    [`text=${encodeURIComponent('1/(p log p)')}`, 'primes'],
    [`text=${encodeURIComponent('1/p^2')}`, 'square'],
    [`text=${encodeURIComponent('primes 1 mod 4')}`, 'residue'],
    ['text=1.6366', 'primes'],
    ['text=1.637', 'primes'],
    [`text=${encodeURIComponent('1.63661 63233…')}`, 'primes'],
    ['text=1.1448', 'semiprimes'],
    [`text=${encodeURIComponent('Erdős k=2')}`, 'semiprimes'],
  ])('finds by %s', async (query, name) => {
    expect(await find(query)).toContain(stated[name])
  })

  it.each([
    ['text=1.6365', 'primes'],
    ['text=1.6367', 'primes'],
    ['minDigits=17', 'primes'],
    ['exclude=none', 'odd3'],
    [`text=${encodeURIComponent('odd')}`, 'primes'],
    ['state=signed', 'odd3'],
    ['state=stated', 'primes'],
  ])('leaves out what %s does not mean', async (query, name) => {
    expect(await find(query)).not.toContain(stated[name])
  })

  it('finds a constant by its number', async () => {
    expect(await find(`text=${stated.odd3}`)).toEqual([stated.odd3])
  })

  it.each(['number', 'digits', 'value', 'changed', 'k'])('pages through everything once, sorted by %s, either way', async (sort) => {
    for (const order of ['asc', 'desc']) {
      const whole = numbers((await agent.get(`/api/v1/constants?limit=100&sort=${sort}&order=${order}`)).body)
      const paged: string[] = []
      for (let cursor: string | null = ''; cursor !== null; ) {
        const page = await agent.get(`/api/v1/constants?limit=4&sort=${sort}&order=${order}${cursor === '' ? '' : `&cursor=${encodeURIComponent(cursor)}`}`).expect(200)
        paged.push(...numbers(page.body))
        cursor = page.body.next as string | null
      }
      expect(paged).toEqual(whole)
      expect(new Set(paged).size).toBe(paged.length)
    }
  })

  it('sorts by value with the unknown ones last, whichever way', async () => {
    const group = `group=${member.groupId}`
    const up = await find(`sort=value&${group}`)
    const down = await find(`sort=value&order=desc&${group}`)
    expect(up.slice(0, 3)).toEqual([stated.square, stated.semiprimes, stated.primes])
    expect(down.slice(0, 3)).toEqual([stated.primes, stated.semiprimes, stated.square])
  })

  it('pages by value where values have a thousand digits', async () => {
    const lead = await makeMember({ roles: ['lead'] })
    for (const last of [1, 2, 3]) {
      const constant = await makeConstant(lead, series({ kind: 'primes', exclude: [101, 103 + 4 * (last - 1)].slice(0, last === 3 ? 1 : 2) }))
      await makeClaim(lead, constant, { lo: `1.${'4'.repeat(999)}${last}`, hi: `1.${'4'.repeat(999)}${last + 1}` })
    }
    const query = `/api/v1/constants?sort=value&limit=1&group=${lead.groupId}`
    const own = await signedInAs(lead, app)
    const first = (await own.get(query).expect(200)).body
    const second = (await own.get(`${query}&cursor=${encodeURIComponent(first.next)}`).expect(200)).body
    expect(first.items[0].best.lo.endsWith('1')).toBe(true)
    expect(second.items[0].best.lo.endsWith('2')).toBe(true)
  })

  it('counts with the first page', async () => {
    const { body } = await agent.get(`/api/v1/constants?limit=2&group=${member.groupId}`)
    expect(body.total).toBe(6)
    expect((await agent.get(`/api/v1/constants?limit=2&group=${member.groupId}&cursor=${encodeURIComponent(body.next)}`)).body.total).toBeUndefined()
  })

  it('finds the same for words and digits that few constants have and that many have', async () => {
    const found = async (text: string) => (await agent.get(`/api/v1/constants?text=${encodeURIComponent(text)}&group=${member.groupId}&sort=value`).expect(200)).body as { items: { number: string }[]; total?: number }
    const few = narrowing.most
    for (const text of ['primes', '1.6', 'prime factors', '1.6, primes', 'squarefree', '9.99']) {
      const narrowed = await found(text)
      expect(narrowed.total).toBe(narrowed.items.length)
      narrowing.most = 0
      const [walked, again] = [await found(text), await found(text)]
      narrowing.most = few
      expect(walked.items).toEqual(narrowed.items)
      expect(again).toEqual(walked)
      if (narrowed.items.length > 0) expect(walked.total).toBeUndefined()
    }
    expect((await found('primes')).items.length).toBeGreaterThan(0)
    expect((await found('1.6')).items.length).toBeGreaterThan(0)
  })

  it('goes through everything that is filtered, in order, however many pages it takes', async () => {
    for (const sort of ['number', 'value', 'changed'] as const) {
      const query = constantQuery.parse({ group: member.groupId, sort, order: 'desc' })
      const pages = async (limit: number) => {
        const found: number[][] = []
        for await (const rows of allConstants(undefined, query, limit)) found.push(rows.map(({ number }) => number))
        return found
      }
      const [whole] = await pages(100)
      const inTwos = await pages(2)
      expect(whole!.length).toBeGreaterThan(2)
      expect(inTwos).toHaveLength(Math.ceil(whole!.length / 2))
      expect(inTwos.flat()).toEqual(whole)
    }
  })

  it('exports what is filtered, digits outward', async () => {
    const file = async (format: string) => {
      const response = await agent.get(`/api/v1/constants/export?format=${format}&group=${member.groupId}&state=signed`).buffer(true).parse((res, done) => {
        let text = ''
        res.setEncoding('utf8').on('data', (part) => (text += part)).on('end', () => done(null, text))
      })
      expect(response.status).toBe(200)
      expect(response.headers['content-disposition']).toMatch(/^attachment; filename="merestone-register\./)
      return response.body as string
    }
    const csv = await file('csv')
    expect(csv.split('\r\n')[0]).toBe('number,definition,lo,hi,digits_truncated,digits_rounded,state,in_conflict,group,changed,address')
    expect(csv).toContain('1.636616323351260868,1.636616323351260870,16,17,signed')
    expect(csv.trim().split('\r\n')).toHaveLength(4)
    expect(JSON.parse(await file('json')).items.map(({ number }: { number: string }) => number)).toEqual([stated.primes, stated.semiprimes, stated.square])
    expect((await file('bibtex')).match(/^@misc\{/gm)).toHaveLength(3)
    const latex = await file('latex')
    expect(latex).toContain('\\toprule')
    expect(latex).toContain('$1.63661\\,63233\\,51260\\,8\\ldots$')
    expect(latex).toContain('$0.45224\\,74\\ldots$')
  })
})

describe('the look-up by digits', () => {
  it('lists what the digits can be, nearest first, and where the others part', async () => {
    const lead = await makeMember({ roles: ['lead'] })
    const constant = await makeConstant(lead, series({ kind: 'primes', exclude: [31] }))
    const other = await makeConstant(lead, series({ kind: 'primes', exclude: [37] }))
    await makeClaim(lead, constant, { lo: '7.123456789', hi: '7.123456790' })
    await makeClaim(lead, other, { lo: '7.12399', hi: '7.12400' })
    const { body } = await request(app).post('/api/v1/look-ups').set('X-Merestone', '1').send({ text: '7.12345\\,67', reading: 'truncated' }).expect(200)
    expect(body.items[0]).toMatchObject({ compatibleTo: 7, ruledOutAt: null, constant: { definition: { text: constant.text } } })
    expect(body.items[1]).toMatchObject({ compatibleTo: 3, ruledOutAt: 4, constant: { definition: { text: other.text } } })
  })
})
