import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { recheckClaim } from '../../server/commands/assignment.ts'
import { change, select, selectOne } from '../../server/db.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import type { Claim as ClaimView } from '../../shared/schemas/claim.ts'
import { acting, claimIn, draft, finishedRecheck, finishedRun, freshConstant, makeCast, reload, takeTo, type Cast } from '../support/claims.ts'
import { lastMailTo, makeMember, signedInAs, type Agent } from '../support/people.ts'

const app = createApp()
const view = async (agent: Agent, id: string): Promise<ClaimView> => (await agent.get(`/api/v1/claims/${id}`).expect(200)).body
const act = (agent: Agent, id: string, name: string, body: object = {}) => agent.post(`/api/v1/claims/${id}/${name}`).send(body)

describe('being asked to referee', () => {
  it('can be accepted, or declined with a reason, after which a lead asks somebody else', async () => {
    const cast = await makeCast()
    const claim = await claimIn('submitted', cast)
    const [lead, referee, second] = await Promise.all([cast.lead, cast.referee, cast.secondReferee].map((member) => signedInAs(member, app)))
    const possible = (await view(lead!, claim.id)).possibleReferees.map(({ id }) => id)
    expect(possible).toEqual(expect.arrayContaining([cast.referee.id, cast.secondReferee.id]))
    expect(possible).not.toContain(cast.author.id)

    await referee!.get(`/api/v1/claims/${claim.id}`).expect(404)
    await act(lead!, claim.id, 'assign', { refereeId: cast.referee.id, note: 'the digits from 10 on' }).expect(200)
    expect(await lastMailTo(cast.referee.email)).toMatchObject({ text: expect.stringContaining('the digits from 10 on') })
    await referee!.get(`/api/v1/claims/${claim.id}`).expect(200)
    await act(referee!, claim.id, 'decline', { reason: 'on leave' }).expect(204)
    await referee!.get(`/api/v1/claims/${claim.id}`).expect(404)

    const back = await view(lead!, claim.id)
    expect(back).toMatchObject({ state: 'submitted', next: 'a lead: assign a referee', assignments: [{ state: 'declined', declineReason: 'on leave' }] })
    expect(await lastMailTo(cast.lead.email)).toMatchObject({ template: 'referee-declined', text: expect.stringContaining('on leave') })
    await act(lead!, claim.id, 'assign', { refereeId: cast.secondReferee.id }).expect(200)
    expect((await act(second!, claim.id, 'accept').expect(200)).body).toMatchObject({ state: 'in-review', next: `${cast.secondReferee.name}: give a verdict; a referee: recheck by other arithmetic or another method` })
  })

  it('reaches a referee of another group, who then reads the claim and nothing else of that group', async () => {
    const cast = await makeCast()
    const guest = await makeMember({ roles: ['referee'] })
    const [claim, other] = [await claimIn('submitted', cast), await claimIn('submitted', cast)]
    const lead = await signedInAs(cast.lead, app)
    await act(lead, claim.id, 'assign', { refereeId: guest.id }).expect(200)
    const agent = await signedInAs(guest, app)
    expect((await view(agent, claim.id)).possibleReferees).toEqual([])
    await agent.get(`/api/v1/claims/${other.id}`).expect(404)
    await act(agent, claim.id, 'accept').expect(200)
  })

  it('is refused for whoever is no referee, is the author, has left, or is assigned already', async () => {
    const cast = await makeCast()
    const claim = await claimIn('in-review', cast)
    const lead = await signedInAs(cast.lead, app)
    const gone = await makeMember({ roles: ['referee'] })
    await change(`UPDATE members SET state = 'left', left_at = now() WHERE id = $id`, { id: gone.id })
    await change(`UPDATE members SET roles = '{researcher,referee}' WHERE id = $id`, { id: cast.author.id })
    for (const refereeId of [cast.colleague.id, cast.author.id, gone.id, claim.id]) {
      expect((await act(lead, claim.id, 'assign', { refereeId }).expect(400)).body.fields[0].path).toBe('refereeId')
    }
    expect((await act(lead, claim.id, 'assign', { refereeId: cast.referee.id }).expect(409)).body.code).toBe('already_assigned')
  })

  it('is brought to mind by the lead while something is owed', async () => {
    const cast = await makeCast()
    const claim = await claimIn('in-review', cast)
    const lead = await signedInAs(cast.lead, app)
    const { assignments } = await view(lead, claim.id)
    await act(lead, claim.id, 'remind', { assignmentId: assignments[0]!.id }).expect(200)
    expect(await lastMailTo(cast.referee.email)).toMatchObject({ template: 'reminder', text: expect.stringContaining('/claims/MST-') })
    const done = await view(lead, (await claimIn('endorsed', cast)).id)
    expect((await act(lead, done.id, 'remind', { assignmentId: done.assignments[0]!.id }).expect(409)).body.code).toBe('nothing_to_remind')
  })
})

describe('endorsing', () => {
  it('needs as many confirmations as the group asks for, each by another referee', async () => {
    const cast = await makeCast({ confirmations_needed: 2, recheck_needed: false })
    const claim = await claimIn('in-review', cast)
    const [lead, referee, second] = await Promise.all([cast.lead, cast.referee, cast.secondReferee].map((member) => signedInAs(member, app)))
    await act(lead!, claim.id, 'assign', { refereeId: cast.secondReferee.id }).expect(200)
    await act(second!, claim.id, 'accept').expect(200)
    const { version } = await reload(claim)
    expect((await act(referee!, claim.id, 'confirm', { version, remark: 'good' }).expect(200)).body).toMatchObject({ state: 'in-review', confirmations: { have: 1, need: 2 } })
    expect((await act(referee!, claim.id, 'confirm', { version, remark: 'good' }).expect(409)).body.code).toBe('already_confirmed')
    expect((await act(second!, claim.id, 'confirm', { version, remark: 'good too' }).expect(200)).body.state).toBe('endorsed')
  })

  it('waits for the recheck, which completes it whenever it is done', async () => {
    const cast = await makeCast()
    const claim = await claimIn('in-review', cast)
    const referee = await signedInAs(cast.referee, app)
    expect((await act(referee, claim.id, 'confirm', { version: claim.version, remark: 'good' }).expect(200)).body.state).toBe('in-review')
    await finishedRecheck(cast.referee, claim, { lo: '1.2', hi: '1.3' })
    expect((await view(referee, claim.id)).rechecks[0]).toMatchObject({ independent: false, verdict: 'meets' })
    expect((await reload(claim)).state).toBe('in-review')
    await finishedRecheck(cast.referee, claim, { lo: '1.26', hi: '1.3', method: 'panels' })
    expect((await reload(claim)).state).toBe('endorsed')
    expect(await lastMailTo(cast.lead.email)).toMatchObject({ template: 'sign-request' })
  })

  it('follows when the group asks for less than it did', async () => {
    const cast = await makeCast({ confirmations_needed: 2, recheck_needed: true })
    const claim = await claimIn('in-review', cast)
    const [referee, lead] = await Promise.all([cast.referee, cast.lead].map((member) => signedInAs(member, app)))
    await act(referee!, claim.id, 'confirm', { version: claim.version, remark: 'good' }).expect(200)
    await lead!.patch('/api/v1/group').send({ recheckNeeded: false }).expect(200)
    expect((await reload(claim)).state).toBe('in-review')
    await lead!.patch('/api/v1/group').send({ confirmationsNeeded: 1 }).expect(200)
    expect((await reload(claim)).state).toBe('endorsed')
  })

  it('is barred by a recheck that does not meet the claim', async () => {
    const cast = await makeCast({ recheck_needed: false })
    const claim = await claimIn('in-review', cast)
    const referee = await signedInAs(cast.referee, app)
    await finishedRecheck(cast.referee, claim, { lo: '1.27', hi: '1.3', arithmetic: 'mpfr' })
    const { body } = await act(referee, claim.id, 'confirm', { version: claim.version, remark: 'hm' }).expect(200)
    expect(body).toMatchObject({ state: 'in-review', rechecks: [{ verdict: 'disjoint' }], next: expect.stringContaining('does not meet') })
  })

  it('counts no confirmation of what the claim said before it was changed', async () => {
    const cast = await makeCast({ confirmations_needed: 2, recheck_needed: false })
    const claim = await takeTo('in-review', await draft(cast.author, { stated: true }), cast)
    const [author, lead, referee] = await Promise.all([cast.author, cast.lead, cast.referee].map((member) => signedInAs(member, app)))
    await act(referee!, claim.id, 'confirm', { version: claim.version, remark: 'as it stands' }).expect(200)
    await act(lead!, claim.id, 'return', { reason: 'name the page' }).expect(200)
    let { version } = await reload(claim)
    const edited = await author!.patch(`/api/v1/claims/${claim.id}`).send({ version, source: 'J. Tests 1 (2020), p. 7' }).expect(200)
    expect(edited.body).toMatchObject({ confirmations: { have: 0 }, assignments: [{ verdict: 'confirmed', verdictCurrent: false }] })
    version = edited.body.version
    await act(author!, claim.id, 'resubmit', { version, remark: 'page named' }).expect(200)
    version = (await reload(claim)).version
    expect((await act(referee!, claim.id, 'confirm', { version, remark: 'again' }).expect(200)).body.confirmations.have).toBe(1)
  })
})

describe('an objection', () => {
  let cast: Cast
  let author: Agent
  let referee: Agent
  beforeAll(async () => {
    cast = await makeCast({ recheck_needed: false })
    author = await signedInAs(cast.author, app)
    referee = await signedInAs(cast.referee, app)
  })

  it('is answered, upheld, answered again and settled, and bars the way until then', async () => {
    const claim = await claimIn('in-review', cast)
    const objectionId = (await act(referee, claim.id, 'object', { text: 'why?' }).expect(200)).body.objections[0].id
    const resubmit = async () => act(author, claim.id, 'resubmit', { version: (await reload(claim)).version, remark: 'done' })
    expect((await resubmit()).body.code).toBe('objection_unanswered')
    expect((await act(referee, claim.id, 'settle', { objectionId, outcome: 'settled' })).body.code).toBe('objection_not_answered')
    const answered = (await act(author, claim.id, 'answer', { objectionId, text: 'because' }).expect(200)).body as ClaimView
    expect(answered.objections[0]).toMatchObject({ state: 'answered', abilities: { answer: false, settle: false } })
    await resubmit()
    const confirm = async () => act(referee, claim.id, 'confirm', { version: (await reload(claim)).version, remark: 'good' })
    expect((await confirm()).body.code).toBe('own_objection_open')
    expect((await act(referee, claim.id, 'settle', { objectionId, outcome: 'upheld', text: 'not so' }).expect(200)).body).toMatchObject({ state: 'returned', objections: [{ state: 'upheld' }] })
    expect(await lastMailTo(cast.author.email)).toMatchObject({ template: 'objection-raised', text: expect.stringContaining('not so') })
    await act(author, claim.id, 'answer', { objectionId, text: 'look again' }).expect(200)
    await resubmit()
    const settled = (await act(referee, claim.id, 'settle', { objectionId, outcome: 'settled', text: 'yes' }).expect(200)).body as ClaimView
    expect(settled.objections[0]!.messages.map(({ text }) => text)).toEqual(['why?', 'because', 'not so', 'look again', 'yes'])
    expect(settled.next).toBe(`${cast.referee.name}: give a verdict`)
    expect((await confirm()).body.state).toBe('endorsed')
  })

  it('after endorsement takes the endorsement away, and with it the confirmation of whoever objects', async () => {
    const claim = await claimIn('endorsed', cast)
    const { body } = await act(referee, claim.id, 'object', { text: 'I was too quick' }).expect(200)
    expect(body).toMatchObject({ state: 'returned', confirmations: { have: 0 }, assignments: [{ verdict: 'objected' }] })
  })

  it('of a referee who has left the review is settled by a lead', async () => {
    const claim = await claimIn('in-review', cast)
    const lead = await signedInAs(cast.lead, app)
    const objectionId = (await act(referee, claim.id, 'object', { text: 'why?' }).expect(200)).body.objections[0].id
    await act(author, claim.id, 'answer', { objectionId, text: 'because' }).expect(200)
    expect((await act(lead, claim.id, 'settle', { objectionId, outcome: 'settled' }).expect(403)).body.code).toBe('objection_of_another')
    await act(referee, claim.id, 'decline', { reason: 'moved on' }).expect(204)
    expect((await act(lead, claim.id, 'settle', { objectionId, outcome: 'settled', text: 'answered well' }).expect(200)).body.objections[0].state).toBe('settled')
  })
})

describe('a verdict while it is being written', () => {
  it('is kept for the referee and for nobody else, and goes with the verdict', async () => {
    const cast = await makeCast()
    const claim = await claimIn('in-review', cast)
    const [referee, lead, author] = await Promise.all([cast.referee, cast.lead, cast.author].map((member) => signedInAs(member, app)))
    await referee!.put(`/api/v1/claims/${claim.id}/verdict-draft`).send({ text: 'so far so good' }).expect(204)
    expect((await view(referee!, claim.id)).draftVerdict).toBe('so far so good')
    for (const other of [lead!, author!]) expect(JSON.stringify(await view(other, claim.id))).not.toContain('so far so good')
    const trail = await select('SELECT 1 FROM audit_entries WHERE detail::text LIKE $text OR reason LIKE $text', { text: '%so far so good%' })
    expect(trail).toEqual([])
    await act(referee!, claim.id, 'confirm', { version: claim.version, remark: 'good' }).expect(200)
    expect((await view(referee!, claim.id)).draftVerdict).toBeNull()
  })
})

describe('what there is to check', () => {
  it('lists every estimate and every bound of the certificate', async () => {
    const cast = await makeCast()
    const known = ESTIMATES[0]!
    const run = await finishedRun(cast.author, await freshConstant(cast.author), { lo: '1', hi: '2', method: 'partial-sum' })
    await run.update({ outcome: { ...run.outcome!, estimates: [{ id: known.id, usedAt: 'x >= 1000', validFor: known.validFor, conditional: known.conditional }] } })
    const author = await signedInAs(cast.author, app)
    const { body } = await author.post('/api/v1/claims').send({ kind: 'enclosure', runId: run.id }).expect(201)
    expect(body.checklist).toEqual([
      { item: `Estimate ${known.id}: ${known.title}`, detail: expect.stringContaining('Used at x >= 1000.') },
      { item: 'Bound R-1', detail: expect.stringContaining('1.0 · 10^-20') },
    ])
    expect(body.checklist[0].detail).toContain(known.statement)
  })
})

describe('a recheck', () => {
  it('is a run of the claim’s group, started by the referee, with the claim’s own goal', async () => {
    const cast = await makeCast()
    const claim = await claimIn('in-review', cast)
    await recheckClaim(acting(cast.referee), claim.id, { method: 'transform', arithmetic: 'mpfr' })
    const run = await selectOne('SELECT purpose, claim_id, group_id, started_by, method, arithmetic, goal, state FROM runs WHERE claim_id = $id', { id: claim.id })
    expect(run).toEqual({ purpose: 'recheck', claim_id: claim.id, group_id: cast.group.id, started_by: cast.referee.id, method: 'transform', arithmetic: 'mpfr', goal: { digits: 10 }, state: 'queued' })
  })
})
