import pg from 'pg'
import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { databaseUrls } from '../support/test-database.ts'
import { createApp } from '../../server/app.ts'
import { draftClaim } from '../../server/commands/claim.ts'
import { select } from '../../server/db.ts'
import type { Claim } from '../../server/models/claim.ts'
import { Constant } from '../../server/models/constant.ts'
import { Run } from '../../server/models/run.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { estimate as estimateSchema, estimateDoubt, liftResult, type EstimateDoubt } from '../../shared/schemas/estimate.ts'
import { acting, claimIn, draft, finishedRun, freshConstant, makeCast, numberOf, reload, takeTo, type Cast } from '../support/claims.ts'
import { computeRuns } from '../support/compute.ts'
import { makeMember, PASSWORD, signedInAs, type Agent } from '../support/people.ts'
import { makeClaim } from '../support/register.ts'

const app = createApp()
const [FIRST, SECOND, THIRD] = ESTIMATES.map(({ id }) => id) as [string, string, string]
const at = (id: string): string => `/api/v1/estimates/${encodeURIComponent(id)}/doubt`

/** A group of its own, whose lead and second lead have signed in. */
async function stage(rules: Record<string, unknown> = {}): Promise<{ cast: Cast; lead: Agent; secondLead: Agent }> {
  const cast = await makeCast({ recheck_needed: false, ...rules })
  const [lead, secondLead] = await Promise.all([signedInAs(cast.lead, app), signedInAs(cast.secondLead, app)])
  return { cast, lead, secondLead }
}

const read = async (lead: Agent, id = FIRST): Promise<EstimateDoubt> => estimateDoubt.parse((await lead.get(at(id)).expect(200)).body)
const mark = async (lead: Agent, id = FIRST, reason = 'a gap in the proof'): Promise<EstimateDoubt> =>
  estimateDoubt.parse((await lead.post(at(id)).send({ reason, digest: (await read(lead, id)).digest }).expect(201)).body)
const constantOf = (claim: Claim) => Constant.findByPk(claim.constantId, { rejectOnEmpty: true })
const fates = ({ claims }: EstimateDoubt) => Object.fromEntries(claims.map(({ number, fate }) => [number, fate]))

/** An order that the second of two constants is the greater, signed. */
async function signedOrder(cast: Cast, lesser: Claim, greater: Claim): Promise<Claim> {
  const [less, more] = [await constantOf(lesser), await constantOf(greater)]
  const order = await draftClaim(acting(cast.author), { kind: 'order', lesser: constantNumberText(less.number), greater: constantNumberText(more.number), remark: '' })
  return takeTo('signed', order, cast)
}

const mails = (cast: Cast) =>
  select<{ recipient_email: string; template: string; text: string; html: string; subject: string }>('SELECT recipient_email, template, subject, text, html FROM outbox WHERE group_id = $id ORDER BY created_at, id', { id: cast.group.id })
const doubtMails = async (cast: Cast) => (await mails(cast)).filter(({ template }) => template === 'estimate-in-doubt')
const trail = (cast: Cast, act: string) => select<{ subject_id: string; reason: string; detail: Record<string, unknown> }>('SELECT subject_id, reason, detail FROM audit_entries WHERE group_id = $id AND act = $act ORDER BY seq', { id: cast.group.id, act })

describe('who may', () => {
  it('is a lead, for the own group: nobody else sees what would fall, marks or lifts', async () => {
    const { cast, lead } = await stage()
    await claimIn('signed', cast, { estimates: [FIRST] })
    const { digest } = await read(lead)
    const asked = (agent: Pick<Agent, 'get' | 'post'>) => [
      agent.get(at(FIRST)),
      agent.post(at(FIRST)).set('X-Merestone', '1').send({ reason: 'because', digest }),
      agent.post(`${at(FIRST)}/lift`).set('X-Merestone', '1').send({ reason: 'because' }),
    ]
    for (const sent of asked(request(app))) expect((await sent).status).toBe(401)
    const lesser = await Promise.all([cast.author, cast.referee, await makeMember({ group: cast.group, roles: ['researcher', 'referee'] })].map((member) => signedInAs(member, app)))
    for (const agent of lesser) for (const sent of asked(agent)) expect((await sent).status).toBe(403)
    // A lead of another group has a list of their own, and suspends nothing here.
    const other = await signedInAs(await makeMember({ roles: ['lead'] }), app)
    expect((await read(other)).claims).toEqual([])
    expect((await other.post(at(FIRST)).send({ reason: 'because', digest }).expect(409)).body.code).toBe('changed_meanwhile')
    await mark(other)
    expect(Object.values(fates(await read(lead)))).toEqual(['falls'])
    await lead.get(at('no-such-estimate')).expect(404)
    expect((await lead.post(at(FIRST)).send({ reason: ' ', digest }).expect(400)).body.fields).toMatchObject([{ path: 'reason' }])
    expect((await lead.post(`${at(FIRST)}/lift`).send({ reason: 'because' }).expect(409)).body.code).toBe('not_in_doubt')
  })

  it('is told with the estimate, and the doubt to whoever may know of it', async () => {
    const open = await stage()
    const closed = await stage({ public: false })
    await mark(open.lead, SECOND, 'doubted openly')
    await mark(closed.lead, SECOND, 'doubted among ourselves')
    const seen = async (agent: Pick<Agent, 'get'>) => estimateSchema.parse((await agent.get(`/api/v1/estimates/${SECOND}`).expect(200)).body)
    const outside = await seen(request(app))
    expect(outside).toMatchObject({ state: 'in-doubt', stateSince: outside.doubts[0]!.at, abilities: { doubt: false }, doubts: [{ group: { id: open.cast.group.id }, own: false, reason: 'doubted openly', lifted: null }] })
    expect(await seen(closed.lead)).toMatchObject({ abilities: { doubt: true }, doubts: [{ own: false }, { own: true, reason: 'doubted among ourselves' }] })
    await open.lead.post(`${at(SECOND)}/lift`).send({ reason: 'the gap is closed' }).expect(200)
    expect(await seen(request(app))).toMatchObject({ state: 'in-force', stateSince: null, doubts: [{ lifted: { reason: 'the gap is closed' } }] })
    const { body } = await closed.lead.get('/api/v1/estimates').expect(200)
    expect(body.items.find(({ id }: { id: string }) => id === SECOND)).toMatchObject({ state: 'in-doubt' })
    expect((await request(app).get(`/estimates/${SECOND}`).set('Accept', 'text/html')).status).toBe(200)
  })
})

describe('what falls', () => {
  it('is the list that was shown: enclosures, superseded ones, orders on them; what waits is held back, and nothing else is touched', async () => {
    const { cast, lead } = await stage()
    const other = await makeCast({ recheck_needed: false })
    const wide = await claimIn('signed', cast, { lo: '1.1', hi: '1.4', estimates: [FIRST] })
    const constant = await constantOf(wide)
    const free = await claimIn('signed', cast, { lo: '1.15', hi: '1.35', constant })
    const narrow = await claimIn('signed', cast, { lo: '1.2', hi: '1.3', constant, estimates: [FIRST, SECOND] })
    const greater = await claimIn('signed', cast, { lo: '2.1', hi: '2.2' })
    const order = await signedOrder(cast, narrow, greater)
    // Another group's enclosure is not touched, but the own order that rests on it is.
    const theirs = await claimIn('signed', other, { lo: '3.1', hi: '3.2', estimates: [FIRST] })
    const onTheirs = await signedOrder(cast, greater, theirs)
    const theirOrder = await signedOrder(other, narrow, theirs)
    const waiting = await Promise.all((['submitted', 'in-review', 'returned', 'endorsed'] as const).map((state) => claimIn(state, cast, { estimates: [FIRST] })))
    await claimIn('draft', cast, { estimates: [FIRST] })
    await claimIn('signed', cast, { estimates: [SECOND] })
    const byHand = await claimIn('suspended', cast, { estimates: [FIRST] })

    const before = await read(lead)
    const name = async (claim: Claim) => numberOf(await reload(claim))
    expect(fates(before)).toEqual(Object.fromEntries([
      ...(await Promise.all([wide, narrow, order, onTheirs].map(async (claim) => [await name(claim), 'falls']))),
      ...(await Promise.all(waiting.map(async (claim) => [await name(claim), 'waits']))),
      [await name(byHand), 'suspended'],
    ]))
    expect(before.claims.find(({ id }) => id === order.id)).toMatchObject({ through: [await name(narrow)], text: `${constant.text} < ${(await constantOf(greater)).text}` })
    expect(before.again.find(({ constant: number }) => number === constantNumberText(constant.number))).toMatchObject({ goal: { digits: 1 }, other: { claimNumber: await name(free) }, run: null })

    const after = await mark(lead)
    const [doubt] = await select<{ id: string }>('SELECT id FROM estimate_doubts WHERE group_id = $id', { id: cast.group.id })
    expect(after).toMatchObject({ doubt: { id: doubt!.id, by: { id: cast.lead.id }, reason: 'a gap in the proof' } })
    const falling = before.claims.filter(({ fate }) => fate === 'falls').map(({ id }) => id)
    expect(after.claims.filter(({ fate }) => fate === 'fallen').map(({ id }) => id).sort()).toEqual(falling.sort())
    for (const id of falling) expect((await reload({ id })).state).toBe('suspended')
    for (const [claim, state] of [...waiting.map((each) => [each, each.state] as const), ...[theirs, theirOrder, greater].map((each) => [each, 'signed'] as const)]) expect((await reload(claim)).state).toBe(state)
    // The best enclosure is that of the claim which the narrow one had superseded.
    expect((await reload(free)).state).toBe('signed')
    expect((await request(app).get(`/api/v1/constants/${constantNumberText(constant.number)}`)).body).toMatchObject({ best: { lo: '1.15', hi: '1.35' }, state: 'signed' })
    // Nothing but what was suspended has come into force or left it in between.
    expect((await trail(cast, 'claim.restore')).map(({ subject_id }) => subject_id)).toEqual([free.id])
    expect((await trail(cast, 'claim.suspend')).filter(({ reason }) => reason.includes('in doubt:')).map(({ subject_id }) => subject_id).sort()).toEqual(falling.sort())
    expect((await trail(cast, 'estimate.doubt'))[0]).toMatchObject({ subject_id: FIRST, reason: 'a gap in the proof', detail: { suspends: expect.arrayContaining([await name(order)]), holds: expect.arrayContaining([await name(waiting[0]!)]) } })
    expect((await lead.get('/api/v1/audit/check').expect(200)).body).toMatchObject({ broken: null })
    expect((await request(app).get(`/api/v1/estimates/${FIRST}`)).body.usedBy.map(({ claimNumber }: { claimNumber: string }) => claimNumber)).not.toContain(await name(narrow))
    const page = (await request(app).get(`/api/v1/claims/${narrow.id}`).expect(200)).body
    expect(page.doubts).toContainEqual(expect.objectContaining({ estimate: FIRST, group: { id: cast.group.id, name: cast.group.name }, reason: 'a gap in the proof' }))
    expect(page.checklist[0].detail).toContain(`In doubt at`)
  })

  it('is told in one mail a person, with all that it touches of theirs, in place of a mail a claim', async () => {
    const { cast, lead } = await stage()
    const other = await makeCast({ recheck_needed: false })
    const signed = [await claimIn('signed', cast, { lo: '1.1', hi: '1.2', estimates: [THIRD] }), await claimIn('signed', cast, { estimates: [THIRD] }), await claimIn('superseded', cast, { lo: '5.1', hi: '5.2', estimates: [THIRD] })]
    const review = await claimIn('in-review', cast, { estimates: [THIRD] })
    const theirOrder = await signedOrder(other, signed[0]!, await claimIn('signed', other, { lo: '3.1', hi: '3.2' }))
    await mark(lead, THIRD, 'Lemma 4 <fails> at 10^8')
    const sent = await doubtMails(cast)
    expect(sent.map(({ recipient_email }) => recipient_email).sort()).toEqual([cast.author.email, cast.referee.email, other.author.email].sort())
    const of = (email: string) => sent.find(({ recipient_email }) => recipient_email === email)!
    for (const claim of [...signed, review]) expect(of(cast.author.email).text).toContain(await numberOf(await reload(claim)))
    expect(of(cast.author.email)).toMatchObject({ subject: expect.stringContaining('in doubt'), html: expect.stringContaining('Lemma 4 &lt;fails&gt; at 10^8') })
    expect(of(cast.referee.email).text).toContain(`${await numberOf(await reload(review))}, about`)
    // Who has confirmed what falls hears of it, too.
    expect(of(cast.referee.email).text.replace(/\s+/g, ' ')).toMatch(new RegExp(`${await numberOf(signed[0]!)}, about .*which you refereed, is suspended`))
    expect(of(other.author.email).text).toContain(await numberOf(theirOrder))
    expect((await mails(cast)).filter(({ template }) => template === 'claim-suspended')).toEqual([])
    const [entry] = await trail(cast, 'claim.suspend')
    expect(entry!.detail).toMatchObject({ to: 'suspended', estimate: THIRD })
    expect(entry!.detail).not.toHaveProperty('told')
    const [doubt] = await trail(cast, 'estimate.doubt')
    expect([...(doubt!.detail.told as string[])].sort()).toEqual([cast.author, cast.referee, other.author].map(({ id }) => `estimate-in-doubt:${id}`).sort())
  })

  it('settles a conflict of which one side falls', async () => {
    const { cast, lead } = await stage()
    const first = await claimIn('signed', cast, { lo: '1.2', hi: '1.3', estimates: [FIRST] })
    const second = await takeTo('endorsed', await draft(cast.author, { lo: '1.31', hi: '1.32', constant: await constantOf(first), stated: true }), cast)
    const sign = async () => lead.post(`/api/v1/claims/${second.id}/sign`).send({ version: (await reload(second)).version, password: PASSWORD })
    expect((await sign()).body.code).toBe('in_conflict')
    await mark(lead)
    expect((await sign()).status).toBe(200)
    // And the fallen one does not come back against it.
    const { body } = await lead.post(`${at(FIRST)}/lift`).send({ reason: 'proved after all', reinstate: [first.id] }).expect(200)
    expect(liftResult.parse(body)).toMatchObject({ reinstated: [], kept: [{ claimNumber: await numberOf(first), reason: expect.stringContaining('does not meet') }], now: { doubt: null } })
    expect((await reload(first)).state).toBe('suspended')
  })
})

describe('while a doubt is open', () => {
  it('nothing that rests on the estimate is endorsed, signed or reinstated', async () => {
    const { cast, lead, secondLead } = await stage()
    const [endorsed, review, suspended] = [await claimIn('endorsed', cast, { estimates: [FIRST] }), await claimIn('in-review', cast, { estimates: [FIRST] }), await claimIn('suspended', cast, { estimates: [FIRST] })]
    const fallen = await claimIn('signed', cast, { estimates: [FIRST] })
    await mark(lead)
    const act = async (agent: Agent, claim: Claim, name: string, body: object) => agent.post(`/api/v1/claims/${claim.id}/${name}`).send(body)
    const refused = { status: 409, body: { code: 'estimate_in_doubt' } }
    expect(await act(secondLead, endorsed, 'sign', { version: (await reload(endorsed)).version, password: PASSWORD })).toMatchObject(refused)
    for (const claim of [suspended, fallen]) expect(await act(lead, claim, 'reinstate', { reason: 'no' })).toMatchObject(refused)
    // A referee may still confirm; the register does not endorse it before the doubt is lifted.
    const referee = await signedInAs(cast.referee, app)
    await referee.post(`/api/v1/claims/${review.id}/confirm`).send({ version: (await reload(review)).version, remark: 'checked', checklist: [] }).expect(200)
    expect((await lead.get(`/api/v1/claims/${review.id}`)).body).toMatchObject({ state: 'in-review', next: expect.stringContaining('in doubt'), confirmations: { have: 1 }, doubts: expect.arrayContaining([expect.objectContaining({ estimate: FIRST })]) })
    // It may be put to the register.
    const late = await draft(cast.author, { estimates: [FIRST] })
    const author = await signedInAs(cast.author, app)
    await author.post(`/api/v1/claims/${late.id}/submit`).send({ version: late.version }).expect(200)
    expect(fates(await read(lead))[await numberOf(await reload(late))]).toBe('waits')
    const desk = (await lead.get('/api/v1/desk').expect(200)).body.lead as { kind: string; text: string; claim: { id: string } }[]
    expect(desk.find(({ claim }) => claim.id === fallen.id)).toMatchObject({ kind: 'decide', text: expect.stringContaining('in doubt') })
    expect((await secondLead.get('/api/v1/desk').expect(200)).body.lead.filter(({ kind }: { kind: string }) => kind === 'sign')).toEqual([])

    await lead.post(`${at(FIRST)}/lift`).send({ reason: 'proved after all' }).expect(200)
    expect((await reload(review)).state).toBe('endorsed')
    expect((await act(secondLead, endorsed, 'sign', { version: (await reload(endorsed)).version, password: PASSWORD })).status).toBe(200)
    expect((await act(lead, suspended, 'reinstate', { reason: 'yes' })).status).toBe(200)
  })

  it('is lifted with a reason, and what it suspended comes back as chosen, orders with what they rest on', async () => {
    const { cast, lead } = await stage()
    const [lesser, greater, kept] = [await claimIn('signed', cast, { lo: '1.1', hi: '1.2', estimates: [FIRST, SECOND] }), await claimIn('signed', cast, { lo: '2.1', hi: '2.2', estimates: [FIRST] }), await claimIn('signed', cast, { estimates: [FIRST] })]
    const order = await signedOrder(cast, lesser, greater)
    const byHand = await claimIn('suspended', cast, { estimates: [FIRST] })
    await mark(lead)
    await mark(lead, SECOND)
    const lift = (id: string, reinstate: string[]) => lead.post(`${at(id)}/lift`).send({ reason: 'proved after all', reinstate })
    expect((await lift(FIRST, [byHand.id]).expect(400)).body.fields).toMatchObject([{ path: 'reinstate' }])
    const first = liftResult.parse((await lift(FIRST, [order.id, greater.id, lesser.id]).expect(200)).body)
    // The lesser is still held by the other doubt, and with it the order.
    expect(first).toMatchObject({ reinstated: [await numberOf(greater)], kept: [{ claimNumber: await numberOf(lesser) }, { claimNumber: await numberOf(order) }] })
    const second = liftResult.parse((await lift(SECOND, [order.id, lesser.id]).expect(200)).body)
    expect(second).toMatchObject({ reinstated: [await numberOf(lesser), await numberOf(order)], kept: [], now: { doubt: null } })
    for (const claim of [lesser, greater, order]) expect((await reload(claim)).state).toBe('signed')
    expect((await reload(kept)).state).toBe('suspended')
    expect(await trail(cast, 'estimate.lift-doubt')).toMatchObject([{ subject_id: FIRST, reason: 'proved after all', detail: { reinstates: expect.any(Array) } }, { subject_id: SECOND }])
    expect((await lead.get('/api/v1/audit/check').expect(200)).body).toMatchObject({ broken: null })
    // It can be doubted again, and suspends again what has come back.
    await mark(lead, SECOND, 'a second thought')
    expect(fates(await read(lead, SECOND))[await numberOf(order)]).toBe('fallen')
  })

  describe('a run of the group', () => {
    beforeAll(computeRuns)
    const body = { definition: { type: 'series', set: { kind: 'primes' }, weight: {} }, goal: { cutoff: '20000' } }
    const used = 'theta-johnston-2022'

    it('does without the estimate, and without others that are named', async () => {
      const { cast, lead } = await stage()
      const author = await signedInAs(cast.author, app)
      expect((await author.post('/api/v1/plans').send(body).expect(200)).body.without).toEqual([])
      await mark(lead, used)
      expect((await author.post('/api/v1/plans').send({ ...body, without: ['theta-buthe-2018-b'] }).expect(200)).body.without).toEqual(['theta-buthe-2018-b', used])
      expect((await author.post('/api/v1/plans').send({ ...body, without: ['nothing'] }).expect(400)).body.fields).toMatchObject([{ path: 'without' }])
      const started = (await author.post('/api/v1/runs').send({ ...body, method: 'partial-sum', without: ['theta-buthe-2018-b'] }).expect(201)).body
      expect(started.without).toEqual(['theta-buthe-2018-b', used])
      await expect.poll(async () => (await Run.findByPk(started.id))?.state, { timeout: 25_000 }).toBe('done')
      const run = (await author.get(`/api/v1/runs/${started.id}`)).body
      const ids = run.outcome.estimates.map(({ id }: { id: string }) => id)
      expect(ids.length).toBeGreaterThan(0)
      expect(ids).not.toContain(used)
      expect(ids).not.toContain('theta-buthe-2018-b')
      // Another group computes with it as before.
      const elsewhere = await signedInAs(await makeMember(), app)
      expect((await elsewhere.post('/api/v1/plans').send(body).expect(200)).body.without).toEqual([])
    })

    it('is refused in the plan already where no estimate is left for the tail', async () => {
      const author = await signedInAs(await makeMember(), app)
      const without = ESTIMATES.map(({ id }) => id)
      const plan = (await author.post('/api/v1/plans').send({ ...body, without }).expect(200)).body
      expect(plan.forecasts.find(({ method }: { method: string }) => method === 'partial-sum')).toMatchObject({ possible: false, reason: expect.stringContaining('none is left') })
      expect((await author.post('/api/v1/runs').send({ ...body, method: 'partial-sum', without }).expect(400)).body.fields).toMatchObject([{ path: 'method', message: expect.stringContaining('none is left') }])
    })

    it('is told beside what it is to replace', async () => {
      const { cast, lead } = await stage()
      const claim = await claimIn('signed', cast, { lo: '1.63', hi: '1.64', estimates: [used], constant: await freshConstant(cast.author) })
      const [again] = (await mark(lead, used)).again
      expect(again).toMatchObject({ constant: constantNumberText((await constantOf(claim)).number), goal: { digits: 1 }, run: null })
      const started = (await lead.post('/api/v1/runs').send({ definition: again!.definition.canonical, goal: again!.goal }).expect(201)).body
      expect((await read(lead, used)).again[0]!.run).toMatchObject({ id: started.id })
    })
  })
})

describe('at once', () => {
  it('of two leads one marks and the other is told who was quicker; of two who lift likewise', async () => {
    const { cast, lead, secondLead } = await stage()
    await Promise.all([claimIn('signed', cast, { estimates: [FIRST] }), claimIn('signed', cast, { estimates: [FIRST] })])
    const { digest } = await read(lead)
    const answers = await Promise.all([lead, secondLead].map((agent) => agent.post(at(FIRST)).send({ reason: 'because', digest })))
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409])
    const late = answers.find(({ status }) => status === 409)!
    expect(late.body).toMatchObject({ code: 'in_doubt_already', detail: expect.stringContaining(answers[0] === late ? cast.secondLead.name : cast.lead.name) })
    // To the author and to the referee who confirmed both.
    expect(await doubtMails(cast)).toHaveLength(2)
    expect(await trail(cast, 'claim.suspend')).toHaveLength(2)
    const lifts = await Promise.all([lead, secondLead].map((agent) => agent.post(`${at(FIRST)}/lift`).send({ reason: 'because' })))
    expect(lifts.map(({ status }) => status).sort()).toEqual([200, 409])
  })

  it('a signature and a doubt never leave a claim in force on an estimate in doubt', async () => {
    for (let turn = 0; turn < 4; turn += 1) {
      const { cast, lead, secondLead } = await stage()
      const claim = await claimIn('endorsed', cast, { estimates: [FIRST] })
      const [{ digest }, { version }] = [await read(lead), await reload(claim)]
      const [marked, signed] = await Promise.all([lead.post(at(FIRST)).send({ reason: 'because', digest }), secondLead.post(`/api/v1/claims/${claim.id}/sign`).send({ version, password: PASSWORD })])
      const { state } = await reload(claim)
      if (signed.status === 200) expect([marked.status, marked.body.code, state]).toEqual([409, 'changed_meanwhile', 'signed'])
      else expect([marked.status, signed.body.code, state]).toEqual([201, 'estimate_in_doubt', 'endorsed'])
    }
  })

  it('acts on other claims of the same constants, by another group too, and a doubt wait for one another', async () => {
    const { cast, lead } = await stage()
    const other = await stage()
    const claims = await Promise.all(Array.from({ length: 6 }, () => claimIn('signed', cast, { lo: '1.2', hi: '1.4', estimates: [FIRST] })))
    const rivals = await Promise.all(claims.map(async (claim) => takeTo('endorsed', await draft(other.cast.author, { lo: '1.25', hi: '1.3', constant: await constantOf(claim), estimates: [FIRST] }), other.cast)))
    const [{ digest }, theirs] = [await read(lead), await read(other.lead)]
    const sign = async (claim: Claim) => other.lead.post(`/api/v1/claims/${claim.id}/sign`).send({ version: (await reload(claim)).version, password: PASSWORD })
    const [mine, their, ...signed] = await Promise.all([lead.post(at(FIRST)).send({ reason: 'because', digest }), other.lead.post(at(FIRST)).send({ reason: 'because', digest: theirs.digest }), ...rivals.map(sign)])
    for (const { status } of [mine, their, ...signed]) expect([200, 201, 409]).toContain(status)
    if (mine.status === 201) for (const claim of claims) expect((await reload(claim)).state).toBe('suspended')
    if (their.status === 201) for (const claim of rivals) expect((await reload(claim)).state).not.toBe('signed')
    expect((await lead.get('/api/v1/audit/check').expect(200)).body).toMatchObject({ broken: null })
  })
})

describe('a failure in the middle', () => {
  it('leaves everything as it was: claims, doubt, mails and trail', async () => {
    const { cast, lead } = await stage()
    const claims = [await claimIn('signed', cast, { estimates: [FIRST] }), await claimIn('signed', cast, { estimates: [FIRST] })]
    const owner = new pg.Client({ connectionString: databaseUrls.owner })
    await owner.connect()
    try {
      await owner.query(`CREATE FUNCTION refuse_suspension() RETURNS trigger LANGUAGE plpgsql AS $$ BEGIN RAISE EXCEPTION 'the disk is full'; END $$;
        CREATE TRIGGER refuse BEFORE UPDATE ON claims FOR EACH ROW WHEN (NEW.id = '${claims[1]!.id}' AND NEW.state = 'suspended') EXECUTE FUNCTION refuse_suspension()`)
      const { digest } = await read(lead)
      await lead.post(at(FIRST)).send({ reason: 'because', digest }).expect(500)
      expect(await read(lead)).toMatchObject({ doubt: null, digest })
      for (const claim of claims) expect((await reload(claim)).state).toBe('signed')
      expect([await doubtMails(cast), await trail(cast, 'estimate.doubt'), await trail(cast, 'claim.suspend')]).toEqual([[], [], []])
    } finally {
      await owner.query('DROP TRIGGER IF EXISTS refuse ON claims; DROP FUNCTION IF EXISTS refuse_suspension()')
      await owner.end()
    }
    expect((await mark(lead)).claims.map(({ fate }) => fate)).toEqual(['fallen', 'fallen'])
  })
})

describe('a list of many', () => {
  it('is complete and falls as a whole', async () => {
    const { cast, lead } = await stage()
    for (let i = 0; i < 150; i += 1) {
      const constant = await freshConstant(cast.author)
      const run = await finishedRun(cast.author, constant, { lo: '1.2', hi: '1.3', method: 'partial-sum', estimates: [FIRST] })
      await makeClaim(cast.author, constant, { lo: '1.2', hi: '1.3', runId: run.id })
    }
    expect((await read(lead)).claims).toHaveLength(150)
    const after = await mark(lead)
    expect(after.claims.filter(({ fate }) => fate === 'fallen')).toHaveLength(150)
    expect(after.again).toHaveLength(150)
    expect(await doubtMails(cast)).toHaveLength(1)
  })
})
