import { describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { remindAll } from '../../server/commands/assignment-reminder.ts'
import { change, select } from '../../server/db.ts'
import { Constant } from '../../server/models/constant.ts'
import { desk as deskSchema, type Desk } from '../../shared/schemas/claim.ts'
import { claimIn, draft, finishedRecheck, makeCast, reload, takeTo } from '../support/claims.ts'
import { signedInAs, type TestMember } from '../support/people.ts'

const app = createApp()

async function deskOf(member: TestMember): Promise<Desk> {
  const { body } = await (await signedInAs(member, app)).get('/api/v1/desk').expect(200)
  expect(deskSchema.safeParse(body).error).toBeUndefined()
  return body
}
const kinds = (items: Desk['lead']) => items.map(({ kind, claim }) => [kind, claim.id])
const act = async (member: TestMember, id: string, name: string, body: object = {}) => (await signedInAs(member, app)).post(`/api/v1/claims/${id}/${name}`).send(body).expect((response) => expect(response.status).toBeLessThan(300))

describe('the desk', () => {
  it('shows everybody what waits for them, longest waiting first, and nothing else', async () => {
    const cast = await makeCast()
    const own = await draft(cast.author)
    const submitted = await claimIn('submitted', cast)
    const returned = await claimIn('returned', cast)
    const review = await claimIn('in-review', cast)
    const endorsed = await claimIn('endorsed', cast)
    const objected = await claimIn('in-review', cast)
    await act(cast.referee, objected.id, 'object', { text: 'why?' })
    await claimIn('signed', cast)

    const author = await deskOf(cast.author)
    expect(kinds(author.researcher)).toEqual([['finish-draft', own.id], ['resubmit', returned.id], ['answer', objected.id]])
    expect([author.referee, author.lead]).toEqual([[], []])
    expect(kinds((await deskOf(cast.referee)).referee)).toEqual([['review', review.id]])
    expect(kinds((await deskOf(cast.lead)).lead)).toEqual([['assign', submitted.id], ['sign', endorsed.id]])
    expect(author.total).toEqual({ researcher: 3, referee: 0, lead: 0 })
    const empty = { researcher: [], referee: [], lead: [], total: { researcher: 0, referee: 0, lead: 0 } }
    expect(await deskOf(cast.colleague)).toEqual(empty)
    expect(await deskOf((await makeCast()).lead)).toEqual(empty)

    await act(cast.author, objected.id, 'answer', { objectionId: (await select<{ id: string }>('SELECT id FROM objections WHERE claim_id = $id', { id: objected.id }))[0]!.id, text: 'because' })
    expect(kinds((await deskOf(cast.author)).researcher)).toContainEqual(['resubmit', objected.id])
    expect(kinds((await deskOf(cast.referee)).referee)).toContainEqual(['settle', objected.id])
  })

  it('asks a lead to sign only what that lead may sign', async () => {
    const cast = await makeCast({ recheck_needed: false })
    await change(`UPDATE members SET roles = '{lead,referee,researcher}' WHERE id IN ($a, $b)`, { a: cast.lead.id, b: cast.author.id })
    const claim = await claimIn('submitted', cast)
    await act(cast.secondLead, claim.id, 'assign', { refereeId: cast.lead.id })
    await act(cast.lead, claim.id, 'accept')
    await act(cast.lead, claim.id, 'confirm', { version: (await reload(claim)).version, remark: 'good' })
    expect((await deskOf(cast.lead)).lead).toEqual([])
    expect((await deskOf(cast.author)).lead).toEqual([])
    expect(kinds((await deskOf(cast.secondLead)).lead)).toEqual([['sign', claim.id]])
    const asked = await select<{ member_id: string }>(`SELECT member_id FROM outbox WHERE template = 'sign-request'`)
    expect(asked.filter(({ member_id: id }) => [cast.lead.id, cast.author.id, cast.secondLead.id].includes(id))).toEqual([{ member_id: cast.secondLead.id }])
  })

  it('tells a lead of late referees, missing confirmations, conflicts and suspended claims', async () => {
    const cast = await makeCast({ confirmations_needed: 2, recheck_needed: false })
    const late = await claimIn('in-review', cast)
    await change(`UPDATE assignments SET asked_at = now() - interval '9 days', answered_at = now() - interval '8 days' WHERE claim_id = $id`, { id: late.id })
    await change(`UPDATE claims SET since = now() - interval '9 days' WHERE id = $id`, { id: late.id })
    const thin = await claimIn('in-review', cast)
    await finishedRecheck(cast.referee, thin, { lo: '1.25', hi: '1.26', arithmetic: 'mpfr' })
    await act(cast.referee, thin.id, 'confirm', { version: (await reload(thin)).version, remark: 'good' })
    const desk = await deskOf(cast.lead)
    expect(desk.lead.map(({ kind, text }) => [kind, text])).toEqual([
      ['remind', `Remind ${cast.referee.name}`],
      ['assign', 'Assign another referee: confirmations are missing'],
    ])
    await act(cast.lead, late.id, 'remind', { assignmentId: (await select<{ id: string }>('SELECT id FROM assignments WHERE claim_id = $id', { id: late.id }))[0]!.id })
    expect(kinds((await deskOf(cast.lead)).lead)).toEqual([['assign', thin.id]])

    const easy = await makeCast({ recheck_needed: false })
    const first = await claimIn('signed', easy, { lo: '1.2', hi: '1.3', stated: true })
    const against = await takeTo('submitted', await draft(easy.author, { lo: '1.5', hi: '1.6', constant: (await Constant.findByPk(first.constantId))!, stated: true }), easy)
    await act(easy.lead, first.id, 'suspend', { reason: 'in conflict' })
    expect(kinds((await deskOf(easy.lead)).lead).sort()).toEqual([['assign', against.id], ['conflict', against.id], ['conflict', first.id], ['decide', first.id]].sort())
  })

  it('is counted for the navigation, own drafts apart', async () => {
    const cast = await makeCast()
    await draft(cast.author)
    await claimIn('returned', cast)
    const { body } = await (await signedInAs(cast.author, app)).get('/api/v1/session').expect(200)
    expect(body.counts.desk).toBe(1)
  })
})

describe('the reminder', () => {
  it('goes once in the days that the group has set to everybody for whom something waits', async () => {
    const cast = await makeCast({ reminder_days: 3 })
    const review = await claimIn('in-review', cast)
    await draft(cast.author)
    const late = new Date(Date.now() + 3.5 * 86_400_000)
    const reminders = () => select<{ text: string }>(`SELECT text FROM outbox WHERE template = 'reminder' AND member_id = $id ORDER BY created_at`, { id: cast.referee.id })
    await remindAll()
    expect(await reminders()).toEqual([])
    await Promise.all([remindAll(late), remindAll(late)])
    const sent = await reminders()
    expect(sent).toHaveLength(1)
    expect(sent[0]!.text).toContain('Check it and give your verdict')
    expect(sent[0]!.text).toMatch(/http:\/\/merestone.test\/claims\/MST-\d+-1/)
    await remindAll(new Date(Date.now() + 5 * 86_400_000))
    expect(await reminders()).toHaveLength(2)
    expect(await select(`SELECT 1 FROM outbox WHERE template = 'reminder' AND member_id = $id`, { id: cast.author.id })).toEqual([])
    expect((await reload(review)).state).toBe('in-review')
  })
})
