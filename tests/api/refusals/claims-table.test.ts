import request from 'supertest'
import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../../server/app.ts'
import { change, selectOne } from '../../../server/db.ts'
import { Assignment } from '../../../server/models/assignment.ts'
import { Claim } from '../../../server/models/claim.ts'
import { Evidence } from '../../../server/models/evidence.ts'
import { Constant } from '../../../server/models/constant.ts'
import { Objection, ObjectionMessage } from '../../../server/models/objection.ts'
import type { PersonAct } from '../../../shared/claim-life.ts'
import type { ClaimState } from '../../../shared/schemas/claim.ts'
import { ACTS, EXPECTED, STATES, type Capacity } from '../../support/claim-life-table.ts'
import { draft, makeCast, type Cast } from '../../support/claims.ts'
import { browser, makeGroup, makeMember, PASSWORD, signedInAs, type Agent, type TestMember } from '../../support/people.ts'

/*
 * The same table as in tests/server/claim-life.test.ts, over HTTP: every act in every state by everybody who can stand in some way to a
 * claim. What is allowed leads to the expected state; everything else is refused and leaves the claim as it was.
 */

const app = createApp()

/** Everybody with what they may do to the claim of this test, and whether they may read it before it is in the register. */
const PEOPLE: Record<string, { roles: TestMember['roles']; group: 'own' | 'other'; assignment?: 'asked' | 'accepted' | 'declined' | 'objected'; capacities: Capacity[]; reads: boolean }> = {
  author: { roles: ['researcher'], group: 'own', capacities: ['author'], reads: true },
  colleague: { roles: ['researcher'], group: 'own', capacities: [], reads: true },
  lead: { roles: ['lead'], group: 'own', capacities: ['lead', 'lead without a part in it'], reads: true },
  'lead who is asked to referee': { roles: ['lead', 'referee'], group: 'own', assignment: 'asked', capacities: ['lead', 'referee who is asked'], reads: true },
  'lead who referees': { roles: ['lead', 'referee'], group: 'own', assignment: 'accepted', capacities: ['lead', 'referee who has accepted'], reads: true },
  'referee who is asked': { roles: ['referee'], group: 'own', assignment: 'asked', capacities: ['referee who is asked'], reads: true },
  referee: { roles: ['referee'], group: 'own', assignment: 'accepted', capacities: ['referee who has accepted'], reads: true },
  'referee of another group': { roles: ['referee'], group: 'other', assignment: 'accepted', capacities: ['referee who has accepted'], reads: true },
  'referee who objected': { roles: ['referee'], group: 'own', assignment: 'objected', capacities: ['referee who has accepted', 'referee who objected'], reads: true },
  'referee who declined': { roles: ['referee'], group: 'own', assignment: 'declined', capacities: [], reads: false },
  'referee who is not assigned': { roles: ['referee'], group: 'own', capacities: [], reads: false },
  'lead of another group': { roles: ['lead', 'researcher', 'referee'], group: 'other', capacities: [], reads: false },
  'researcher of another group': { roles: ['researcher'], group: 'other', capacities: [], reads: false },
}

let cast: Cast
const agents = new Map<string, Agent>()
const members = new Map<string, TestMember>()
const constants = new Map<ClaimState, Constant>()
let spare: TestMember

const ENTERED: readonly ClaimState[] = ['signed', 'superseded', 'suspended']

/** The run's own claim, to be given a place in a state without going all the way there. */
async function claimFor(state: ClaimState): Promise<Claim> {
  const constant = constants.get(state)
  const claim = await draft(cast.author, { lo: '1.20', hi: '1.30', ...(constant && { constant }) })
  if (!constant) {
    constants.set(state, await Constant.findByPk(claim.constantId, { rejectOnEmpty: true }))
    // What supersedes it, so that the register does not restore it.
    if (state === 'superseded') await place(await draft(cast.author, { lo: '1.24', hi: '1.25', constant: constants.get(state)! }), 'signed')
  }
  return place(claim, state)
}

async function place(claim: Claim, state: ClaimState): Promise<Claim> {
  if (state === 'draft') return claim
  const last = await selectOne<{ ordinal: number; narrower: string | null }>(
    `SELECT coalesce(max(ordinal), 0) AS ordinal, (SELECT id FROM claims WHERE constant_id = $id AND state = 'signed' LIMIT 1) AS narrower FROM claims WHERE constant_id = $id`,
    { id: claim.constantId },
  )
  const signature = ENTERED.includes(state) ? { signedAt: new Date(), signedBy: cast.lead.id } : {}
  return claim.update({ state, ordinal: last!.ordinal + 1, submittedAt: new Date(), ...signature, ...(state === 'superseded' && { supersededBy: last!.narrower }) })
}

interface Stage {
  claim: Claim
  evidence: string
  assignment: string
  objection: string
}

/** A claim in the state, with everybody in their part, and what the act is about: evidence, an assignment that waits, an objection. */
async function stage(state: ClaimState, act: PersonAct): Promise<Stage> {
  const claim = await claimFor(state)
  const content = Buffer.from('evidence')
  const evidence = await Evidence.create({ claimId: claim.id, name: 'a.txt', mediaType: 'text/plain', bytes: content.length, digest: 'e'.repeat(64), content, uploadedBy: cast.author.id })
  let assignment = ''
  let objection = ''
  for (const [name, { assignment: part }] of Object.entries(PEOPLE)) {
    if (part === undefined) continue
    const row = await Assignment.create({
      claimId: claim.id, refereeId: members.get(name)!.id, askedBy: cast.lead.id, state: part === 'objected' ? 'accepted' : part,
      ...(part !== 'asked' && { answeredAt: new Date() }), ...(part === 'declined' && { declineReason: 'no time' }),
    })
    if (part === 'asked') assignment = row.id
    const about = act === 'answer' ? 'open' : act === 'settle' || act === 'uphold' ? 'answered' : null
    if (part === 'objected' && about !== null) {
      const raised = await Objection.create({ claimId: claim.id, assignmentId: row.id, state: about })
      await ObjectionMessage.create({ objectionId: raised.id, authorId: members.get(name)!.id, text: 'why?' })
      objection = raised.id
    }
  }
  return { claim, evidence: evidence.id, assignment, objection: objection || claim.id }
}

type Requester = Pick<Agent, 'post' | 'patch' | 'delete' | 'put'>

/** The request by which somebody does an act. */
function ask(agent: Requester, act: PersonAct, { claim, evidence, assignment, objection }: Stage) {
  const at = `/api/v1/claims/${claim.id}`
  const { version } = claim
  const because = { reason: 'because' }
  const bodies: Partial<Record<PersonAct, object>> = {
    submit: { version }, assign: { refereeId: spare.id }, remind: { assignmentId: assignment }, decline: because, recheck: { method: 'transform', arithmetic: 'mpfr', digits: 5 },
    object: { text: 'why?' }, answer: { objectionId: objection, text: 'so' }, confirm: { version, remark: 'checked' }, return: because, resubmit: { version, remark: 'again' },
    sign: { version, password: PASSWORD }, suspend: because, reinstate: because, withdraw: because,
  }
  switch (act) {
    case 'edit':
      return agent.patch(at).send({ version, remark: 'clearer' })
    case 'delete':
      return agent.delete(at).send()
    case 'attach':
      return agent.post(`${at}/evidence`).attach('file', Buffer.from('more evidence'), 'b.txt')
    case 'detach':
      return agent.delete(`/api/v1/evidence/${evidence}`).send()
    case 'draft-verdict':
      return agent.put(`${at}/verdict-draft`).send({ text: 'so far' })
    case 'settle':
    case 'uphold':
      return agent.post(`${at}/settle`).send({ objectionId: objection, outcome: act === 'settle' ? 'settled' : 'upheld', text: '' })
    default:
      return agent.post(`${at}/${act}`).send(bodies[act] ?? {})
  }
}

const stateOf = async (claim: Claim): Promise<{ state: string; version: number } | 'gone'> => (await Claim.findByPk(claim.id, { attributes: ['state', 'version'], raw: true })) ?? 'gone'

beforeAll(async () => {
  cast = await makeCast()
  const other = await makeGroup()
  for (const [name, { roles, group }] of Object.entries(PEOPLE)) {
    const member = name === 'author' ? cast.author : await makeMember({ roles, group: group === 'own' ? cast.group : other })
    members.set(name, member)
    agents.set(name, await signedInAs(member, app))
  }
  spare = cast.secondReferee
})

describe.each(STATES)('in state %s', (state) => {
  it.each(ACTS)('%s', async (act) => {
    const { by, to } = EXPECTED[act]
    const target = to[state]
    let staged = await stage(state, act)
    const before = await stateOf(staged.claim)

    await ask(browser(app), act, staged).expect(401)
    const entered = ENTERED.includes(state)
    const capable = (name: string) => PEOPLE[name]!.capacities.some((capacity) => by.includes(capacity))
    const refused = Object.keys(PEOPLE).filter((name) => !capable(name) || target === undefined)
    await Promise.all(
      refused.map(async (name) => {
        const status = !PEOPLE[name]!.reads && !entered ? 404 : capable(name) ? 409 : 403
        const response = await ask(agents.get(name)!, act, staged)
        expect([name, response.status, response.type]).toEqual([name, status, 'application/problem+json'])
      }),
    )
    expect(await stateOf(staged.claim)).toEqual(before)

    for (const name of Object.keys(PEOPLE).filter((person) => capable(person) && target !== undefined)) {
      // No draft has referees; they were here only to be refused.
      if (act === 'delete') await Assignment.destroy({ where: { claimId: staged.claim.id } })
      const response = await ask(agents.get(name)!, act, staged)
      expect([name, response.status, response.status < 300 ? '' : response.text]).toEqual([name, expect.toSatisfy((code: number) => code >= 200 && code < 300), ''])
      const after = await stateOf(staged.claim)
      expect([name, act === 'delete' ? after : (after as { state: string }).state]).toEqual([name, act === 'delete' ? 'gone' : target])
      await change(`UPDATE runs SET state = 'stopped', finished_at = now() WHERE state = 'queued'`)
      staged = await stage(state, act)
    }
  }, 60_000)
})

it('lets nobody in without an account, whatever they ask', async () => {
  const { claim } = await stage('in-review', 'confirm')
  for (const path of [`/claims/${claim.id}`, `/claims/${claim.id}/certificate`, '/desk']) await request(app).get(`/api/v1${path}`).expect(401)
})
