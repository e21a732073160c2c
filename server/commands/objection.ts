import type { Transaction } from 'sequelize'
import type { SignedInMember } from '../middleware/request.ts'
import { Assignment } from '../models/assignment.ts'
import { Objection, ObjectionMessage } from '../models/objection.ts'
import { actOnClaim } from './claim-act.ts'
import { ownAssignment } from './assignment.ts'

/** Raises an objection: the claim goes back to its author. */
export async function objectToClaim(member: SignedInMember, claimId: string, { text }: { text: string }): Promise<void> {
  await actOnClaim(member, claimId, 'object', {}, async ({ transaction, claim, tell }) => {
    const assignment = await ownAssignment(transaction, claim.id, member.id)
    const objection = await Objection.create({ claimId: claim.id, assignmentId: assignment.id }, { transaction })
    await say(transaction, objection, member, text)
    await assignment.update({ verdict: 'objected', verdictDigest: claim.digest, verdictAt: new Date(), remark: text, draft: null }, { transaction })
    await tell('objection-raised', [claim.authorId], { referee: member.name, text })
    return { reason: text, detail: { objection: objection.id } }
  })
}

/** The author's answer to an objection. */
export async function answerObjection(member: SignedInMember, claimId: string, { objectionId, text }: { objectionId: string; text: string }): Promise<void> {
  await actOnClaim(member, claimId, 'answer', { subject: { objectionId } }, async ({ transaction, tell }) => {
    const { objection, refereeId } = await lockObjection(transaction, objectionId)
    await say(transaction, objection, member, text)
    await objection.update({ state: 'answered', since: new Date() }, { transaction })
    await tell('answer-given', [refereeId], { author: member.name, text })
    return { reason: text, detail: { objection: objection.id } }
  })
}

/** The referee's word on an answer: settled closes the objection, upheld keeps it and sends the claim back. */
export async function settleObjection(
  member: SignedInMember,
  claimId: string,
  { objectionId, outcome, text }: { objectionId: string; outcome: 'settled' | 'upheld'; text: string },
): Promise<void> {
  await actOnClaim(member, claimId, outcome === 'settled' ? 'settle' : 'uphold', { subject: { objectionId } }, async ({ transaction, claim, tell }) => {
    const { objection } = await lockObjection(transaction, objectionId)
    if (text !== '') await say(transaction, objection, member, text)
    await objection.update({ state: outcome, since: new Date() }, { transaction })
    if (outcome === 'upheld') await tell('objection-raised', [claim.authorId], { referee: member.name, text: text || 'The objection stands.' })
    return { ...(text !== '' && { reason: text }), detail: { objection: objection.id } }
  })
}

async function lockObjection(transaction: Transaction, id: string): Promise<{ objection: Objection; refereeId: string }> {
  const objection = await Objection.findByPk(id, { transaction, lock: true, rejectOnEmpty: true })
  const assignment = await Assignment.findByPk(objection.assignmentId, { transaction, rejectOnEmpty: true })
  return { objection, refereeId: assignment.refereeId }
}

async function say(transaction: Transaction, objection: Objection, author: { id: string }, text: string): Promise<void> {
  await ObjectionMessage.create({ objectionId: objection.id, authorId: author.id, text }, { transaction })
}
