import request from 'supertest'
import { expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { repeatCertificate } from '../../shared/engine/certificate/repeat.ts'
import { hasValidSignature } from '../../shared/engine/certificate/signature.ts'
import type { Claim } from '../../shared/schemas/claim.ts'
import { makeCast } from '../support/claims.ts'
import { PASSWORD, signedInAs, type Agent } from '../support/people.ts'
import { SHORT, startRun, until, untilState } from './run-helpers.ts'
import { startWorkerProcess } from './worker-process.ts'

it('a claim goes from a run through a recheck by the other arithmetic to a certificate that repeats', async () => {
  const app = createApp()
  await startWorkerProcess()
  const cast = await makeCast()
  const [author, lead, referee, signer] = (await Promise.all([cast.author, cast.lead, cast.referee, cast.secondLead].map((member) => signedInAs(member, app)))) as [Agent, Agent, Agent, Agent]

  const runId = await startRun(author, SHORT)
  await untilState(author, runId, 'done')
  const { id } = (await author.post('/api/v1/claims').send({ kind: 'enclosure', runId }).expect(201)).body as Claim
  const act = async (agent: Agent, name: string, body: object = {}): Promise<Claim> => (await agent.post(`/api/v1/claims/${id}/${name}`).send(body).expect(200)).body
  await act(author, 'submit', { version: 1 })
  await act(lead, 'assign', { refereeId: cast.referee.id })
  await act(referee, 'accept')
  await act(referee, 'recheck', { method: 'transform', arithmetic: 'mpfr' })
  const { version } = (await referee.get(`/api/v1/claims/${id}`)).body as Claim
  await act(referee, 'confirm', { version, remark: 'Both arithmetics agree.' })

  const endorsed = await until('the recheck completes the review', async () => {
    const claim = (await signer.get(`/api/v1/claims/${id}`).expect(200)).body as Claim
    return claim.state === 'endorsed' && claim
  })
  expect(endorsed.rechecks).toMatchObject([{ state: 'done', arithmetic: 'mpfr', verdict: 'meets', independent: true }])
  // 1.6366…: Forum Math. Pi 11 (2023) e18, p. 2.
  const digits = (await referee.post('/api/v1/digit-checks').send({ against: { claim: id }, text: '1.6366\\ldots', reading: 'truncated' }).expect(200)).body
  expect(digits.whole).toBe('confirmed')

  const signed = await act(signer, 'sign', { version: endorsed.version, password: PASSWORD })
  expect(signed).toMatchObject({ state: 'signed', number: expect.stringMatching(/^MST-\d{4}\/1$/) })
  const certificate = JSON.parse((await request(app).get(`/api/v1/claims/${signed.number!.replace('/', '-')}/certificate`).expect(200)).text)
  const { items } = (await request(app).get('/api/v1/keys').expect(200)).body
  expect(await hasValidSignature(certificate, items[0].pem)).toBe(true)
  expect(await repeatCertificate(certificate)).toMatchObject({ intact: true, repeats: true, findings: [] })
}, 180_000)
