import { hasRight, type Role } from './permissions.ts'
import type { ClaimState } from './schemas/claim.ts'

/**
 * The life of a claim: which act, by whom, in which state, leads where. The server asks `judge` on the loaded row before every
 * act; the client and the audit replay read the same table. Nothing here knows the database or the clock.
 */

/** What a person can do to a claim. `settle` and `uphold` are the two answers to an answered objection. */
export type PersonAct =
  | 'edit' | 'delete' | 'attach' | 'detach' | 'submit' | 'answer' | 'resubmit'
  | 'assign' | 'remind' | 'return' | 'sign' | 'suspend' | 'reinstate' | 'withdraw'
  | 'accept' | 'decline' | 'recheck' | 'draft-verdict' | 'object' | 'settle' | 'uphold' | 'confirm'

/** What follows by itself from a person's act or from a run that finished. */
export type RegisterAct = 'endorse' | 'await-referee' | 'supersede' | 'restore'
export type LifeAct = PersonAct | RegisterAct

/** In what capacity somebody acts on a claim. One person can stand in several, e.g. as author and as lead. */
export type Party =
  /** Whoever registered it, while they may do research. */
  | 'author'
  /** Asked to referee, no answer yet. */
  | 'asked'
  /** Accepted to referee. */
  | 'referee'
  /** Lead of the claim's group. */
  | 'lead'
  /** Lead of the claim's group who is neither its author nor was ever its referee. */
  | 'signatory'
  /** The register itself. */
  | 'register'

/** Facts of a claim's review that conditions look at. */
export interface Facts {
  /** Objections that wait for the author: open, or upheld after an answer. */
  unanswered: number
  /** Objections of anybody that are not settled. */
  unsettled: number
  /** Objections of the person who acts that are not settled. */
  ownUnsettled: number
  /** Whether the person who acts has confirmed the claim as it now stands. */
  ownConfirmed: boolean
  /** Referees who were asked or have accepted. */
  activeReferees: number
  /** Confirmations of the claim as it now stands, by referees without an unsettled objection. */
  confirmations: number
  confirmationsNeeded: number
  /** Whether this claim needs a recheck: a computed enclosure in a group that asks for one. */
  recheckNeeded: boolean
  /** A recheck by other arithmetic or another method meets the claimed enclosure. */
  recheckMeets: boolean
  /** A finished recheck does not meet it: one of the two enclosures is wrong. */
  recheckDisjoint: boolean
  /** In conflict with a claim that is signed or superseded. */
  contradicted: boolean
  /** A narrower enclosure of the same constant is signed. */
  narrowerSigned: boolean
  /** The claim's group holds a published estimate in doubt that the claim rests on. */
  estimateInDoubt: boolean
  /** The objection that an act is about, if it is about one. */
  objection?: { state: 'open' | 'answered' | 'settled' | 'upheld'; own: boolean; refereeGone: boolean }
  /** Whether the assignment that an act is about still waits for its referee. */
  assignmentWaits?: boolean
}

interface ConditionText {
  holds: (facts: Facts) => boolean
  code: string
  says: string
  /** It is about who acts and not about when: nothing to wait for. */
  personal?: true
}

/** Conditions beside party and state, with what to tell whoever does not meet them. */
const CONDITIONS = {
  'all-answered': { holds: (f) => f.unanswered === 0, code: 'objection_unanswered', says: 'An objection waits for an answer. Answer each one, then resubmit.' },
  'own-objection-settled': { holds: (f) => f.ownUnsettled === 0, code: 'own_objection_open', says: 'Your own objection is not settled. Settle it before you confirm.' },
  'not-confirmed-yet': { holds: (f) => !f.ownConfirmed, code: 'already_confirmed', says: 'You have confirmed this claim as it stands.' },
  'awaits-answer': { holds: (f) => f.objection === undefined || f.objection.state === 'open' || f.objection.state === 'upheld', code: 'objection_answered', says: 'This objection is answered or settled.' },
  'is-answered': { holds: (f) => f.objection === undefined || f.objection.state === 'answered', code: 'objection_not_answered', says: 'Only an objection that the author has answered can be settled or upheld.' },
  'own-objection': { holds: (f) => f.objection === undefined || f.objection.own, code: 'objection_of_another', says: 'Whoever raised an objection settles it.', personal: true },
  'referee-gone': { holds: (f) => f.objection === undefined || f.objection.refereeGone, code: 'objection_of_another', says: 'Whoever raised an objection settles it; a lead does so only where that referee has left the review.', personal: true },
  'assignment-waits': { holds: (f) => f.assignmentWaits !== false, code: 'nothing_to_remind', says: 'This referee has nothing to do at present.' },
  'not-contradicted': { holds: (f) => !f.contradicted, code: 'in_conflict', says: 'A signed enclosure of this constant does not meet this one. Suspend or withdraw one of the two first.' },
  'not-in-doubt': { holds: (f) => !f.estimateInDoubt, code: 'estimate_in_doubt', says: 'An estimate that this claim rests on is in doubt in its group. Lift the doubt first, or put the claim on a run without that estimate.' },
  complete: { holds: (f) => missingForEndorsement(f).length === 0, code: 'review_incomplete', says: 'The review is not complete.' },
  'nobody-left': { holds: (f) => f.activeReferees === 0, code: 'referees_left', says: 'A referee is at work.' },
  'narrower-signed': { holds: (f) => f.narrowerSigned, code: 'none_narrower', says: 'No narrower enclosure is signed.' },
  'none-narrower': { holds: (f) => !f.narrowerSigned, code: 'narrower_signed', says: 'A narrower enclosure is signed.' },
} as const satisfies Record<string, ConditionText>
type Condition = keyof typeof CONDITIONS

/** One row of the table: an act, who may do it, and from which state it leads to which. */
export interface Move {
  act: LifeAct
  by: Party
  moves: Partial<Record<ClaimState, ClaimState>>
  when?: readonly Condition[]
}

const stays = (...states: ClaimState[]): Move['moves'] => Object.fromEntries(states.map((state) => [state, state]))
const to = (target: ClaimState, ...from: ClaimState[]): Move['moves'] => Object.fromEntries(from.map((state) => [state, target]))

/** The life of a claim. What is not here is not allowed. */
export const LIFE: readonly Move[] = [
  { act: 'edit', by: 'author', moves: stays('draft', 'returned') },
  { act: 'delete', by: 'author', moves: stays('draft') },
  { act: 'attach', by: 'author', moves: stays('draft', 'returned') },
  { act: 'detach', by: 'author', moves: stays('draft') },
  { act: 'submit', by: 'author', moves: to('submitted', 'draft') },
  { act: 'answer', by: 'author', moves: stays('returned'), when: ['awaits-answer'] },
  { act: 'resubmit', by: 'author', moves: to('in-review', 'returned'), when: ['all-answered'] },

  { act: 'assign', by: 'lead', moves: { ...to('in-review', 'submitted'), ...stays('in-review', 'returned', 'endorsed') } },
  { act: 'remind', by: 'lead', moves: stays('in-review', 'returned', 'endorsed'), when: ['assignment-waits'] },
  { act: 'return', by: 'lead', moves: to('returned', 'submitted', 'in-review', 'endorsed') },
  { act: 'sign', by: 'signatory', moves: to('signed', 'endorsed'), when: ['not-in-doubt', 'not-contradicted'] },
  { act: 'suspend', by: 'lead', moves: to('suspended', 'signed', 'superseded') },
  { act: 'reinstate', by: 'lead', moves: to('signed', 'suspended'), when: ['not-in-doubt', 'not-contradicted'] },
  { act: 'withdraw', by: 'lead', moves: to('withdrawn', 'submitted', 'in-review', 'returned', 'endorsed', 'signed', 'superseded', 'suspended') },
  { act: 'settle', by: 'lead', moves: stays('in-review', 'returned'), when: ['referee-gone', 'is-answered'] },

  { act: 'accept', by: 'asked', moves: stays('in-review', 'returned', 'endorsed') },
  { act: 'decline', by: 'asked', moves: stays('in-review', 'returned', 'endorsed') },
  { act: 'decline', by: 'referee', moves: stays('in-review', 'returned', 'endorsed'), when: ['not-confirmed-yet'] },
  { act: 'recheck', by: 'referee', moves: stays('in-review', 'returned', 'endorsed') },
  { act: 'draft-verdict', by: 'referee', moves: stays('in-review', 'returned', 'endorsed') },
  { act: 'object', by: 'referee', moves: to('returned', 'in-review', 'endorsed') },
  { act: 'settle', by: 'referee', moves: stays('in-review', 'returned'), when: ['own-objection', 'is-answered'] },
  { act: 'uphold', by: 'referee', moves: to('returned', 'in-review', 'returned'), when: ['own-objection', 'is-answered'] },
  { act: 'confirm', by: 'referee', moves: stays('in-review', 'endorsed'), when: ['own-objection-settled', 'not-confirmed-yet'] },

  { act: 'endorse', by: 'register', moves: to('endorsed', 'in-review'), when: ['complete'] },
  { act: 'await-referee', by: 'register', moves: to('submitted', 'in-review'), when: ['nobody-left'] },
  { act: 'supersede', by: 'register', moves: to('superseded', 'signed'), when: ['narrower-signed'] },
  { act: 'restore', by: 'register', moves: to('signed', 'superseded'), when: ['none-narrower'] },
]

/** How a person stands to a claim. */
export interface Standing {
  roles: readonly Role[]
  /** Member of the claim's group. */
  sameGroup: boolean
  author: boolean
  /** Their present part in the review. */
  assignment: 'none' | 'asked' | 'accepted' | 'declined'
  /** Whether they ever gave a verdict or accepted to. */
  everReferee: boolean
}

/** Every party that a person stands for; the rules about one's own claim and one's own review are here and nowhere else. */
export function partiesOf(standing: Standing): Party[] {
  const leads = standing.sameGroup && hasRight(standing.roles, 'claims.decide')
  const referees = hasRight(standing.roles, 'referee') && !standing.author
  const reviewed = standing.everReferee || standing.assignment === 'asked' || standing.assignment === 'accepted'
  const parties: [Party, boolean][] = [
    ['author', standing.author && hasRight(standing.roles, 'research')],
    ['asked', referees && standing.assignment === 'asked'],
    ['referee', referees && standing.assignment === 'accepted'],
    ['lead', leads],
    ['signatory', leads && !standing.author && !reviewed],
  ]
  return parties.filter(([, holds]) => holds).map(([party]) => party)
}

/** What is still missing before a claim in review is endorsed. */
export function missingForEndorsement(facts: Facts): ('confirmation' | 'objection' | 'recheck' | 'recheck-disjoint' | 'estimate')[] {
  const missing: ReturnType<typeof missingForEndorsement> = []
  if (facts.confirmations < facts.confirmationsNeeded) missing.push('confirmation')
  if (facts.unsettled > 0) missing.push('objection')
  if (facts.recheckNeeded && !facts.recheckMeets) missing.push('recheck')
  if (facts.recheckDisjoint) missing.push('recheck-disjoint')
  if (facts.estimateInDoubt) missing.push('estimate')
  return missing
}

/** `not-theirs`: nobody in this capacity may ever do this; `not-now`: the state or a condition is in the way. */
export type Judgement =
  | { allowed: true; party: Party; to: ClaimState }
  | { allowed: false; why: 'not-theirs' | 'not-now'; code: string; says: string }

const refusal = (why: 'not-theirs' | 'not-now', code: string, says: string): Judgement => ({ allowed: false, why, code, says })

/** What keeps somebody who lacks the capacity from an act, told as precisely as the rules do. */
function notTheirs(act: LifeAct, standing: Standing | undefined): Judgement {
  const reviewing = ['accept', 'decline', 'recheck', 'draft-verdict', 'object', 'settle', 'uphold', 'confirm'].includes(act)
  if (reviewing && standing?.author) return refusal('not-theirs', 'own_claim', 'Nobody referees a claim of their own.')
  if (act === 'sign' && standing?.author) return refusal('not-theirs', 'own_claim', 'Nobody signs a claim of their own. Another lead of the group has to.')
  if (act === 'sign' && standing && standing.sameGroup && hasRight(standing.roles, 'claims.decide')) {
    return refusal('not-theirs', 'own_review', 'A referee of a claim does not sign it. Another lead of the group has to.')
  }
  if (act === 'confirm' || act === 'object' || act === 'recheck') {
    if (standing?.assignment === 'asked') return refusal('not-theirs', 'not_accepted', 'Accept the review first.')
  }
  if (reviewing) return refusal('not-theirs', 'not_assigned', 'Only a referee who is assigned to this claim may do this.')
  const authors = LIFE.some((move) => move.act === act && move.by === 'author')
  return authors
    ? refusal('not-theirs', 'not_author', 'Only its author may do this.')
    : refusal('not-theirs', 'role_needed', 'Only a lead of the claim’s group may do this.')
}

/** Why an act that a party may do in some state is not possible in this one. */
function wrongState(act: LifeAct, state: ClaimState): Judgement {
  return refusal('not-now', 'wrong_state', `A claim that is ${state === 'draft' ? 'still a draft' : stateWord(state)} can’t be ${PAST[act]}.`)
}

/** Participles for messages: a claim "can't be …". */
const PAST: Record<LifeAct, string> = {
  edit: 'edited', delete: 'deleted', attach: 'given more evidence', detach: 'stripped of evidence', submit: 'submitted', answer: 'answered for',
  resubmit: 'resubmitted', assign: 'given to a referee', remind: 'brought to mind', return: 'returned', sign: 'signed', suspend: 'suspended',
  reinstate: 'reinstated', withdraw: 'withdrawn', accept: 'accepted for review', decline: 'declined for review', recheck: 'rechecked',
  'draft-verdict': 'judged', object: 'objected to', settle: 'freed of an objection', uphold: 'held under an objection', confirm: 'confirmed',
  endorse: 'endorsed', 'await-referee': 'put back', supersede: 'superseded', restore: 'restored',
}

/** What an act makes of a claim, for a sentence: "signed", "returned"; undefined for what is no act of its life. */
export const actParticiple = (act: string): string | undefined => PAST[act as LifeAct]

/** A state as it is written in a sentence. */
export const stateWord = (state: ClaimState): string => (state === 'in-review' ? 'in review' : state)

/** What a move says to a state and to facts. */
function judgeMove({ act, by, moves, when = [] }: Move, state: ClaimState, facts: Facts): Judgement {
  const unmet = when.map((condition): ConditionText => CONDITIONS[condition]).filter(({ holds }) => !holds(facts))
  const [personal] = unmet.filter((condition) => condition.personal)
  if (personal) return refusal('not-theirs', personal.code, personal.says)
  const to = moves[state]
  if (to === undefined) return wrongState(act, state)
  const [first] = unmet
  return first ? refusal('not-now', first.code, first.says) : { allowed: true, party: by, to }
}

/** The best that any of these parties can hear: allowed, else what is in the way now, else that it is not theirs. */
function judgeParties(act: LifeAct, state: ClaimState, parties: readonly Party[], facts: Facts): Judgement | undefined {
  const heard = LIFE.filter((move) => move.act === act && parties.includes(move.by)).map((move) => judgeMove(move, state, facts))
  return heard.find(({ allowed }) => allowed) ?? heard.find((judgement) => !judgement.allowed && judgement.why === 'not-now') ?? heard[0]
}

/** Whether somebody who stands so to a claim in this state may do this act now, where it leads, or what is in the way. */
export function judge(act: PersonAct, state: ClaimState, standing: Standing | undefined, facts: Facts): Judgement {
  const parties = standing === undefined ? [] : partiesOf(standing)
  return judgeParties(act, state, parties, facts) ?? notTheirs(act, standing)
}

/** Whether the register itself makes this move now. */
export function judgeRegister(act: RegisterAct, state: ClaimState, facts: Facts): Judgement {
  return judgeParties(act, state, ['register'], facts) ?? wrongState(act, state)
}

const REVIEW_CONSEQUENCES = ['endorse', 'await-referee'] as const

/** What the register does by itself to a claim that has just reached this state: at most one move of its review. */
export function consequence(state: ClaimState, facts: Facts): RegisterAct | undefined {
  return REVIEW_CONSEQUENCES.find((act) => judgeRegister(act, state, facts).allowed)
}

/** Where an act leads from a state, whoever does it; undefined where the table has no such move. For replaying an audit trail. */
export function leadsTo(act: LifeAct, from: ClaimState): ClaimState | undefined {
  return LIFE.find((move) => move.act === act && move.moves[from] !== undefined)?.moves[from]
}

/** Every act of a person. */
export const PERSON_ACTS: readonly PersonAct[] = [...new Set(LIFE.filter((move) => move.by !== 'register').map((move) => move.act as PersonAct))]
