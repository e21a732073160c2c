import { createHash } from 'node:crypto'
import type { Transaction } from 'sequelize'
import type { z } from 'zod'
import type { claimInput, claimPatch } from '../../shared/schemas/claim.ts'
import type { ClaimContent } from '../claim-kinds/claim-kind.ts'
import { kindOf, kindOfInput } from '../claim-kinds/kinds.ts'
import { canonicalJson } from '../audit/canonical.ts'
import { inTransaction, selectOne } from '../db.ts'
import { unprocessable } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Claim } from '../models/claim.ts'
import { Constant } from '../models/constant.ts'
import { Member } from '../models/member.ts'
import { leadsOf, refereesAtWork } from '../queries/claim-people.ts'
import { actOnClaim } from './claim-act.ts'
import { lockConstant, recordClaim, type LockedClaim } from './claim-locked.ts'
import { refreshBest } from './constant-best.ts'

/** Registers a draft. */
export async function draftClaim(member: SignedInMember, input: z.output<typeof claimInput>): Promise<Claim> {
  return inTransaction(async (transaction) => {
    const content = await kindOfInput(input).content(transaction, member, input)
    await lockConstant(transaction, content.constantId)
    const claim = await Claim.create(
      { kind: input.kind, groupId: member.groupId, authorId: member.id, remark: input.remark, ...content, digest: await claimDigest(transaction, input.kind, content) },
      { transaction },
    )
    const constant = await Constant.findByPk(claim.constantId, { transaction, rejectOnEmpty: true })
    await recordClaim(transaction, claim, constant, { act: 'create', actorId: member.id, from: null, to: 'draft' })
    await refreshBest(transaction, claim.constantId)
    return claim
  })
}

/** Changes a draft or a returned claim. Where what is asserted changes with it, verdicts on the earlier content no longer count. */
export async function editClaim(member: SignedInMember, id: string, { version, remark, source, runId }: z.output<typeof claimPatch>): Promise<void> {
  await actOnClaim(member, id, 'edit', { version }, async (context) => {
    const before = context.claim.digest
    if (source !== undefined || runId !== undefined) await renew(context, { source, runId })
    if (remark !== undefined) context.claim.set({ remark })
    return { detail: { contentChanged: context.claim.digest !== before } }
  })
}

/** Puts a draft to the register; with the first submission it gets its number, which it keeps. */
export async function submitClaim(member: SignedInMember, id: string, version: number): Promise<void> {
  await actOnClaim(member, id, 'submit', { version }, async (context) => {
    const { transaction, claim, tell } = context
    await renew(context, {})
    // The constant is locked, so that no other claim of it takes a number at the same time.
    const last = await selectOne<{ ordinal: number }>('SELECT coalesce(max(ordinal), 0) AS ordinal FROM claims WHERE constant_id = $id', { id: claim.constantId }, transaction)
    claim.set({ ordinal: (last?.ordinal ?? 0) + 1, submittedAt: new Date() })
    await tell('claim-submitted', await leadsOf(claim.groupId, transaction), { author: member.name })
  })
}

/** Puts a returned claim back into review, once every objection is answered. */
export async function resubmitClaim(member: SignedInMember, id: string, { version, remark }: { version: number; remark: string }): Promise<void> {
  await actOnClaim(member, id, 'resubmit', { version }, async (context) => {
    const { transaction, claim, tell } = context
    await renew(context, {})
    await tell('claim-resubmitted', await refereesAtWork(claim.id, transaction), { author: member.name, remark })
    return { reason: remark }
  })
}

/** Makes the claim's content anew from what its author gave, for the group it was registered in. */
async function renew({ transaction, claim }: LockedClaim, patch: { source?: string | undefined; runId?: string | undefined }): Promise<void> {
  const author = await Member.findByPk(claim.authorId, { transaction, rejectOnEmpty: true })
  const content = await kindOf(claim).renew(transaction, { id: author.id, groupId: claim.groupId }, claim, patch)
  if (content.constantId !== claim.constantId) throw unprocessable('another_constant', 'This run encloses another constant. Register a claim of its own for it.', 'runId')
  claim.set({ ...content, digest: await claimDigest(transaction, claim.kind, content) })
}

/** SHA-256 of what a claim asserts, by RFC 8785: what verdicts and the signature are about. The author's remark is no part of it. */
async function claimDigest(transaction: Transaction, kind: string, { constantId, otherConstantId, lo, hi, source, certificateDigest }: ClaimContent): Promise<string> {
  const definitionOf = async (id: string | null) => (id === null ? null : (await Constant.findByPk(id, { transaction, rejectOnEmpty: true })).definition)
  const asserted = {
    format: 'merestone-claim',
    kind,
    definition: await definitionOf(constantId),
    otherDefinition: await definitionOf(otherConstantId),
    enclosure: lo === null ? null : { lo, hi },
    source,
    certificate: certificateDigest,
  }
  return createHash('sha256').update(canonicalJson(asserted)).digest('hex')
}
