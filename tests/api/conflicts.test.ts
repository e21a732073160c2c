import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { submitClaim } from '../../server/commands/claim.ts'
import { select } from '../../server/db.ts'
import type { Claim } from '../../server/models/claim.ts'
import { Constant } from '../../server/models/constant.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import { acting, claimIn, draft, makeCast, numberOf, reload, takeTo, type Cast } from '../support/claims.ts'
import { PASSWORD, signedInAs, type Agent } from '../support/people.ts'

const app = createApp()
let cast: Cast
let lead: Agent
let author: Agent

beforeAll(async () => {
  cast = await makeCast({ recheck_needed: false })
  ;[lead, author] = await Promise.all([signedInAs(cast.lead, app), signedInAs(cast.author, app)])
})

const view = async (claim: { id: string }) => (await lead.get(`/api/v1/claims/${claim.id}`).expect(200)).body
const constantOf = (claim: Claim) => Constant.findByPk(claim.constantId, { rejectOnEmpty: true })
const open = (claim: { id: string }) => select('SELECT 1 FROM conflicts WHERE $id IN (claim_id, signed_claim_id) AND closed_at IS NULL', { id: claim.id })

describe('a claim that does not meet the signed enclosure of its constant', () => {
  it('opens a conflict that both show, bars the signature, and closes it when one is withdrawn', async () => {
    const first = await claimIn('signed', cast, { lo: '1.2', hi: '1.3' })
    const constant = await constantOf(first)
    const second = await draft(cast.author, { lo: '1.31', hi: '1.32', constant, stated: true })
    expect(await open(first)).toEqual([])
    await takeTo('endorsed', second, cast)

    expect(await view(first)).toMatchObject({ inConflict: true, conflicts: [{ claim: await numberOf(await reload(second)), closedAt: null }] })
    expect(await view(second)).toMatchObject({ inConflict: true, conflicts: [{ claim: await numberOf(first) }], next: 'a lead: settle the conflict, then sign' })
    expect((await request(app).get(`/api/v1/constants/${constantNumberText(constant.number)}`)).body).toMatchObject({ inConflict: true, best: { lo: '1.2', hi: '1.3' } })
    // What is still in review is told to nobody outside.
    const outside = (await request(app).get(`/api/v1/claims/${first.id}`).expect(200)).body
    expect(outside).toMatchObject({ inConflict: true, conflicts: [] })

    const { version } = await reload(second)
    const refused = await lead.post(`/api/v1/claims/${second.id}/sign`).send({ version, password: PASSWORD }).expect(409)
    expect(refused.body.code).toBe('in_conflict')
    await lead.post(`/api/v1/claims/${first.id}/withdraw`).send({ reason: 'it was wrong' }).expect(200)
    expect((await view(second)).conflicts).toMatchObject([{ closedAt: expect.any(String) }])
    expect(await open(second)).toEqual([])
    await lead.post(`/api/v1/claims/${second.id}/sign`).send({ version: (await reload(second)).version, password: PASSWORD }).expect(200)
  })

  it('may be signed once the other is suspended, which then is not reinstated', async () => {
    const first = await claimIn('signed', cast, { lo: '1.2', hi: '1.3' })
    const second = await takeTo('endorsed', await draft(cast.author, { lo: '1.31', hi: '1.32', constant: await constantOf(first), stated: true }), cast)
    await lead.post(`/api/v1/claims/${first.id}/suspend`).send({ reason: 'in conflict' }).expect(200)
    await lead.post(`/api/v1/claims/${second.id}/sign`).send({ version: (await reload(second)).version, password: PASSWORD }).expect(200)
    expect((await lead.post(`/api/v1/claims/${first.id}/reinstate`).send({ reason: 'no' }).expect(409)).body.code).toBe('in_conflict')
    expect(await open(first)).toHaveLength(1)
  })

  it('is found whichever comes first, also by those who act at once', async () => {
    for (let turn = 0; turn < 4; turn += 1) {
      const first = await claimIn('endorsed', cast, { lo: '1.2', hi: '1.3' })
      const second = await draft(cast.author, { lo: '1.4', hi: '1.5', constant: await constantOf(first), stated: true })
      const { version } = await reload(first)
      await Promise.all([lead.post(`/api/v1/claims/${first.id}/sign`).send({ version, password: PASSWORD }).expect(200), author.post(`/api/v1/claims/${second.id}/submit`).send({ version: 1 }).expect(200)])
      expect(await open(first)).toHaveLength(1)
    }
  })

  it('leaves the conflict when it is changed so that it meets', async () => {
    const first = await claimIn('signed', cast, { lo: '1.2', hi: '1.3' })
    const constant = await constantOf(first)
    const wrong = await draft(cast.author, { lo: '1.4', hi: '1.5', constant })
    await takeTo('returned', wrong, cast)
    expect(await open(first)).toHaveLength(1)
    const right = await draft(cast.author, { lo: '1.25', hi: '1.5', constant })
    await author.patch(`/api/v1/claims/${wrong.id}`).send({ version: (await reload(wrong)).version, runId: right.runId }).expect(200)
    await author.post(`/api/v1/claims/${wrong.id}/resubmit`).send({ version: (await reload(wrong)).version, remark: 'the other run' }).expect(200)
    expect(await open(first)).toEqual([])
    const trail = await select<{ act: string }>(`SELECT act FROM audit_entries WHERE subject_id = $id AND act LIKE 'claim.conflict%' ORDER BY seq`, { id: wrong.id })
    expect(trail.map(({ act }) => act)).toEqual(['claim.conflict', 'claim.conflict-closed'])
  })

  it('opens none where the enclosures touch', async () => {
    const first = await claimIn('signed', cast, { lo: '1.2', hi: '1.30' })
    const second = await draft(cast.author, { lo: '1.3', hi: '1.4', constant: await constantOf(first), stated: true })
    await submitClaim(acting(cast.author), second.id, 1)
    expect(await open(first)).toEqual([])
  })
})
