import type { Transaction } from 'sequelize'
import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import { printedText } from '../../shared/printed-text.ts'
import type { LiftResult } from '../../shared/schemas/estimate.ts'
import { recordAudit } from '../audit/record.ts'
import { change, inTransaction, select } from '../db.ts'
import { conflict, invalidField, Problem } from '../errors.ts'
import type { MailData } from '../mail/catalogue.ts'
import { queueMail } from '../mail/outbox.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { digestOfClaims, fateOf, numberOfClaim } from '../presenters/estimate-doubt.ts'
import { claimsOnEstimate, openDoubt, othersTouched, type RestingRow } from '../queries/estimate-doubt.ts'
import { actWithin } from './claim-act.ts'
import { reconsiderClaim } from './claim-consequences.ts'
import { reinstatement, suspension } from './claim-decisions.ts'
import { holdClaimsOf, lockClaims } from './claim-locked.ts'

/** Nobody else acts on the group's claims, and nobody changes what it is, until the end of the transaction. */
async function holdGroup(transaction: Transaction, groupId: string): Promise<void> {
  // In the order in which a change of the group's rules comes to its claims.
  await select('SELECT id FROM groups WHERE id = $groupId FOR KEY SHARE', { groupId }, transaction)
  await holdClaimsOf(transaction, groupId)
}

const ids = (claims: readonly { id: string }[]): string[] => claims.map(({ id }) => id)

/**
 * Marks an estimate as in doubt in the lead's group and suspends every claim of the group in force that rests on it: all of the list
 * that the lead has read, or nothing. Refuses where that list has changed since, or another lead was quicker.
 */
export async function markInDoubt(member: SignedInMember, estimate: Estimate, { reason, digest }: { reason: string; digest: string }): Promise<void> {
  await inTransaction(async (transaction) => {
    const { groupId } = member
    await holdGroup(transaction, groupId)
    const quicker = await openDoubt(groupId, estimate.id, transaction)
    if (quicker) throw conflict('in_doubt_already', `${quicker.marker_name} has marked this estimate as in doubt already: ${quicker.reason}`)

    const claims = await claimsOnEstimate(groupId, estimate.id, transaction)
    await lockClaims(transaction, ids(claims))
    // Another group's act on a constant may have superseded or restored one of them until the locks were there.
    const resting = await claimsOnEstimate(groupId, estimate.id, transaction)
    if (digestOfClaims(resting) !== digest) {
      throw conflict('changed_meanwhile', 'What rests on this estimate has changed since you read the list. Read it again, then decide.')
    }
    const [doubt] = await change<{ id: string }>(
      'INSERT INTO estimate_doubts (estimate, group_id, marked_by, reason) VALUES ($estimate, $groupId, $memberId, $reason) RETURNING id',
      { estimate: estimate.id, groupId, memberId: member.id, reason },
      transaction,
    )
    const falling = resting.filter((claim) => fateOf(claim) === 'falls')
    const waiting = resting.filter((claim) => fateOf(claim) === 'waits')
    const told = await tellAll(transaction, member, estimate, reason, falling, waiting)
    await recordAudit(transaction, {
      act: 'estimate.doubt',
      actorId: member.id,
      groupId,
      subject: { kind: 'estimate', id: estimate.id, label: estimate.title },
      reason,
      detail: { suspends: falling.map(numberOfClaim), holds: waiting.map(numberOfClaim), told },
    })
    const because = `The estimate “${printedText(estimate.title)}” is in doubt: ${reason}`
    for (const { id } of falling) {
      // All whom it concerns have been told of all their claims together.
      await actWithin(transaction, member, id, 'suspend', {}, suspension(because, async () => {}, { estimate: estimate.id }))
    }
    await change(
      'INSERT INTO estimate_doubt_claims (doubt_id, claim_id, since) SELECT $doubtId, id, since FROM claims WHERE id = ANY ($claims::uuid[])',
      { doubtId: doubt!.id, claims: ids(falling) },
      transaction,
    )
  })
}

type Items = MailData['estimate-in-doubt']['items']

/** One mail to each person whom a doubt touches, with all that it touches of theirs; answers whom, as the audit trail notes it. */
async function tellAll(transaction: Transaction, member: SignedInMember, estimate: Estimate, reason: string, falling: RestingRow[], waiting: RestingRow[]): Promise<string[]> {
  const letters = new Map<string, Map<string, Items[number]>>()
  const note = (person: string, claim: { number: string; constant: string }, touched: Items[number]['touched']): void => {
    const items = letters.get(person) ?? new Map<string, Items[number]>()
    letters.set(person, items)
    if (!items.has(claim.number)) items.set(claim.number, { ...claim, touched })
  }
  const named = (claim: RestingRow) => ({ number: numberOfClaim(claim), constant: claim.text })
  for (const claim of falling) note(claim.author_id, named(claim), 'suspended')
  for (const claim of waiting) note(claim.author_id, named(claim), 'waits')
  for (const { number, ordinal, text, member_id: person, part } of await othersTouched(ids(falling), ids(waiting), transaction)) {
    note(person, { number: numberOfClaim({ number, ordinal }), constant: text }, part)
  }
  const about = { by: member.name, group: member.groupName, estimate: estimate.id, title: printedText(estimate.title), reason }
  for (const [memberId, items] of letters) await queueMail(transaction, 'estimate-in-doubt', { memberId }, { ...about, items: [...items.values()] }, { groupId: member.groupId })
  return [...letters.keys()].map((person) => `estimate-in-doubt:${person}`)
}

/**
 * Lifts the group's doubt about an estimate and reinstates those of the suspended claims that are named, as far as nothing else is in
 * their way. Claims in review that were held back by it are looked at again.
 */
export async function liftDoubt(member: SignedInMember, estimate: Estimate, { reason, reinstate }: { reason: string; reinstate: string[] }): Promise<Omit<LiftResult, 'now'>> {
  return inTransaction(async (transaction) => {
    const { groupId } = member
    await holdGroup(transaction, groupId)
    const doubt = await openDoubt(groupId, estimate.id, transaction)
    if (!doubt) throw conflict('not_in_doubt', 'Your group has no doubt about this estimate, or another lead has lifted it already.')
    const resting = await claimsOnEstimate(groupId, estimate.id, transaction)
    const fallen = resting.filter((claim) => fateOf(claim) === 'fallen')
    if (reinstate.some((id) => !fallen.some((claim) => claim.id === id))) throw invalidField('reinstate', 'names a claim that no doubt has suspended')
    await lockClaims(transaction, ids(resting))
    await change(
      'UPDATE estimate_doubts SET lifted_by = $memberId, lifted_at = now(), lift_reason = $reason WHERE id = $id',
      { id: doubt.id, memberId: member.id, reason },
      transaction,
    )
    const chosen = fallen.filter(({ id }) => reinstate.includes(id))
    await recordAudit(transaction, {
      act: 'estimate.lift-doubt',
      actorId: member.id,
      groupId,
      subject: { kind: 'estimate', id: estimate.id, label: estimate.title },
      reason,
      detail: { reinstates: chosen.map(numberOfClaim) },
    })
    const result: Omit<LiftResult, 'now'> = { reinstated: [], kept: [] }
    const because = `The doubt about the estimate “${printedText(estimate.title)}” is lifted: ${reason}`
    for (const claim of chosen) {
      const refusal = await refusalOf(actWithin(transaction, member, claim.id, 'reinstate', {}, reinstatement(because, { estimate: estimate.id })))
      if (refusal) result.kept.push({ claimNumber: numberOfClaim(claim), reason: refusal })
      else result.reinstated.push(numberOfClaim(claim))
    }
    for (const { id, state } of resting) if (state === 'in-review') await reconsiderClaim(transaction, id)
    return result
  })
}

/** Why an act was refused, before it changed anything; undefined where it was done. */
async function refusalOf(act: Promise<void>): Promise<string | undefined> {
  try {
    await act
    return undefined
  } catch (error) {
    if (error instanceof Problem && error.status === 409) return error.message
    throw error
  }
}
