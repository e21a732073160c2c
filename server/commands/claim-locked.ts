import type { Transaction } from 'sequelize'
import type { LifeAct } from '../../shared/claim-life.ts'
import { claimNumberText, claimSlug, constantNumberText } from '../../shared/constant-number.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import type { Json } from '../audit/canonical.ts'
import { recordAudit } from '../audit/record.ts'
import { select } from '../db.ts'
import { notFound } from '../errors.ts'
import type { ClaimMail, MailData, MailTemplate } from '../mail/catalogue.ts'
import { queueMail } from '../mail/outbox.ts'
import { Claim } from '../models/claim.ts'
import { Constant } from '../models/constant.ts'

/** A claim that is locked until the end of the transaction, with its constant. */
export interface LockedClaim {
  transaction: Transaction
  claim: Claim
  constant: Constant
}

/** Locks a constant: whoever changes claims of it holds this until the end of the transaction. */
export async function lockConstant(transaction: Transaction, id: string): Promise<void> {
  await select('SELECT id FROM constants WHERE id = $id FOR UPDATE', { id }, transaction)
}

/**
 * Whoever acts on claims of a group shares them with others who do, until the end of the transaction; who marks an estimate in doubt
 * holds them alone, so that no claim comes into force on it meanwhile. To be had before any constant is locked.
 */
export async function shareClaimsOf(transaction: Transaction, groupId: string): Promise<void> {
  await select('SELECT pg_advisory_xact_lock_shared(hashtextextended($key, 0))', { key: `claims of ${groupId}` }, transaction)
}

/** Keeps everybody else from acting on claims of a group until the end of the transaction. */
export async function holdClaimsOf(transaction: Transaction, groupId: string): Promise<void> {
  await select('SELECT pg_advisory_xact_lock(hashtextextended($key, 0))', { key: `claims of ${groupId}` }, transaction)
}

/** Locks a claim, and before it its constant, unless the work is `alone`: touches no other claim and no state. */
export async function lockClaim(transaction: Transaction, id: string, alone = false): Promise<LockedClaim> {
  const found = await Claim.findByPk(id, { transaction, attributes: ['constantId', 'groupId'] })
  if (!found) throw notFound('claim')
  if (!alone) {
    await shareClaimsOf(transaction, found.groupId)
    await lockConstant(transaction, found.constantId)
  }
  const claim = await Claim.findByPk(id, { transaction, lock: true })
  if (!claim) throw notFound('claim')
  const constant = await Constant.findByPk(claim.constantId, { transaction, rejectOnEmpty: true })
  return { transaction, claim, constant }
}

/**
 * Locks the constants of several claims, and then all claims of these constants, each in the one order that everybody keeps, before the
 * first entry of the audit trail is written: what follows waits for nobody.
 */
export async function lockClaims(transaction: Transaction, ids: readonly string[]): Promise<void> {
  const constants = await select<{ id: string }>(
    'SELECT id FROM constants WHERE id IN (SELECT constant_id FROM claims WHERE id = ANY ($ids::uuid[])) ORDER BY id FOR UPDATE',
    { ids },
    transaction,
  )
  await select('SELECT id FROM claims WHERE constant_id = ANY ($constants::uuid[]) ORDER BY id FOR UPDATE', { constants: constants.map(({ id }) => id) }, transaction)
}

/** What the audit trail says of an act besides who, when, and from where to where. */
export interface ActNote {
  reason?: string
  detail?: { [key: string]: Json }
}

/** Writes what was set on a claim, and the state it comes to. The version grows where content or state have changed. */
export async function moveTo(transaction: Transaction, claim: Claim, to: ClaimState): Promise<void> {
  if (claim.state !== to) claim.set({ state: to, since: new Date() })
  if (claim.changed('state') || claim.changed('digest') || claim.changed('remark')) claim.set({ version: claim.version + 1 })
  await claim.save({ transaction })
}

interface ClaimEvent extends ActNote {
  act: LifeAct | 'create' | 'conflict' | 'conflict-closed'
  /** null: the register itself. */
  actorId: string | null
  from: ClaimState | null
  to: ClaimState | null
  told?: string[]
}

/** Writes an act on a claim into the audit trail: from which state to which, for which digest, and who was told by mail. */
export async function recordClaim(transaction: Transaction, claim: Claim, constant: Constant, { act, actorId, from, to, told = [], reason, detail }: ClaimEvent): Promise<void> {
  await recordAudit(transaction, {
    act: `claim.${act}`,
    actorId,
    groupId: claim.groupId,
    subject: { kind: 'claim', id: claim.id, label: labelOf(claim, constant) },
    ...(reason !== undefined && { reason }),
    digest: claim.digest,
    detail: { from, to, ...(told.length > 0 && { told }), ...detail },
  })
}

/** MST-0042/1, or what a draft is called. */
export const labelOf = (claim: { ordinal: number | null }, constant: { number: number }): string =>
  claim.ordinal === null ? `draft for ${constantNumberText(constant.number)}` : claimNumberText(constant.number, claim.ordinal)

/** Where people find the claim in the product. */
export const claimPath = (claim: { id: string; ordinal: number | null }, constant: { number: number }): string =>
  `/claims/${claim.ordinal === null ? claim.id : claimSlug(constant.number, claim.ordinal)}`

type ClaimTemplate = { [Template in MailTemplate]: MailData[Template] extends ClaimMail ? Template : never }[MailTemplate]

/** Queues mails about a claim to members, each person once, and keeps note of them for the audit trail. */
export interface Teller {
  <Template extends ClaimTemplate>(template: Template, memberIds: readonly string[], data: Omit<MailData[Template], keyof ClaimMail>): Promise<void>
  told: string[]
}

export function teller(transaction: Transaction, claim: Claim, constant: Constant): Teller {
  const tell = async <Template extends ClaimTemplate>(template: Template, memberIds: readonly string[], data: Omit<MailData[Template], keyof ClaimMail>): Promise<void> => {
    const about: ClaimMail = { number: labelOf(claim, constant), constant: constant.text, path: claimPath(claim, constant) }
    for (const memberId of new Set(memberIds)) {
      await queueMail(transaction, template, { memberId }, { ...about, ...data } as unknown as MailData[Template], { groupId: claim.groupId })
      tell.told.push(`${template}:${memberId}`)
    }
  }
  tell.told = [] as string[]
  return tell
}
