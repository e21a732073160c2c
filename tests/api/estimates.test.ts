import request from 'supertest'
import { describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { change } from '../../server/db.ts'
import { estimate as schema } from '../../shared/schemas/estimate.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { makeGroup, makeMember } from '../support/people.ts'
import { makeClaim, makeConstant, series } from '../support/register.ts'
import { signedInAs } from '../support/people.ts'

const app = createApp()

describe('the library of estimates', () => {
  it('is open to everybody, each entry with its source and what was checked', async () => {
    const { body } = await request(app).get('/api/v1/estimates').expect(200)
    expect(body.items.map(({ id }: { id: string }) => id)).toEqual(ESTIMATES.map(({ id }) => id))
    for (const item of body.items) expect(schema.safeParse(item).error).toBeUndefined()
    const one = await request(app).get(`/api/v1/estimates/${encodeURIComponent(body.items[0].id)}`).expect(200)
    expect(one.body).toEqual(body.items[0])
    expect(one.body).toMatchObject({ uses: 0, usedBy: [] })
    await request(app).get('/api/v1/estimates/none').expect(404)
  })

  it('names the signed claims that rest on an entry, to those who may see them', async () => {
    const open = await makeMember({ roles: ['lead'] })
    const closed = await makeMember({ roles: ['lead'], group: await makeGroup({ public: false }) })
    const [estimate] = ESTIMATES
    const uses = [{ id: estimate!.id, usedAt: 'x >= 1000000', validFor: estimate!.validFor, conditional: false }]
    const signed = []
    for (const member of [open, closed]) {
      const constant = await makeConstant(member, series({ kind: 'primes', exclude: member === open ? [41] : [43] }))
      const [run] = await change<{ id: string }>(
        `INSERT INTO runs (constant_id, group_id, started_by, method, arithmetic, request, request_key, goal, state, outcome, certificate, estimates, finished_at)
         VALUES ($constantId, $groupId, $memberId, 'partial-sum', 'ball', '{}', '', '{}', 'done', $outcome::jsonb, '{}', $estimates, now()) RETURNING id`,
        { constantId: constant.id, groupId: member.groupId, memberId: member.id, outcome: JSON.stringify({ estimates: uses }), estimates: [estimate!.id] },
      )
      const claim = await makeClaim(member, constant, { lo: '1.2', hi: '1.3', runId: run!.id })
      signed.push(`MST-${String(constant.number).padStart(4, '0')}/${claim.ordinal}`)
    }
    const path = `/api/v1/estimates/${encodeURIComponent(estimate!.id)}`
    expect((await request(app).get(path)).body.usedBy).toEqual([{ claimNumber: signed[0], usedAt: 'x >= 1000000' }])
    expect((await (await signedInAs(closed, app)).get(path)).body.usedBy.map(({ claimNumber }: { claimNumber: string }) => claimNumber)).toEqual([...signed].reverse())
    const page = await request(app).get(`/api/v1/constants/${signed[0]!.split('/')[0]}`).expect(200)
    expect(page.body.restsOn).toEqual([{ estimate: estimate!.id, title: estimate!.title, conditional: estimate!.conditional }])
  })
})
