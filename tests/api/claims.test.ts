import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { select } from '../../server/db.ts'
import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import { claim as claimSchema, type Claim } from '../../shared/schemas/claim.ts'
import { claimIn, draft, finishedRecheck, finishedRun, freshConstant, makeCast, reload, type Cast } from '../support/claims.ts'
import { lastMailTo, PASSWORD, signedInAs, type Agent } from '../support/people.ts'

const app = createApp()

describe('registering a claim', () => {
  let cast: Cast
  let author: Agent
  beforeAll(async () => {
    cast = await makeCast()
    author = await signedInAs(cast.author, app)
  })

  it('takes the enclosure, digits and certificate of a run', async () => {
    const constant = await freshConstant(cast.author)
    const run = await finishedRun(cast.author, constant, { lo: '1.2345', hi: '1.2346' })
    const { body } = await author.post('/api/v1/claims').send({ kind: 'enclosure', runId: run.id, remark: 'first' }).expect(201)
    expect(claimSchema.safeParse(body).error).toBeUndefined()
    expect(body).toMatchObject({
      number: null, kind: 'enclosure', state: 'draft', enclosure: { lo: '1.2345', hi: '1.2346' }, digits: { truncated: 3, rounded: 2 }, repeatedHere: true, remark: 'first',
      run: { id: run.id, method: 'transform', arithmetic: 'ball' }, certificate: { digest: run.certificateDigest, signed: false }, next: `${cast.author.name}: submit the draft`,
    })
    expect(body.abilities).toMatchObject({ submit: true, edit: true, delete: true, attach: true, sign: false, confirm: false })
    const certificate = await author.get(`/api/v1/claims/${body.id}/certificate`).expect(200)
    expect(certificate.text).toBe(run.certificate)
  })

  it.each([
    ['truncated digits', { digits: '1.23…', reading: 'truncated' }, '1.23', '1.24'],
    ['rounded digits', { digits: '1,23 46', reading: 'rounded' }, '1.23455', '1.23465'],
    ['negative digits, cut towards zero', { digits: '-0.5', reading: 'truncated' }, '-0.6', '-0.5'],
    ['an interval', { lo: '01.20', hi: '1.3' }, '1.20', '1.3'],
  ])('turns %s from elsewhere into an exact interval', async (_name, value, lo, hi) => {
    const constant = await freshConstant(cast.author)
    const { body } = await author.post('/api/v1/claims').send({ kind: 'stated', constant: constantNumberText(constant.number), value, source: 'Math. Comp. 1 (1950), p. 2' }).expect(201)
    expect(body).toMatchObject({ enclosure: { lo, hi }, repeatedHere: false, source: 'Math. Comp. 1 (1950), p. 2', statedValue: 'digits' in value ? value : null })
    expect(claimSchema.safeParse(body).error).toBeUndefined()
  })

  it('shows a value from elsewhere as repeated once a run of ours meets it, and not by one that does not', async () => {
    const constant = await freshConstant(cast.author)
    const stated = { kind: 'stated', constant: constantNumberText(constant.number), value: { digits: '1.5', reading: 'truncated' }, source: 'a table' }
    await finishedRun(cast.author, constant, { lo: '1.7', hi: '1.8' })
    const first = await author.post('/api/v1/claims').send(stated).expect(201)
    expect(first.body.repeatedHere).toBe(false)
    await finishedRun(cast.author, constant, { lo: '1.59', hi: '1.7' })
    const second = await author.post('/api/v1/claims').send(stated).expect(201)
    expect(second.body.repeatedHere).toBe(true)
  })

  it('gives an order its two enclosures and the claims that they come from', async () => {
    const small = await claimIn('signed', cast, { lo: '1.1', hi: '1.2' })
    const large = await claimIn('signed', cast, { lo: '1.3', hi: '1.4' })
    const constants = await select<{ id: string; number: number }>('SELECT id, number FROM constants WHERE id IN ($a, $b)', { a: small.constantId, b: large.constantId })
    const number = (id: string) => constantNumberText(constants.find((constant) => constant.id === id)!.number)
    const { body } = await author.post('/api/v1/claims').send({ kind: 'order', lesser: number(small.constantId), greater: number(large.constantId) }).expect(201)
    expect(claimSchema.safeParse(body).error).toBeUndefined()
    expect(body).toMatchObject({ constant: number(small.constantId), otherConstant: number(large.constantId), enclosure: null, order: { lesser: { enclosure: { lo: '1.1', hi: '1.2' } }, greater: { enclosure: { lo: '1.3', hi: '1.4' } } } })
    const certificate = JSON.parse((await author.get(`/api/v1/claims/${body.id}/certificate`)).text)
    expect(certificate.lesser.claims).toEqual([{ id: small.id, number: `${number(small.constantId)}/1`, certificate: small.certificateDigest }])
  })

  it('is changed, and keeps its content bound to its digest', async () => {
    const claim = await draft(cast.author, { stated: true })
    const first = await author.patch(`/api/v1/claims/${claim.id}`).send({ version: 1, remark: 'clearer' }).expect(200)
    expect(first.body).toMatchObject({ remark: 'clearer', version: 2, digest: claim.digest })
    const second = await author.patch(`/api/v1/claims/${claim.id}`).send({ version: 2, source: 'J. Tests 1 (2020), Table 2' }).expect(200)
    expect(second.body).toMatchObject({ version: 3, source: 'J. Tests 1 (2020), Table 2' })
    expect(second.body.digest).not.toBe(claim.digest)
  })

  it('is deleted while it was never submitted', async () => {
    const claim = await draft(cast.author)
    await author.delete(`/api/v1/claims/${claim.id}`).expect(204)
    await author.get(`/api/v1/claims/${claim.id}`).expect(404)
  })

  it('gets its number at the first submission, one after the other however many submit at once', async () => {
    const constant = await freshConstant(cast.author)
    const drafts = await Promise.all(Array.from({ length: 12 }, () => draft(cast.author, { constant, stated: true })))
    const answers = await Promise.all(drafts.map(({ id }) => author.post(`/api/v1/claims/${id}/submit`).send({ version: 1 })))
    expect(answers.map(({ status }) => status)).toEqual(Array(12).fill(200))
    const numbers = answers.map(({ body }) => body.number).sort()
    expect(numbers).toEqual(Array.from({ length: 12 }, (_, index) => claimNumberText(constant.number, index + 1)).sort())
  })
})

describe('the list of claims', () => {
  it('shows each reader what is open to them, in pages', async () => {
    const cast = await makeCast()
    const signed = await claimIn('signed', cast)
    const drafts = [await draft(cast.author), await draft(cast.author)]
    const ids = async (agent: Agent | ReturnType<typeof request>, query = '') => {
      const { body } = await agent.get(`/api/v1/claims?limit=100${query}`).expect(200)
      return (body.items as Claim[]).filter(({ group }) => group.id === cast.group.id).map(({ id }) => id)
    }
    const all = [...drafts.map(({ id }) => id).reverse(), signed.id]
    expect(await ids(await signedInAs(cast.colleague, app))).toEqual(all)
    expect(await ids(await signedInAs(cast.colleague, app), '&mine=true')).toEqual([])
    expect(await ids(await signedInAs(cast.author, app), '&mine=true&state=draft')).toEqual(all.slice(0, 2))
    expect(await ids(await signedInAs(cast.secondReferee, app))).toEqual([signed.id])
    expect(await ids(request(app))).toEqual([signed.id])
    const author = await signedInAs(cast.author, app)
    const first = await author.get('/api/v1/claims?mine=true&limit=2').expect(200)
    const second = await author.get(`/api/v1/claims?mine=true&limit=2&cursor=${first.body.next}`).expect(200)
    expect([...first.body.items, ...second.body.items].map(({ id }: Claim) => id)).toEqual(all)
    expect(second.body.next).toBeNull()
    await author.get(`/api/v1/claims?limit=2&cursor=${first.body.next}`).expect(400)
  })
})

describe('from draft to the register', () => {
  it('goes by the acts of its people, each told by mail with a link that works', async () => {
    const cast = await makeCast()
    const [author, lead, referee, signer] = await Promise.all([cast.author, cast.lead, cast.referee, cast.secondLead].map((member) => signedInAs(member, app)))
    const constant = await freshConstant(cast.author)
    const run = await finishedRun(cast.author, constant, { lo: '1.2345', hi: '1.2346' })
    const { id } = (await author!.post('/api/v1/claims').send({ kind: 'enclosure', runId: run.id })).body
    const number = claimNumberText(constant.number, 1)
    const slug = number.replace('/', '-')
    const act = async (agent: Agent, name: string, body: object = {}): Promise<Claim> => {
      const response = await agent.post(`/api/v1/claims/${slug}/${name}`).send(body)
      if (response.status !== 200) throw new Error(`${name}: ${response.text}`)
      return response.body
    }
    const link = `http://merestone.test/claims/${slug}`

    await author!.post(`/api/v1/claims/${id}/submit`).send({ version: 1 }).expect(200)
    expect((await lastMailTo(cast.lead.email))!.text).toContain(link)
    await act(lead!, 'assign', { refereeId: cast.referee.id, note: 'please' })
    expect(await lastMailTo(cast.referee.email)).toMatchObject({ template: 'referee-assigned', text: expect.stringContaining(link) })
    await act(referee!, 'accept')
    const objected = await act(referee!, 'object', { text: 'The third digit?' })
    expect(objected).toMatchObject({ state: 'returned', objections: [{ state: 'open', messages: [{ text: 'The third digit?' }] }] })
    expect(await lastMailTo(cast.author.email)).toMatchObject({ template: 'objection-raised', text: expect.stringContaining('The third digit?') })
    const objectionId = objected.objections[0]!.id
    await act(author!, 'answer', { objectionId, text: 'See the budget.' })
    expect(await lastMailTo(cast.referee.email)).toMatchObject({ template: 'answer-given', text: expect.stringContaining('See the budget.') })
    const again = await act(author!, 'resubmit', { version: (await author!.get(`/api/v1/claims/${slug}`)).body.version, remark: 'answered' })
    expect(again.state).toBe('in-review')
    expect(await lastMailTo(cast.referee.email)).toMatchObject({ template: 'claim-resubmitted', text: expect.stringContaining('answered') })
    const settled = await act(referee!, 'settle', { objectionId, outcome: 'settled', text: 'Fine.' })
    const confirmed = await act(referee!, 'confirm', { version: settled.version, remark: 'All checked.', checklist: [{ item: 'Bound R-1', checked: true }] })
    expect(confirmed).toMatchObject({ state: 'in-review', confirmations: { have: 1, need: 1, recheckNeeded: true, recheckDone: false }, next: 'a referee: recheck by other arithmetic or another method' })

    await finishedRecheck(cast.referee, await reload({ id }), { lo: '1.23', hi: '1.24', arithmetic: 'mpfr' })
    const endorsed = (await signer!.get(`/api/v1/claims/${slug}`)).body as Claim
    expect(endorsed).toMatchObject({ state: 'endorsed', rechecks: [{ verdict: 'meets', independent: true, enclosure: { lo: '1.23', hi: '1.24' } }] })
    expect(await lastMailTo(cast.secondLead.email)).toMatchObject({ template: 'sign-request', text: expect.stringContaining(link) })

    const signed = await act(signer!, 'sign', { version: endorsed.version, password: PASSWORD })
    expect(signed).toMatchObject({ state: 'signed', number, signature: { by: cast.secondLead.name }, certificate: { signed: true } })
    expect(await lastMailTo(cast.author.email)).toMatchObject({ template: 'claim-signed' })
    expect(signed.cite!.plain).toContain(number)
    expect(signed.history.map(({ act: name, to }) => `${name}>${to}`)).toEqual([
      'create>draft', 'submit>submitted', 'assign>in-review', 'accept>in-review', 'object>returned', 'answer>returned', 'resubmit>in-review', 'settle>in-review', 'confirm>in-review', 'endorse>endorsed', 'sign>signed',
    ])
    const open = (await request(app).get(`/api/v1/claims/${slug}`).expect(200)).body as Claim
    expect(claimSchema.safeParse(open).error).toBeUndefined()
    expect(open).toMatchObject({ state: 'signed', assignments: [], objections: [], possibleReferees: [], draftVerdict: null, rechecks: [{ startedBy: null, verdict: 'meets' }] })
    expect(open.history.map(({ act: name }) => name)).toEqual(['submit', 'sign'])
    const best = (await request(app).get(`/api/v1/constants/${constantNumberText(constant.number)}`).expect(200)).body
    expect(best).toMatchObject({ best: { lo: '1.2345', hi: '1.2346' }, state: 'signed', claims: [{ number }] })
  })
})
