import type { Transaction } from 'sequelize'
import { judge, type Facts, type PersonAct } from '../../shared/claim-life.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { inTransaction } from '../db.ts'
import { conflict, forbidden, notFound } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Claim } from '../models/claim.ts'
import { Group } from '../models/group.ts'
import { notOpen, viewOf } from '../policies/claim.ts'
import { lastEvent } from '../queries/claim-history.ts'
import { factsOf, standingOf, type ActSubject } from '../queries/claim-review.ts'
import { consequences } from './claim-consequences.ts'
import { lockClaim, moveTo, recordClaim, teller, type ActNote, type LockedClaim, type Teller } from './claim-locked.ts'
import { refreshBest } from './constant-best.ts'

/** What an act works with: the locked claim, who acts, and whom they are told of it. */
export interface ActContext extends LockedClaim {
  member: SignedInMember
  facts: Facts
  tell: Teller
}

interface ActOptions {
  /** The version that the person read, where they decide on what they read. */
  version?: number
  subject?: ActSubject
}

/** Acts that change nothing but the claim's own rows, and so need no order among those who act on claims of one constant. */
const ALONE: readonly PersonAct[] = ['recheck', 'remind', 'draft-verdict']

/** What an act does beside moving the state: it sets fields of the claim, queues mails, and says what the audit trail is to tell. */
export type ActWork = (context: ActContext) => Promise<ActNote | void>

/**
 * One act on a claim: locks it, judges who and when on the locked row, does the work (which sets fields of the claim and leaves its state
 * alone), moves the state, and writes the audit entry and the mails, all in one transaction. What the register does of itself in
 * consequence belongs to it. Of two who act at once the second waits for the first, and is then told what has happened.
 */
export async function actOnClaim(member: SignedInMember, claimId: string, act: PersonAct, options: ActOptions, work: ActWork): Promise<void> {
  await inTransaction((transaction) => actWithin(transaction, member, claimId, act, options, work))
}

/** The same as part of a transaction. Whoever acts on several claims locks them all first (lockClaims). */
export async function actWithin(transaction: Transaction, member: SignedInMember, claimId: string, act: PersonAct, options: ActOptions, work: ActWork): Promise<void> {
  const locked = await lockClaim(transaction, claimId, ALONE.includes(act))
  const { claim, constant } = locked
  const { to, facts } = await judged(member, claim, act, options, transaction)
  const tell = teller(transaction, claim, constant)
  const from = claim.state
  const note = (await work({ ...locked, member, facts, tell })) ?? {}
  await moveTo(transaction, claim, to)
  await recordClaim(transaction, claim, constant, { act, actorId: member.id, from, to, told: tell.told, ...note })
  if (!ALONE.includes(act)) await consequences(locked, from, act)
}

/** Deletes a draft that was never submitted, with its evidence. Only the audit trail knows of it afterwards. */
export async function deleteClaim(member: SignedInMember, claimId: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const { claim, constant } = await lockClaim(transaction, claimId)
    await judged(member, claim, 'delete', {}, transaction)
    await claim.destroy({ transaction })
    await recordClaim(transaction, claim, constant, { act: 'delete', actorId: member.id, from: claim.state, to: null })
    await refreshBest(transaction, constant.id)
  })
}

/** The same judgement without a lock, to refuse early what costs work to prepare. */
export async function assertMayAct(member: SignedInMember, claimId: string, act: PersonAct, options: ActOptions = {}): Promise<Claim> {
  const claim = await Claim.findByPk(claimId)
  if (!claim) throw notFound('claim')
  await judged(member, claim, act, options)
  return claim
}

async function judged(member: SignedInMember, claim: Claim, act: PersonAct, { version, subject }: ActOptions, transaction?: Transaction): Promise<{ to: ClaimState; facts: Facts }> {
  const group = await Group.findByPk(claim.groupId, { transaction: transaction ?? null, rejectOnEmpty: true })
  const standing = await standingOf(member, claim, transaction)
  if (viewOf({ signedAt: claim.signedAt, groupPublic: group.public }, standing) === 'none') throw notOpen(true)
  const facts = await factsOf(claim, member.id, subject, transaction)
  if (subject?.objectionId !== undefined && !facts.objection) throw notFound('objection')
  if (subject?.assignmentId !== undefined && facts.assignmentWaits === undefined) throw notFound('assignment')
  const judgement = judge(act, claim.state, standing, facts)
  if (!judgement.allowed && judgement.why === 'not-theirs') throw forbidden(judgement.code, judgement.says)
  if (version !== undefined && version !== claim.version) {
    throw conflict('changed_meanwhile', `This claim has changed since you read it${await happened(claim.id, transaction)}. Read it again, then decide.`)
  }
  if (!judgement.allowed) throw conflict(judgement.code, judgement.code === 'wrong_state' ? `${judgement.says.slice(0, -1)}${await happened(claim.id, transaction)}.` : judgement.says)
  return { to: judgement.to, facts }
}

/** ": it was signed by N. N." */
async function happened(claimId: string, transaction?: Transaction): Promise<string> {
  const event = await lastEvent(claimId, transaction)
  return event ? `: it was ${event}` : ''
}

