import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { select, selectOne } from '../../server/db.ts'
import { changeKey } from '../../server/keys.ts'
import { Constant } from '../../server/models/constant.ts'
import { isIntact, type Certificate } from '../../shared/engine/certificate/certificate.ts'
import { hasValidSignature } from '../../shared/engine/certificate/signature.ts'
import { readCertificate } from '../../shared/schemas/certificate.ts'
import { claimIn, draft, makeCast, numberOf, reload, takeTo, type Cast } from '../support/claims.ts'
import { makeMember, PASSWORD, signedInAs, type Agent } from '../support/people.ts'

const app = createApp()
let cast: Cast
let lead: Agent

beforeAll(async () => {
  cast = await makeCast()
  lead = await signedInAs(cast.lead, app)
})

const sign = async (agent: Agent, claim: { id: string }, body: object = {}) => agent.post(`/api/v1/claims/${claim.id}/sign`).send({ version: (await reload(claim)).version, password: PASSWORD, ...body })

async function certificateAt(address: string): Promise<Certificate> {
  return JSON.parse((await request(app).get(address).expect(200)).text)
}
async function pemOf(keyId: string): Promise<string> {
  const { items } = (await request(app).get('/api/v1/keys').expect(200)).body
  return items.find(({ id }: { id: string }) => id === keyId).pem
}

describe('signing', () => {
  it('puts the installation’s signature into the public certificate, which anybody can check', async () => {
    const claim = await claimIn('endorsed', cast)
    const { body } = await sign(lead, claim)
    expect(body).toMatchObject({ state: 'signed', signature: { by: cast.lead.name }, certificate: { digest: claim.certificateDigest, signed: true } })
    const address = `/api/v1/claims/${(await numberOf(claim)).replace('/', '-')}/certificate`
    const certificate = await certificateAt(address)
    expect(readCertificate(JSON.stringify(certificate))).toHaveProperty('certificate')
    expect(await isIntact(certificate)).toBe(true)
    expect(certificate.signature!.keyId).toBe(body.certificate.keyId)
    expect(await hasValidSignature(certificate, await pemOf(certificate.signature!.keyId))).toBe(true)
    expect(await hasValidSignature({ ...certificate, digest: '0'.repeat(64) }, await pemOf(certificate.signature!.keyId))).toBe(false)

    const first = await request(app).get(address).expect(200)
    expect(first.headers['content-disposition']).toMatch(/filename="?MST-\d+-1\.json/)
    await request(app).get(address).set('If-None-Match', first.headers.etag!).expect(304)
    const entry = await selectOne<{ digest: string; detail: { keyId: string; certificate: string } }>(`SELECT digest, detail FROM audit_entries WHERE act = 'claim.sign' AND subject_id = $id`, { id: claim.id })
    expect(entry).toMatchObject({ digest: claim.digest, detail: { keyId: body.certificate.keyId, certificate: claim.certificateDigest } })
  })

  it('changes the tag of the certificate, though not its digest', async () => {
    const claim = await claimIn('endorsed', cast)
    const before = await lead.get(`/api/v1/claims/${claim.id}/certificate`).expect(200)
    await sign(lead, claim)
    const after = await lead.get(`/api/v1/claims/${claim.id}/certificate`).set('If-None-Match', before.headers.etag!).expect(200)
    expect(JSON.parse(after.text).digest).toBe(JSON.parse(before.text).digest)
  })

  it('stays verifiable after the key was changed', async () => {
    const claim = await claimIn('signed', cast)
    const certificate = await certificateAt(`/api/v1/claims/${claim.id}/certificate`)
    changeKey()
    expect(await hasValidSignature(certificate, await pemOf(certificate.signature!.keyId))).toBe(true)
    const next = await certificateAt(`/api/v1/claims/${(await claimIn('signed', cast)).id}/certificate`)
    expect(next.signature!.keyId).not.toBe(certificate.signature!.keyId)
  })

  it('says how to cite the claim', async () => {
    const claim = await claimIn('signed', cast)
    const number = await numberOf(claim)
    const { cite } = (await request(app).get(`/api/v1/claims/${claim.id}`).expect(200)).body
    expect(cite.plain).toContain(`${cast.author.name}, ${number}: `)
    expect(cite.plain).toContain(`http://merestone.test/claims/${number.replace('/', '-')}`)
    expect(cite.bibtex).toContain(`@misc{${number.replace('/', '-')},`)
    expect((cite.bibtex.match(/[{]/g) ?? []).length).toBe((cite.bibtex.match(/[}]/g) ?? []).length)
  })

  it('needs the right password, and is not tried for ever', async () => {
    const signer = await makeMember({ group: cast.group, roles: ['lead'] })
    const agent = await signedInAs(signer, app)
    const claim = await claimIn('endorsed', cast)
    const { body } = await sign(agent, claim, { password: 'wrong' })
    expect(body).toMatchObject({ status: 400, fields: [{ path: 'password' }] })
    let status = 0
    for (let attempt = 0; attempt < 12 && status !== 429; attempt += 1) status = (await sign(agent, claim, { password: 'wrong' })).status
    expect(status).toBe(429)
    expect((await sign(agent, claim)).status).toBe(429)
    expect((await reload(claim)).state).toBe('endorsed')
  })

  it('is of the version that was read', async () => {
    const claim = await claimIn('endorsed', cast)
    const { body } = await sign(lead, claim, { version: claim.version - 1 })
    expect(body).toMatchObject({ status: 409, code: 'changed_meanwhile', detail: expect.stringContaining('endorsed by Merestone') })
  })
})

describe('two leads at once', () => {
  it('sign and return: one wins, and the other is told what happened', async () => {
    const second = await signedInAs(cast.secondLead, app)
    for (let turn = 0; turn < 4; turn += 1) {
      const claim = await claimIn('endorsed', cast)
      const { version } = await reload(claim)
      const [signed, returned] = await Promise.all([
        lead.post(`/api/v1/claims/${claim.id}/sign`).send({ version, password: PASSWORD }),
        second.post(`/api/v1/claims/${claim.id}/return`).send({ reason: 'wait' }),
      ])
      expect([signed.status, returned.status].sort()).toEqual([200, 409])
      const [winner, loser] = signed.status === 200 ? [cast.lead, returned] : [cast.secondLead, signed]
      expect(loser.body.detail).toContain(winner.name)
      expect(loser.body.detail).toContain(signed.status === 200 ? 'signed by' : 'returned by')
    }
  })

  it('sign the same claim: it is signed once', async () => {
    const second = await signedInAs(cast.secondLead, app)
    const claim = await claimIn('endorsed', cast)
    const { version } = await reload(claim)
    const answers = await Promise.all([lead, second].map((agent) => agent.post(`/api/v1/claims/${claim.id}/sign`).send({ version, password: PASSWORD })))
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await select(`SELECT 1 FROM audit_entries WHERE act = 'claim.sign' AND subject_id = $id`, { id: claim.id })).toHaveLength(1)
    expect(await select(`SELECT 1 FROM outbox WHERE template = 'claim-signed' AND member_id = $id AND text LIKE '%' || $slug || '%'`, { id: cast.author.id, slug: (await numberOf(claim)).replace('/', '-') })).toHaveLength(1)
  })
})

describe('what is signed', () => {
  it('is superseded by a narrower enclosure within it, and restored when that one falls', async () => {
    const wide = await claimIn('signed', cast, { lo: '1.2', hi: '1.3' })
    const constant = await Constant.findByPk(wide.constantId, { rejectOnEmpty: true })
    const narrow = await takeTo('signed', await draft(cast.author, { lo: '1.25', hi: '1.26', constant }), cast)
    const view = async (claim: { id: string }) => (await request(app).get(`/api/v1/claims/${claim.id}`).expect(200)).body
    expect(await view(wide)).toMatchObject({ state: 'superseded', supersededBy: await numberOf(narrow) })
    expect(await view(narrow)).toMatchObject({ state: 'signed', supersedes: await numberOf(wide) })

    await lead.post(`/api/v1/claims/${narrow.id}/suspend`).send({ reason: 'an estimate is in doubt' }).expect(200)
    expect(await view(wide)).toMatchObject({ state: 'signed', supersededBy: null })
    const best = async () => (await request(app).get(`/api/v1/constants/${(await view(wide)).constant}`)).body.best
    expect(await best()).toMatchObject({ lo: '1.2', hi: '1.3' })
    await lead.post(`/api/v1/claims/${narrow.id}/reinstate`).send({ reason: 'it holds' }).expect(200)
    expect(await view(wide)).toMatchObject({ state: 'superseded' })
    expect(await best()).toMatchObject({ lo: '1.25', hi: '1.26' })
    await lead.post(`/api/v1/claims/${narrow.id}/withdraw`).send({ reason: 'it does not' }).expect(200)
    expect(await view(wide)).toMatchObject({ state: 'signed' })
    expect((await view(wide)).history.map(({ act }: { act: string }) => act)).toEqual(['submit', 'sign', 'supersede', 'restore', 'supersede', 'restore'])
  })

  it('is not superseded by one that only overlaps it: both narrow the constant', async () => {
    const one = await claimIn('signed', cast, { lo: '1.2', hi: '1.3' })
    const constant = await Constant.findByPk(one.constantId, { rejectOnEmpty: true })
    const two = await takeTo('signed', await draft(cast.author, { lo: '1.25', hi: '1.31', constant }), cast)
    expect([(await reload(one)).state, (await reload(two)).state]).toEqual(['signed', 'signed'])
    const { number } = constant
    const { best } = (await request(app).get(`/api/v1/constants/MST-${String(number).padStart(4, '0')}`)).body
    expect(best).toMatchObject({ lo: '1.25', hi: '1.3' })
  })

  it('cannot be changed by anybody', async () => {
    const claim = await claimIn('signed', cast)
    const author = await signedInAs(cast.author, app)
    const { version } = await reload(claim)
    for (const agent of [author, lead]) await agent.patch(`/api/v1/claims/${claim.id}`).send({ version, remark: 'changed' }).expect((response) => expect([403, 409]).toContain(response.status))
  })
})

describe('an order', () => {
  it('falls with the enclosures that it rests on, whose suspension tells its author', async () => {
    const small = await claimIn('signed', cast, { lo: '1.1', hi: '1.2' })
    const large = await claimIn('signed', cast, { lo: '1.3', hi: '1.4' })
    const [lesser, greater] = [await numberOf(small), await numberOf(large)].map((number) => number.split('/')[0])
    const author = await signedInAs(cast.colleague, app)
    const { id } = (await author.post('/api/v1/claims').send({ kind: 'order', lesser, greater }).expect(201)).body
    const order = await takeTo('endorsed', await reload({ id }), { ...cast, author: cast.colleague })
    await lead.post(`/api/v1/claims/${large.id}/suspend`).send({ reason: 'in doubt' }).expect(200)
    const mail = await selectOne<{ text: string }>(`SELECT text FROM outbox WHERE template = 'claim-suspended' AND member_id = $id`, { id: cast.colleague.id })
    expect(mail!.text).toContain(await numberOf(order))
    const refused = await sign(lead, order)
    expect(refused.body).toMatchObject({ status: 409, code: 'basis_fallen' })
    await lead.post(`/api/v1/claims/${large.id}/reinstate`).send({ reason: 'it holds' }).expect(200)
    expect((await sign(lead, order)).body.state).toBe('signed')
    const certificate = await certificateAt(`/api/v1/claims/${order.id}/certificate`)
    expect(await hasValidSignature(certificate, await pemOf(certificate.signature!.keyId))).toBe(true)
  })
})
