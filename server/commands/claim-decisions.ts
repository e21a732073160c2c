import type { Transaction } from 'sequelize'
import { claimNumberText } from '../../shared/constant-number.ts'
import { canonicalJson, type Json } from '../audit/canonical.ts'
import { kindOf } from '../claim-kinds/kinds.ts'
import { select } from '../db.ts'
import { sign } from '../keys.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { refereesAtWork, refereesWithVerdict } from '../queries/claim-people.ts'
import { actOnClaim, assertMayAct, type ActContext, type ActWork } from './claim-act.ts'
import type { ActNote } from './claim-locked.ts'
import { confirmPassword } from './session.ts'

/** Sends a claim back to its author. */
export async function returnClaim(member: SignedInMember, id: string, { reason }: { reason: string }): Promise<void> {
  await actOnClaim(member, id, 'return', {}, async ({ claim, tell }) => {
    await tell('claim-returned', [claim.authorId], { by: member.name, reason })
    return { reason }
  })
}

/**
 * Signs a claim into the register: the lead proves again who they are, and the certificate gets the installation's signature over its
 * digest. What is signed is the version that the lead has read.
 */
export async function signClaim(member: SignedInMember, id: string, { version, password }: { version: number; password: string }, address: string): Promise<void> {
  await assertMayAct(member, id, 'sign', { version })
  await confirmPassword(member.id, password, address)
  await actOnClaim(member, id, 'sign', { version }, async ({ transaction, claim, tell }) => {
    await kindOf(claim).beforeSigning(transaction, claim)
    const signature = sign(claim.certificateDigest)
    const certificate = JSON.parse(claim.certificate) as { [key: string]: Json }
    claim.set({ signedBy: member.id, signedAt: new Date(), certificate: canonicalJson({ ...certificate, signature }) })
    await tell('claim-signed', [claim.authorId, ...(await refereesWithVerdict(claim.id, transaction))], { lead: member.name })
    return { detail: { certificate: claim.certificateDigest, keyId: signature.keyId } }
  })
}

/** Takes a signed claim out of force while something that it rests on is in doubt; those whose claims rest on it are told too. */
export async function suspendClaim(member: SignedInMember, id: string, { reason }: { reason: string }): Promise<void> {
  await actOnClaim(member, id, 'suspend', {}, suspension(reason, ({ member: by, tell }, people, touched) => tell('claim-suspended', people, { by: by.name, reason, touched })))
}

/** What a suspension does, however its author and those whose claims rest on it, `people`, are told of it. */
export function suspension(reason: string, tellOf: (context: ActContext, people: string[], touched: string[]) => Promise<void>, cause: ActNote['detail'] = {}): ActWork {
  return async (context) => {
    const resting = await claimsRestingOn(context.claim.id, context.transaction)
    const touched = resting.map(({ number }) => number)
    await tellOf(context, [context.claim.authorId, ...resting.map(({ author_id }) => author_id)], touched)
    return { reason, detail: { ...cause, ...(touched.length > 0 && { touched }) } }
  }
}

/** Puts a suspended claim in force again. */
export async function reinstateClaim(member: SignedInMember, id: string, { reason }: { reason: string }): Promise<void> {
  await actOnClaim(member, id, 'reinstate', {}, reinstatement(reason))
}

/** What a reinstatement does. Where it is refused, nothing has been changed yet. */
export function reinstatement(reason: string, cause: ActNote['detail'] = {}): ActWork {
  return async ({ transaction, claim }) => {
    await kindOf(claim).beforeSigning(transaction, claim)
    claim.set({ supersededBy: null })
    return { reason, detail: cause }
  }
}

/** Withdraws a claim for good. Its number stays its own. */
export async function withdrawClaim(member: SignedInMember, id: string, { reason }: { reason: string }): Promise<void> {
  await actOnClaim(member, id, 'withdraw', {}, async ({ transaction, claim, tell }) => {
    const resting = await claimsRestingOn(claim.id, transaction)
    const told = [claim.authorId, ...(await refereesAtWork(claim.id, transaction)), ...resting.map(({ author_id }) => author_id)]
    await tell('claim-withdrawn', told, { by: member.name, reason })
    return { reason, ...(resting.length > 0 && { detail: { touched: resting.map(({ number }) => number) } }) }
  })
}

/** Orders in force or in review that rest on a claim's enclosure. */
async function claimsRestingOn(id: string, transaction: Transaction): Promise<{ number: string; author_id: string }[]> {
  const rows = await select<{ number: number; ordinal: number; author_id: string }>(
    `SELECT k.number, c.ordinal, c.author_id FROM claims c JOIN constants k ON k.id = c.constant_id
     WHERE c.kind = 'order' AND c.state NOT IN ('draft', 'withdrawn')
       AND (c.basis->'lesser'->'claims' @> $claim::jsonb OR c.basis->'greater'->'claims' @> $claim::jsonb) ORDER BY k.number, c.ordinal`,
    { claim: JSON.stringify([{ id }]) },
    transaction,
  )
  return rows.map(({ number, ordinal, author_id }) => ({ number: claimNumberText(number, ordinal), author_id }))
}
