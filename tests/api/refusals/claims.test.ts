import { randomUUID } from 'node:crypto'
import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../../server/app.ts'
import { change } from '../../../server/db.ts'
import { constantNumberText } from '../../../shared/constant-number.ts'
import { claimIn, draft, finishedRun, freshConstant, makeCast, numberOf, reload, type Cast } from '../../support/claims.ts'
import { browser, makeMember, PASSWORD, signedInAs, type Agent } from '../../support/people.ts'

const app = createApp()
let cast: Cast
let author: Agent
let number: string

beforeAll(async () => {
  cast = await makeCast()
  author = await signedInAs(cast.author, app)
  number = constantNumberText((await freshConstant(cast.author)).number)
})

const state = (body: object, agent: Agent = author) => agent.post('/api/v1/claims').send(body)

describe('a claim is not registered', () => {
  it('from a run that is not done, not there, of another group, or a recheck', async () => {
    const constant = await freshConstant(cast.author)
    const [queued, foreign, recheck] = await Promise.all([
      finishedRun(cast.author, constant, { lo: '1', hi: '2' }),
      finishedRun(await makeMember(), constant, { lo: '1', hi: '2' }),
      claimIn('in-review', cast).then((claim) => finishedRun(cast.author, constant, { lo: '1', hi: '2', claimId: claim.id })),
    ])
    await change(`UPDATE runs SET state = 'queued', outcome = NULL, certificate = NULL, finished_at = NULL WHERE id = $id`, { id: queued.id })
    for (const [runId, code] of [[queued.id, 'run_not_done'], [foreign.id, 'run_unknown'], [recheck.id, 'run_unknown'], [randomUUID(), 'run_unknown']]) {
      const { body } = await state({ kind: 'enclosure', runId }).expect(422)
      expect(body).toMatchObject({ code, fields: [{ path: 'runId' }] })
    }
  })

  it.each([
    ['without a source', { source: ' ' }, 'source'],
    ['of a constant that is not there', { constant: 'MST-99999' }, 'constant'],
    ['of no constant', { constant: 'the primes' }, 'constant'],
    ['from digits that can be read in two ways', { value: { digits: '1,636', reading: 'truncated' } }, 'value.digits'],
    ['from digits with an uncertainty', { value: { digits: '1.6366(2)', reading: 'rounded' } }, 'value.digits'],
    ['from digits that are said to be neither truncated nor rounded', { value: { digits: '1.6366' } }, 'value.reading'],
    ['from an interval the wrong way round', { value: { lo: '2', hi: '1.999' } }, 'value.hi'],
    ['from ends that are no decimals', { value: { lo: '1e3', hi: '2' } }, 'value.lo'],
    ['from an interval of too many digits', { value: { lo: `0.${'1'.repeat(15_000)}`, hi: '2' } }, 'value.lo'],
    ['with an endless remark', { remark: 'x'.repeat(20_001) }, 'remark'],
    ['of a kind that is not known', { kind: 'guess' }, 'kind'],
  ])('%s', async (_name, change, path) => {
    const { body } = await state({ kind: 'stated', constant: number, value: { digits: '1.6366', reading: 'truncated' }, source: 'a table', ...change }).expect(400)
    expect(body.fields.map((field: { path: string }) => field.path)).toContain(path)
  })

  it('as an order that enclosures do not certify', async () => {
    const [low, high] = [await claimIn('signed', cast, { lo: '1.1', hi: '1.2' }), await claimIn('signed', cast, { lo: '1.2', hi: '1.4' })]
    const above = await claimIn('signed', cast, { lo: '1.5', hi: '1.6' })
    const of = async (claim: typeof low) => (await numberOf(claim)).split('/')[0]
    expect((await state({ kind: 'order', lesser: await of(low), greater: await of(high) }).expect(422)).body.code).toBe('order_undecided')
    expect((await state({ kind: 'order', lesser: await of(above), greater: await of(low) }).expect(422)).body.code).toBe('order_reversed')
    expect((await state({ kind: 'order', lesser: await of(low), greater: number }).expect(422)).body).toMatchObject({ code: 'no_enclosure', fields: [{ path: 'greater' }] })
    expect((await state({ kind: 'order', lesser: number, greater: number }).expect(400)).body.fields[0].path).toBe('greater')
  })

  it('on enclosures of a group that does not publish, by another group', async () => {
    const closed = await makeCast({ public: false })
    const [low, high] = [await claimIn('signed', closed, { lo: '1.1', hi: '1.2' }), await claimIn('signed', closed, { lo: '1.3', hi: '1.4' })]
    const body = { kind: 'order', lesser: (await numberOf(low)).split('/')[0], greater: (await numberOf(high)).split('/')[0] }
    expect((await state(body).expect(422)).body.code).toBe('no_enclosure')
    await state(body, await signedInAs(closed.author, app)).expect(201)
  })

  it('by a referee, a reader without account, or a page of another site', async () => {
    const body = { kind: 'stated', constant: number, value: { lo: '1', hi: '2' }, source: 'a table' }
    expect((await state(body, await signedInAs(cast.referee, app)).expect(403)).body.code).toBe('role_needed')
    await state(body, browser(app)).expect(401)
    await author.post('/api/v1/claims').set('X-Merestone', '').send(body).expect(403)
    await author.post('/api/v1/claims').set('Content-Type', 'application/json').send('{').expect(400)
  })
})

describe('another group’s claim', () => {
  it('is not told from one that is not there', async () => {
    const stranger = await signedInAs(await makeMember({ roles: ['researcher', 'lead', 'referee'] }), app)
    const claim = await claimIn('in-review', cast)
    const slug = (await numberOf(claim)).replace('/', '-')
    const answers = await Promise.all([claim.id, slug, randomUUID(), 'MST-9999-1'].map(async (id) => (await stranger.get(`/api/v1/claims/${id}`).expect(404)).body))
    for (const { code, detail } of answers) expect([code, detail]).toEqual([answers[0].code, answers[0].detail])
    for (const id of [claim.id, randomUUID()]) await request(app).get(`/api/v1/claims/${id}`).expect(401)
    await stranger.get('/api/v1/claims/not-a-claim').expect(400)
    await stranger.post(`/api/v1/claims/${claim.id}/withdraw`).send({ reason: 'mine' }).expect(404)
    await stranger.get(`/api/v1/claims/${claim.id}/certificate`).expect(404)
  })

  it('is told of itself once it is signed, but not if its group does not publish', async () => {
    const stranger = await signedInAs(await makeMember(), app)
    await stranger.get(`/api/v1/claims/${(await claimIn('signed', cast)).id}`).expect(200)
    const closed = await makeCast({ public: false })
    const hidden = await claimIn('signed', closed)
    await stranger.get(`/api/v1/claims/${hidden.id}`).expect(404)
    await request(app).get(`/api/v1/claims/${hidden.id}/certificate`).expect(401)
    await (await signedInAs(closed.referee, app)).get(`/api/v1/claims/${hidden.id}`).expect(200)
  })
})

describe('one’s own claim', () => {
  it('is neither refereed nor signed by its author, whatever roles they hold', async () => {
    await change(`UPDATE members SET roles = '{researcher,referee,lead}' WHERE id = $id`, { id: cast.secondLead.id })
    const all = { ...cast, author: cast.secondLead, secondLead: cast.lead }
    const agent = await signedInAs(cast.secondLead, app)
    const claim = await claimIn('endorsed', all)
    const { version } = await reload(claim)
    expect((await agent.post(`/api/v1/claims/${claim.id}/sign`).send({ version, password: PASSWORD }).expect(403)).body.code).toBe('own_claim')
    expect((await agent.post(`/api/v1/claims/${claim.id}/confirm`).send({ version, remark: 'good' }).expect(403)).body.code).toBe('own_claim')
    expect((await agent.post(`/api/v1/claims/${claim.id}/object`).send({ text: 'bad' }).expect(403)).body.code).toBe('own_claim')
    await agent.post(`/api/v1/claims/${claim.id}/assign`).send({ refereeId: cast.secondLead.id }).expect(400)
  })

  it('is not acted on by a role that was taken away', async () => {
    const mine = { ...cast, author: await makeMember({ group: cast.group }) }
    const agent = await signedInAs(mine.author, app)
    const claim = await draft(mine.author)
    await change(`UPDATE members SET roles = '{referee}' WHERE id = $id`, { id: mine.author.id })
    expect((await agent.post(`/api/v1/claims/${claim.id}/submit`).send({ version: 1 }).expect(403)).body.code).toBe('not_author')
  })
})

describe('an act', () => {
  it.each([
    ['submit', {}, 'version'],
    ['assign', { refereeId: 'somebody' }, 'refereeId'],
    ['decline', { reason: '  ' }, 'reason'],
    ['recheck', { method: 'guess', arithmetic: 'ball' }, 'method'],
    ['settle', { objectionId: randomUUID(), outcome: 'maybe' }, 'outcome'],
    ['sign', { version: 1 }, 'password'],
    ['withdraw', {}, 'reason'],
  ])('%s without what it needs is refused at the field', async (name, body, path) => {
    const claim = await draft(cast.author)
    const response = await author.post(`/api/v1/claims/${claim.id}/${name}`).send(body).expect(400)
    expect(response.body.fields.map((field: { path: string }) => field.path)).toContain(path)
  })

  it('on an objection or an assignment of another claim is refused', async () => {
    const [one, two] = [await claimIn('in-review', cast), await claimIn('returned', cast)]
    const [referee, lead] = [await signedInAs(cast.referee, app), await signedInAs(cast.lead, app)]
    const { objections } = (await referee.post(`/api/v1/claims/${one.id}/object`).send({ text: 'why?' }).expect(200)).body
    await author.post(`/api/v1/claims/${two.id}/answer`).send({ objectionId: objections[0].id, text: 'because' }).expect(404)
    const { assignments } = (await lead.get(`/api/v1/claims/${one.id}`)).body
    await lead.post(`/api/v1/claims/${two.id}/remind`).send({ assignmentId: assignments[0].id }).expect(404)
  })

  it('on a claim that changed in the meantime says what happened', async () => {
    const claim = await draft(cast.author)
    await author.patch(`/api/v1/claims/${claim.id}`).send({ version: 1, remark: 'new' }).expect(200)
    const { body } = await author.post(`/api/v1/claims/${claim.id}/submit`).send({ version: 1 }).expect(409)
    expect(body).toMatchObject({ code: 'changed_meanwhile', detail: `This claim has changed since you read it: it was edited by ${cast.author.name}. Read it again, then decide.` })
  })

  it('with a method that the engine cannot do is refused with its reason', async () => {
    const claim = await claimIn('in-review', cast)
    const referee = await signedInAs(cast.referee, app)
    const { body } = await referee.post(`/api/v1/claims/${claim.id}/recheck`).send({ method: 'finite', arithmetic: 'ball' })
    expect([400, 422]).toContain(body.status)
    expect(body.fields.length).toBeGreaterThan(0)
  })
})
