import { randomUUID } from 'node:crypto'
import { acceptReview, assignReferee, confirmClaim } from '../../server/commands/assignment.ts'
import { reconsiderClaim } from '../../server/commands/claim-consequences.ts'
import { returnClaim, signClaim, suspendClaim, withdrawClaim } from '../../server/commands/claim-decisions.ts'
import { draftClaim, submitClaim } from '../../server/commands/claim.ts'
import { inTransaction } from '../../server/db.ts'
import type { SignedInMember } from '../../server/middleware/request.ts'
import { Claim } from '../../server/models/claim.ts'
import { Constant } from '../../server/models/constant.ts'
import { Run } from '../../server/models/run.ts'
import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import { makeCertificate } from '../../shared/engine/certificate/certificate.ts'
import { canonicalJson } from '../../server/audit/canonical.ts'
import type { ArithmeticName, Method, Outcome } from '../../shared/engine/methods/computation.ts'
import { digitsOf } from '../../shared/intersection.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { makeConstant, series } from './register.ts'
import { makeGroup, makeMember, PASSWORD, type TestGroup, type TestMember } from './people.ts'

/** A member as requests carry them. */
export const acting = (member: TestMember): SignedInMember => ({ ...member, groupName: '', via: { kind: 'session', sessionId: randomUUID() } })

/** People of one group, enough to take a claim through its life, and some who have no part in it. */
export interface Cast {
  group: TestGroup
  author: TestMember
  colleague: TestMember
  lead: TestMember
  secondLead: TestMember
  referee: TestMember
  secondReferee: TestMember
}

export async function makeCast(rules: Record<string, unknown> = {}): Promise<Cast> {
  const group = await makeGroup(rules)
  const [author, colleague, lead, secondLead, referee, secondReferee] = await Promise.all([
    makeMember({ group, roles: ['researcher'] }),
    makeMember({ group, roles: ['researcher'] }),
    makeMember({ group, roles: ['lead'] }),
    makeMember({ group, roles: ['lead'] }),
    makeMember({ group, roles: ['referee'] }),
    makeMember({ group, roles: ['referee'] }),
  ])
  return { group, author: author!, colleague: colleague!, lead: lead!, secondLead: secondLead!, referee: referee!, secondReferee: secondReferee! }
}

let hundredths = 100

/** A constant that no other test of this file uses: the sum of n^-s (log n)^-1 over the primes for the next s. */
export async function freshConstant(member: TestMember): Promise<Constant> {
  hundredths += 1
  return makeConstant(member, series({ kind: 'primes' }, { power: `${hundredths}/100` }))
}

interface RunShape {
  lo: string
  hi: string
  method?: Method
  arithmetic?: ArithmeticName
  claimId?: string
  /** Ids of the estimates that it rests on; a partial sum rests on one if none is named. */
  estimates?: readonly string[]
}

/** A run that is done, as the worker leaves it, with an enclosure of the test's choice. */
export async function finishedRun(member: TestMember, constant: Constant, { lo, hi, method = 'transform', arithmetic = 'ball', claimId, estimates = method === 'partial-sum' ? ['dusart-theta'] : [] }: RunShape): Promise<Run> {
  const goal = method === 'partial-sum' ? { cutoff: '1000' } : { digits: 10 }
  const outcome: Outcome = {
    definition: constant.definition, enclosure: { lo, hi }, radius: '5.0e-4', digits: digitsOf({ lo, hi }), method, arithmetic, goal, parameters: { bits: 128 },
    budget: [{ source: 'rounding', bound: 'R-1', magnitude: '1.0e-20' }],
    estimates: estimates.map((id) => ({ id, usedAt: 'x >= 1000', validFor: 'x >= 2', conditional: false })),
    convergence: [],
  }
  const certificate = await makeCertificate(outcome, { version: 'test', digest: '0'.repeat(64) })
  const request = { definitions: [constant.definition], method, arithmetic, goal }
  return Run.create({
    constantId: constant.id, groupId: member.groupId, startedBy: member.id, method, arithmetic, goal, outcome, request: canonicalJson(request), requestKey: randomUUID(),
    estimates: [...estimates], state: 'done', progress: '1', certificate: canonicalJson(certificate), certificateDigest: certificate.digest, finishedAt: new Date(),
    ...(claimId !== undefined && { purpose: 'recheck' as const, claimId }),
  })
}

/** A referee's recheck of a claim that is done, with what follows from it. */
export async function finishedRecheck(referee: TestMember, claim: Claim, shape: RunShape): Promise<Run> {
  const constant = await Constant.findByPk(claim.constantId, { rejectOnEmpty: true })
  const run = await finishedRun({ ...referee, groupId: claim.groupId }, constant, { ...shape, claimId: claim.id })
  await inTransaction((transaction) => reconsiderClaim(transaction, claim.id))
  return run
}

export const reload = (claim: { id: string }): Promise<Claim> => Claim.findByPk(claim.id, { rejectOnEmpty: true })

/** A draft of an enclosure from a run, or of a value from elsewhere where `stated`. */
export async function draft(author: TestMember, { lo = '1.25', hi = '1.26', constant, stated = false, estimates }: { lo?: string; hi?: string; constant?: Constant; stated?: boolean; estimates?: readonly string[] } = {}): Promise<Claim> {
  const of = constant ?? (await freshConstant(author))
  if (stated) return draftClaim(acting(author), { kind: 'stated', constant: constantNumberText(of.number), value: { lo, hi }, source: 'J. Tests 1 (2020), Table 1', remark: '' })
  const run = await finishedRun(author, of, { lo, hi, ...(estimates && { method: 'partial-sum', estimates }) })
  return draftClaim(acting(author), { kind: 'enclosure', runId: run.id, remark: '' })
}

/** Takes a draft along the shortest way to a state, by the acts of its people. */
export async function takeTo(state: ClaimState, claim: Claim, cast: Cast): Promise<Claim> {
  const { author, lead, secondLead, referee } = cast
  const now = async () => reload(claim)
  if (state === 'draft') return now()
  await submitClaim(acting(author), claim.id, (await now()).version)
  if (state === 'submitted') return now()
  if (state === 'withdrawn') {
    await withdrawClaim(acting(lead), claim.id, { reason: 'a mistake' })
    return now()
  }
  await assignReferee(acting(lead), claim.id, { refereeId: referee.id, note: '' })
  await acceptReview(acting(referee), claim.id)
  if (state === 'in-review') return now()
  if (state === 'returned') {
    await returnClaim(acting(lead), claim.id, { reason: 'say more' })
    return now()
  }
  const { lo, hi, kind } = await now()
  if (kind === 'enclosure') await finishedRecheck(referee, claim, { lo: lo!, hi: hi!, arithmetic: 'mpfr' })
  await confirmClaim(acting(referee), claim.id, { version: (await now()).version, remark: 'checked', checklist: [] })
  if (state === 'endorsed') return now()
  await signClaim(acting(secondLead), claim.id, { version: (await now()).version, password: PASSWORD }, '127.0.0.1')
  if (state === 'signed') return now()
  if (state === 'suspended') await suspendClaim(acting(lead), claim.id, { reason: 'in doubt' })
  if (state === 'superseded') {
    const { lo: low, constantId } = await now()
    const constant = await Constant.findByPk(constantId, { rejectOnEmpty: true })
    await takeTo('signed', await draft(author, { lo: low!, hi: low!, constant }), cast)
  }
  return now()
}

/** A claim in a state, of people made for it or given. */
export async function claimIn(state: ClaimState, cast: Cast, shape: Parameters<typeof draft>[1] = {}): Promise<Claim> {
  return takeTo(state, await draft(cast.author, shape), cast)
}

/** MST-0042/1 */
export async function numberOf(claim: Claim): Promise<string> {
  const constant = await Constant.findByPk(claim.constantId, { rejectOnEmpty: true })
  return claimNumberText(constant.number, claim.ordinal ?? 0)
}

