import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import { digitCheck } from '../../shared/schemas/claim.ts'
import { Constant } from '../../server/models/constant.ts'
import { claimIn, makeCast, numberOf, type Cast } from '../support/claims.ts'
import { browser, makeMember, signedInAs, type Agent } from '../support/people.ts'

const app = createApp()
const anyone = browser(app)
// The sum of 1/(p log p): digits by Arb and PARI/GP; printed as 1.6366… in Forum Math. Pi 11 (2023) e18, p. 2.
const PRIMES = { lo: '1.63661632335126', hi: '1.63661632335127' }
let cast: Cast

beforeAll(async () => {
  cast = await makeCast()
})

const check = (agent: Agent, against: object, text: string, reading = 'truncated') => agent.post('/api/v1/digit-checks').send({ against, text, reading })

describe('a digit check', () => {
  it('needs no account for an enclosure that is given, and tells each digit', async () => {
    const { body } = await check(anyone, { enclosure: PRIMES }, '$\\approx 1.63661\\,63233\\,51\\ldots$').expect(200)
    expect(digitCheck.safeParse(body).error).toBeUndefined()
    expect(body).toMatchObject({ read: '1.636616323351', sign: 'confirmed', whole: 'confirmed', firstWrong: null, confirmed: 12, uncertainty: null, enclosure: PRIMES })
    const wrong = (await check(anyone, { enclosure: PRIMES }, '1,6367').expect(200)).body
    expect(wrong).toMatchObject({ whole: 'refuted', firstWrong: 4, digits: [{ digit: '1', place: 0, verdict: 'confirmed' }, {}, {}, {}, { digit: '7', place: 4, verdict: 'refuted' }] })
    expect((await check(anyone, { enclosure: PRIMES }, '1.6366', 'rounded')).body.whole).toBe('confirmed')
  })

  it('is open to everybody against a claim and a constant in the public register', async () => {
    const claim = await claimIn('signed', cast, PRIMES)
    const slug = (await numberOf(claim)).replace('/', '-')
    expect((await check(anyone, { claim: slug }, '1.6366').expect(200)).body.whole).toBe('confirmed')
    const constant = await Constant.findByPk(claim.constantId, { rejectOnEmpty: true })
    expect((await check(anyone, { constant: constantNumberText(constant.number) }, '1.6366').expect(200)).body.enclosure).toEqual(PRIMES)
  })

  it('is for the referees while a claim is in review', async () => {
    const claim = await claimIn('in-review', cast, PRIMES)
    await check(await signedInAs(cast.referee, app), { claim: claim.id }, '1.6366').expect(200)
    for (const member of [cast.author, cast.colleague, cast.lead]) await check(await signedInAs(member, app), { claim: claim.id }, '1.6366').expect(403)
    for (const member of [cast.secondReferee, await makeMember({ roles: ['researcher'] })]) await check(await signedInAs(member, app), { claim: claim.id }, '1.6366').expect(404)
    await check(anyone, { claim: claim.id }, '1.6366').expect(401)
  })

  it('of a group that does not publish is for that group', async () => {
    const closed = await makeCast({ public: false })
    const claim = await claimIn('signed', closed, PRIMES)
    await check(anyone, { claim: claim.id }, '1.6366').expect(401)
    await check(await signedInAs(cast.author, app), { claim: claim.id }, '1.6366').expect(404)
    await check(await signedInAs(closed.colleague, app), { claim: claim.id }, '1.6366').expect(200)
  })

  it.each([
    ['what can be read in two ways', { text: '1,636' }, 'text', 'may group thousands'],
    ['nothing', { text: '' }, 'text', 'paste the digits'],
    ['too much', { text: '1'.repeat(100_001) }, 'text', 'at most 100000'],
    ['too many digits', { text: `0.${'1'.repeat(99_000)}` }, 'text', '10,000'],
    ['an unknown reading', { reading: 'guessed' }, 'reading', 'one of'],
    ['ends the wrong way round', { against: { enclosure: { lo: '2', hi: '1' } } }, 'against.enclosure.hi', 'below'],
    ['ends that are no numbers', { against: { enclosure: { lo: '1e5', hi: '2' } } }, 'against.enclosure.lo', 'plain decimal'],
    ['a constant that is not there', { against: { constant: 'MST-99999' } }, undefined, 'no such constant'],
  ])('refuses %s', async (_name, change, path, reason) => {
    const { body } = await anyone.post('/api/v1/digit-checks').send({ against: { enclosure: PRIMES }, text: '1.6366', reading: 'truncated', ...change })
    expect(body.status).toBe(path === undefined ? 404 : 400)
    expect(path === undefined ? body.detail : body.fields.find((field: { path: string }) => field.path === path)?.message).toContain(reason)
  })

  it('refuses ten megabytes without reading them', async () => {
    await request(app).post('/api/v1/digit-checks').set('X-Merestone', '1').send({ against: { enclosure: PRIMES }, text: '1'.repeat(10_000_000), reading: 'truncated' }).expect(413)
  })
})
