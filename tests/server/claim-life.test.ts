import { describe, expect, it } from 'vitest'
import { consequence, judge, judgeRegister, leadsTo, LIFE, missingForEndorsement, PERSON_ACTS, type Facts, type PersonAct, type RegisterAct, type Standing } from '../../shared/claim-life.ts'
import { ROLES, type Role } from '../../shared/permissions.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { ACTS, EXPECTED, STATES, type Capacity } from '../support/claim-life-table.ts'

const NEUTRAL: Facts = {
  unanswered: 0, unsettled: 0, ownUnsettled: 0, ownConfirmed: false, activeReferees: 2, confirmations: 0, confirmationsNeeded: 1,
  recheckNeeded: true, recheckMeets: false, recheckDisjoint: false, contradicted: false, narrowerSigned: false, estimateInDoubt: false,
}
/** Facts in which the act finds what it is about: the objection that is answered or settled. */
const factsFor = (act: PersonAct, own: boolean): Facts => {
  if (act === 'answer') return { ...NEUTRAL, unanswered: 1, unsettled: 1, objection: { state: 'open', own, refereeGone: false } }
  if (act === 'settle' || act === 'uphold') return { ...NEUTRAL, unsettled: 1, objection: { state: 'answered', own, refereeGone: false } }
  return NEUTRAL
}

const subsets: Role[][] = Array.from({ length: 8 }, (_, bits) => ROLES.filter((_role, index) => bits & (1 << index)))
const yesNo = [true, false]
const standings: Standing[] = subsets.flatMap((roles) =>
  yesNo.flatMap((sameGroup) => yesNo.flatMap((author) => yesNo.flatMap((everReferee) => (['none', 'asked', 'accepted', 'declined'] as const).map((assignment) => ({ roles, sameGroup, author, everReferee, assignment }))))),
)

/** The permission table and the two rules on one's own claim, once more in words of their own. */
function capacities({ roles, sameGroup, author, assignment, everReferee }: Standing): Capacity[] {
  const found: Capacity[] = []
  if (author && (roles.includes('researcher') || roles.includes('lead'))) found.push('author')
  if (sameGroup && roles.includes('lead')) found.push('lead')
  if (sameGroup && roles.includes('lead') && !author && !everReferee && assignment !== 'asked' && assignment !== 'accepted') found.push('lead without a part in it')
  if (roles.includes('referee') && !author && assignment === 'asked') found.push('referee who is asked')
  if (roles.includes('referee') && !author && assignment === 'accepted') found.push('referee who has accepted', 'referee who objected')
  return found
}

describe('the life of a claim', () => {
  it('knows the acts that the expectation lists, and no other', () => expect([...PERSON_ACTS].sort()).toEqual([...ACTS].sort()))

  it.each(STATES)('in state %s allows exactly the expected acts, to everybody who may do them and to nobody else', (state) => {
    for (const act of ACTS) {
      for (const standing of standings) {
        const { by, to } = EXPECTED[act]
        const capable = capacities(standing).some((capacity) => by.includes(capacity))
        const target = capable ? to[state] : undefined
        const judgement = judge(act, state, standing, factsFor(act, true))
        const got = judgement.allowed ? judgement.to : undefined
        expect(got, `${act} in ${state} by ${JSON.stringify(standing)}`).toBe(target)
        if (!judgement.allowed) expect(judgement.why).toBe(capable ? 'not-now' : 'not-theirs')
      }
    }
  })

  it('allows nothing to a reader without account', () => {
    for (const act of ACTS) for (const state of STATES) expect(judge(act, state, undefined, factsFor(act, true)).allowed).toBe(false)
  })
})

const referee: Standing = { roles: ['referee'], sameGroup: false, author: false, assignment: 'accepted', everReferee: true }
const lead: Standing = { roles: ['lead'], sameGroup: true, author: false, assignment: 'none', everReferee: false }
const author: Standing = { roles: ['researcher'], sameGroup: true, author: true, assignment: 'none', everReferee: false }
const code = (act: PersonAct, state: ClaimState, standing: Standing, facts: Partial<Facts>) => {
  const judgement = judge(act, state, standing, { ...NEUTRAL, ...facts })
  return judgement.allowed ? 'allowed' : judgement.code
}

describe('conditions', () => {
  it.each<[string, PersonAct, ClaimState, Standing, Partial<Facts>, string]>([
    ['resubmitting with an open objection', 'resubmit', 'returned', author, { unanswered: 1 }, 'objection_unanswered'],
    ['confirming with an objection of one’s own', 'confirm', 'in-review', referee, { ownUnsettled: 1 }, 'own_objection_open'],
    ['confirming twice', 'confirm', 'in-review', referee, { ownConfirmed: true }, 'already_confirmed'],
    ['declining after confirming', 'decline', 'in-review', referee, { ownConfirmed: true }, 'already_confirmed'],
    ['signing what is contradicted', 'sign', 'endorsed', lead, { contradicted: true }, 'in_conflict'],
    ['reinstating what is contradicted', 'reinstate', 'suspended', lead, { contradicted: true }, 'in_conflict'],
    ['settling an objection of another', 'settle', 'in-review', referee, { objection: { state: 'answered', own: false, refereeGone: true } }, 'objection_of_another'],
    ['settling before the answer', 'settle', 'returned', referee, { objection: { state: 'open', own: true, refereeGone: false } }, 'objection_not_answered'],
    ['answering twice', 'answer', 'returned', author, { objection: { state: 'answered', own: false, refereeGone: false } }, 'objection_answered'],
    ['answering what was upheld', 'answer', 'returned', author, { objection: { state: 'upheld', own: false, refereeGone: false } }, 'allowed'],
    ['a lead settling for a referee at work', 'settle', 'in-review', lead, { objection: { state: 'answered', own: false, refereeGone: false } }, 'objection_of_another'],
    ['a lead settling for a referee who has left', 'settle', 'in-review', lead, { objection: { state: 'answered', own: false, refereeGone: true } }, 'allowed'],
    ['reminding who owes nothing', 'remind', 'in-review', lead, { assignmentWaits: false }, 'nothing_to_remind'],
    ['signing one’s own', 'sign', 'endorsed', { ...lead, author: true }, {}, 'own_claim'],
    ['signing what one refereed', 'sign', 'endorsed', { ...lead, everReferee: true }, {}, 'own_review'],
    ['refereeing one’s own', 'confirm', 'in-review', { ...referee, author: true }, {}, 'own_claim'],
    ['confirming before accepting', 'confirm', 'in-review', { ...referee, assignment: 'asked' }, {}, 'not_accepted'],
    ['confirming a signed claim', 'confirm', 'signed', referee, {}, 'wrong_state'],
  ])('%s', (_name, act, state, standing, facts, expected) => expect(code(act, state, standing, facts)).toBe(expected))
})

describe('what follows by itself', () => {
  const complete: Facts = { ...NEUTRAL, confirmations: 1, recheckMeets: true }

  it('endorses when confirmations and a recheck are there and nothing is open', () => {
    expect(consequence('in-review', complete)).toBe('endorse')
    expect(consequence('in-review', { ...complete, recheckMeets: false, recheckNeeded: false })).toBe('endorse')
  })

  it.each<[string, Partial<Facts>, string]>([
    ['a confirmation', { confirmations: 1, confirmationsNeeded: 2 }, 'confirmation'],
    ['an objection', { unsettled: 1 }, 'objection'],
    ['the recheck', { recheckMeets: false }, 'recheck'],
    ['a recheck that does not meet', { recheckDisjoint: true }, 'recheck-disjoint'],
    ['an estimate that is in doubt', { estimateInDoubt: true }, 'estimate'],
  ])('waits for %s', (_name, facts, missing) => {
    expect(consequence('in-review', { ...complete, ...facts })).toBeUndefined()
    expect(missingForEndorsement({ ...complete, ...facts })).toEqual([missing])
  })

  it('puts a claim back when no referee is left, and endorses nothing outside review', () => {
    expect(consequence('in-review', { ...NEUTRAL, activeReferees: 0 })).toBe('await-referee')
    for (const state of STATES.filter((other) => other !== 'in-review')) expect(consequence(state, { ...complete, activeReferees: 0 })).toBeUndefined()
  })

  it.each<[RegisterAct, ClaimState, ClaimState, Facts]>([
    ['endorse', 'in-review', 'endorsed', complete],
    ['await-referee', 'in-review', 'submitted', { ...NEUTRAL, activeReferees: 0 }],
    ['supersede', 'signed', 'superseded', { ...NEUTRAL, narrowerSigned: true }],
    ['restore', 'superseded', 'signed', NEUTRAL],
  ])('%s leads from %s to %s and from nowhere else', (act, from, to, facts) => {
    for (const state of STATES) {
      const judgement = judgeRegister(act, state, facts)
      expect(judgement.allowed ? judgement.to : undefined).toBe(state === from ? to : undefined)
      expect(leadsTo(act, state)).toBe(state === from ? to : undefined)
    }
  })

  it('has one target for each act in each state, whoever does it', () => {
    for (const { act, moves } of LIFE) for (const [from, to] of Object.entries(moves)) expect(leadsTo(act, from as ClaimState)).toBe(to)
  })
})
