import type { Transaction } from 'sequelize'
import type { z } from 'zod'
import { hasRight } from '../../shared/permissions.ts'
import type { Goal } from '../../shared/engine/methods/goal.ts'
import type { act } from '../../shared/schemas/claim.ts'
import { inTransaction } from '../db.ts'
import { conflict, invalidField, notFound } from '../errors.ts'
import { queueMail } from '../mail/outbox.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Assignment } from '../models/assignment.ts'
import { Member } from '../models/member.ts'
import { Run } from '../models/run.ts'
import { leadsOf } from '../queries/claim-people.ts'
import { actOnClaim, assertMayAct } from './claim-act.ts'
import { claimPath, labelOf, lockClaim } from './claim-locked.ts'
import { startRecheck } from './run.ts'

type Input<Name extends keyof typeof act> = z.output<(typeof act)[Name]>

/** Asks a member, of whatever group, to referee a claim. */
export async function assignReferee(member: SignedInMember, claimId: string, { refereeId, note }: Input<'assign'>): Promise<void> {
  await actOnClaim(member, claimId, 'assign', {}, async ({ transaction, claim, tell }) => {
    const referee = await Member.findByPk(refereeId, { transaction })
    if (!referee || referee.state !== 'active' || !hasRight(referee.roles, 'referee')) throw invalidField('refereeId', 'is not a member who referees')
    if (referee.id === claim.authorId) throw invalidField('refereeId', 'is the author: nobody referees a claim of their own')
    if (await activeAssignment(transaction, claim.id, referee.id)) throw conflict('already_assigned', `${referee.name} is assigned to this claim already.`)
    await Assignment.create({ claimId: claim.id, refereeId: referee.id, askedBy: member.id, note }, { transaction })
    await tell('referee-assigned', [referee.id], { lead: member.name, note })
    return { detail: { referee: referee.id, refereeName: referee.name } }
  })
}

/** Reminds a referee who still owes an answer or a verdict. */
export async function remindReferee(member: SignedInMember, claimId: string, { assignmentId }: Input<'remind'>): Promise<void> {
  await actOnClaim(member, claimId, 'remind', { subject: { assignmentId } }, async ({ transaction, claim, constant, tell }) => {
    const assignment = await Assignment.findByPk(assignmentId, { transaction, lock: true, rejectOnEmpty: true })
    const referee = await Member.findByPk(assignment.refereeId, { transaction, rejectOnEmpty: true })
    const days = Math.floor((Date.now() - (assignment.remindedAt ?? assignment.answeredAt ?? assignment.askedAt).getTime()) / 86_400_000)
    const what = assignment.state === 'asked' ? 'to accept or decline the review' : 'your verdict'
    await queueMail(transaction, 'reminder', { memberId: referee.id }, { name: referee.name, items: [{ number: labelOf(claim, constant), what, days, path: claimPath(claim, constant) }] }, { groupId: claim.groupId })
    tell.told.push(`reminder:${referee.id}`)
    await assignment.update({ remindedAt: new Date() }, { transaction })
    return { detail: { referee: referee.id, refereeName: referee.name } }
  })
}

/** Takes a review on. */
export async function acceptReview(member: SignedInMember, claimId: string): Promise<void> {
  await actOnClaim(member, claimId, 'accept', {}, async ({ transaction, claim }) => {
    await (await ownAssignment(transaction, claim.id, member.id)).update({ state: 'accepted', answeredAt: new Date() }, { transaction })
  })
}

/** Gives a review back, so that a lead can ask somebody else. */
export async function declineReview(member: SignedInMember, claimId: string, { reason }: Input<'decline'>): Promise<void> {
  await actOnClaim(member, claimId, 'decline', {}, async ({ transaction, claim, tell }) => {
    const assignment = await ownAssignment(transaction, claim.id, member.id)
    await assignment.update({ state: 'declined', declineReason: reason, answeredAt: assignment.answeredAt ?? new Date(), draft: null }, { transaction })
    await tell('referee-declined', await leadsOf(claim.groupId, transaction), { referee: member.name, reason })
    return { reason }
  })
}

/** Starts a referee's run of the claim's constant; without a goal of its own it has that of the claim's run, or its digits. */
export async function recheckClaim(member: SignedInMember, claimId: string, { method, arithmetic, digits, cutoff }: Input<'recheck'>): Promise<void> {
  await actOnClaim(member, claimId, 'recheck', {}, async ({ transaction, claim }) => {
    const own = claim.runId === null ? null : await Run.findByPk(claim.runId, { transaction })
    const sameGoal = own && (method === 'partial-sum') === 'cutoff' in own.goal ? own.goal : undefined
    const goal: Goal = cutoff !== undefined ? { cutoff } : digits !== undefined ? { digits } : (sameGoal ?? { digits: Math.max(1, claim.digitsTruncated ?? 1) })
    const run = await startRecheck(transaction, claim, member, { method, arithmetic, goal })
    return { detail: { run: run.id, method, arithmetic } }
  })
}

/** A referee's word that the claim, as it was read, stands. */
export async function confirmClaim(member: SignedInMember, claimId: string, { version, remark, checklist }: Input<'confirm'>): Promise<void> {
  await actOnClaim(member, claimId, 'confirm', { version }, async ({ transaction, claim }) => {
    const assignment = await ownAssignment(transaction, claim.id, member.id)
    await assignment.update({ verdict: 'confirmed', verdictDigest: claim.digest, verdictAt: new Date(), remark, checklist, draft: null }, { transaction })
    return { reason: remark }
  })
}

/** Keeps a verdict while it is being written. Private: neither shown to anybody else nor told in the audit trail. */
export async function keepVerdictDraft(member: SignedInMember, claimId: string, text: string): Promise<void> {
  await assertMayAct(member, claimId, 'draft-verdict')
  await inTransaction(async (transaction) => {
    const { claim } = await lockClaim(transaction, claimId, true)
    await (await ownAssignment(transaction, claim.id, member.id)).update({ draft: text === '' ? null : text }, { transaction })
  })
}

const activeAssignment = (transaction: Transaction, claimId: string, refereeId: string): Promise<Assignment | null> =>
  Assignment.findOne({ where: { claimId, refereeId, state: ['asked', 'accepted'] }, transaction, lock: true })

/** The member's own part in the review. The act was judged on it, so it is there. */
export async function ownAssignment(transaction: Transaction, claimId: string, memberId: string): Promise<Assignment> {
  const assignment = await activeAssignment(transaction, claimId, memberId)
  if (!assignment) throw notFound('assignment')
  return assignment
}
