import { judge, PERSON_ACTS, type Facts, type PersonAct, type Standing } from '../../shared/claim-life.ts'
import { hasRight } from '../../shared/permissions.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { notFound, unauthenticated, type Problem } from '../errors.ts'

/** What decides who may read a claim. */
export interface ReadableClaim {
  signedAt: Date | null
  groupPublic: boolean
}

/** How much of a claim somebody may read: nothing, what is in the register, or its drafts and reviews too. */
export type View = 'none' | 'entry' | 'work'

/** A pure referee reads of the group's work what is assigned to them; what was signed is open to the group, or to all if the group publishes. */
export function viewOf(claim: ReadableClaim, standing: Standing | undefined): View {
  if (standing) {
    const assigned = standing.assignment === 'asked' || standing.assignment === 'accepted'
    if (standing.author || assigned || (standing.sameGroup && hasRight(standing.roles, 'group-work.read'))) return 'work'
  }
  const entered = claim.signedAt !== null
  return entered && (claim.groupPublic || standing?.sameGroup) ? 'entry' : 'none'
}

/** What a reader is told to whom a claim is not open, whether it exists or not: who has no account, to sign in. */
export const notOpen = (signedIn: boolean): Problem => (signedIn ? notFound('claim') : unauthenticated('Sign in to read this claim, if it is open to you.'))

/** Digits may be checked against what is in the register by all who read it, and against a claim in review by its referees. */
export function mayCheckDigits(claim: ReadableClaim, standing: Standing | undefined): boolean {
  const refereeing = standing !== undefined && (standing.assignment === 'asked' || standing.assignment === 'accepted')
  return viewOf(claim, standing) !== 'none' && (claim.signedAt !== null || refereeing)
}

/** Every act with whether this person may do it now. The client shows it, the commands judge again on the locked row. */
export function claimAbilities(state: ClaimState, standing: Standing | undefined, facts: Facts): Record<PersonAct, boolean> {
  return Object.fromEntries(PERSON_ACTS.map((act) => [act, judge(act, state, standing, facts).allowed])) as Record<PersonAct, boolean>
}
