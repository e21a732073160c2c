import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { makeGroup, makeMember, PASSWORD, signedInAs, type Agent, type TestGroup, type TestMember } from '../support/people.ts'
import { series } from '../support/register.ts'
import { startRun } from '../jobs/run-helpers.ts'

const app = createApp()
const server = app.listen(0, '127.0.0.1')
afterAll(() => server.close())
const base = () => `http://127.0.0.1:${(server.address() as AddressInfo).port}/api/v1`
const OURS = { 'Content-Type': 'application/json', 'X-Merestone': '1' }

let group: TestGroup
let colleague: Agent
/** A run that waits: no worker is there to take it, so that its stream has no end of its own. */
let run: string

beforeAll(async () => {
  group = await makeGroup()
  colleague = await signedInAs(await makeMember({ group, roles: ['researcher', 'lead'] }), app)
  run = await startRun(colleague, { definition: series({ kind: 'primes' }), goal: { digits: 12 } })
})

async function cookieOf({ email }: TestMember): Promise<string> {
  const session = await fetch(`${base()}/session`, { method: 'POST', headers: OURS, body: JSON.stringify({ email, password: PASSWORD }) })
  return session.headers.getSetCookie().map((one) => one.split(';')[0]).join('; ')
}

/** Follows the run; `rest` is everything that is heard after the first event, once the server has ended the stream. */
async function follow(headers: Record<string, string>): Promise<{ rest: Promise<string> }> {
  const stream = await fetch(`${base()}/runs/${run}/events`, { headers, signal: AbortSignal.timeout(20_000) })
  expect(stream.status).toBe(200)
  const reader = stream.body!.pipeThrough(new TextDecoderStream()).getReader()
  for (let heard = ''; !heard.includes('"state":"queued"'); ) heard += (await reader.read()).value ?? ''
  const drain = async (heard: string): Promise<string> => {
    const { done, value } = await reader.read()
    return done ? heard : drain(heard + value)
  }
  return { rest: drain('') }
}

describe('the stream of a run ends, and tells nothing more,', () => {
  it('when its reader signs out', async () => {
    const cookie = await cookieOf(await makeMember({ group }))
    const { rest } = await follow({ cookie })
    await fetch(`${base()}/session`, { method: 'DELETE', headers: { ...OURS, cookie } })
    await colleague.post(`/api/v1/runs/${run}/stop`).expect(200)
    expect(await rest).not.toContain('"state"')
    await colleague.post(`/api/v1/runs/${run}/resume`).expect(200)
  })

  it('when the membership ends', async () => {
    const member = await makeMember({ group })
    const { rest } = await follow({ cookie: await cookieOf(member) })
    await colleague.delete(`/api/v1/group/members/${member.id}`).expect(204)
    expect(await rest).not.toContain('"state"')
  })

  it('when the access token is revoked', async () => {
    const agent = await signedInAs(await makeMember({ group }), app)
    const { id, token } = (await agent.post('/api/v1/access-tokens').send({ name: 'watch', scopes: ['read'], days: 1 }).expect(201)).body
    const { rest } = await follow({ authorization: `Bearer ${token}` })
    await agent.delete(`/api/v1/access-tokens/${id}`).expect(204)
    expect(await rest).not.toContain('"state"')
  })

  it('and goes on for whoever is still signed in', async () => {
    const { rest } = await follow({ cookie: await cookieOf(await makeMember({ group })) })
    await colleague.post(`/api/v1/runs/${run}/stop`).expect(200)
    expect(await rest).toContain('"state":"stopped"')
  })
})
