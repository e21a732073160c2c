import type { Transaction } from 'sequelize'
import type { Role } from '../../shared/permissions.ts'
import type { MailPreferences } from '../../shared/schemas/member.ts'
import { recordAudit } from '../audit/record.ts'
import { inTransaction } from '../db.ts'
import { conflict, notFound } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { AccessToken } from '../models/access-token.ts'
import { Group } from '../models/group.ts'
import { Member } from '../models/member.ts'
import { mayManage } from '../policies/member.ts'
import { endSessions } from './session.ts'

/** Locks the group, so that two leads who give up the role at once do not leave it without one. */
async function lockGroup(groupId: string, transaction: Transaction): Promise<void> {
  await Group.findByPk(groupId, { transaction, lock: true })
}

async function refuseLastLead(member: Member, transaction: Transaction): Promise<void> {
  const members = await Member.findAll({ where: { groupId: member.groupId, state: 'active' }, transaction })
  if (members.some((other) => other.id !== member.id && other.roles.includes('lead'))) return
  throw conflict('last_lead', 'The group would be left without a lead. Make another member lead first.')
}

async function loadManaged(actor: SignedInMember, id: string, transaction: Transaction): Promise<Member> {
  await lockGroup(actor.groupId, transaction)
  const member = await Member.findByPk(id, { transaction, lock: true })
  if (!member || !mayManage(actor, member)) throw notFound('member')
  return member
}

/** Gives a member exactly these roles. */
export async function changeRoles(actor: SignedInMember, id: string, roles: Role[]): Promise<Member> {
  return inTransaction(async (transaction) => {
    const member = await loadManaged(actor, id, transaction)
    if (member.roles.includes('lead') && !roles.includes('lead')) await refuseLastLead(member, transaction)
    const before = member.roles
    if (before.join() === roles.join()) return member
    await member.update({ roles }, { transaction })
    await recordAudit(transaction, {
      act: 'member.roles',
      actorId: actor.id,
      groupId: actor.groupId,
      subject: { kind: 'member', id, label: member.name },
      detail: { from: before, to: roles },
    })
    return member
  })
}

/** A lead ends somebody's membership. */
export async function endMembership(actor: SignedInMember, id: string): Promise<void> {
  await inTransaction(async (transaction) => depart(actor, await loadManaged(actor, id, transaction), transaction))
}

/** A member leaves. */
export async function leaveGroup(actor: SignedInMember): Promise<void> {
  await inTransaction(async (transaction) => {
    await lockGroup(actor.groupId, transaction)
    const member = await Member.findOne({ where: { id: actor.id, state: 'active' }, transaction, lock: true })
    if (!member) throw notFound('member')
    await depart(actor, member, transaction)
  })
}

/** The name stays on what the member signed; signing in and access tokens end. */
async function depart(actor: SignedInMember, member: Member, transaction: Transaction): Promise<void> {
  if (member.roles.includes('lead')) await refuseLastLead(member, transaction)
  await member.update({ state: 'left', leftAt: new Date() }, { transaction })
  await endSessions(member.id, transaction)
  await AccessToken.update({ revokedAt: new Date() }, { where: { memberId: member.id, revokedAt: null }, transaction })
  await recordAudit(transaction, {
    act: 'member.leave',
    actorId: actor.id,
    groupId: member.groupId,
    subject: { kind: 'member', id: member.id, label: member.name },
    detail: { roles: member.roles },
  })
}

/** Changes one's own name or which mails one wants. */
export async function changeAccount(actor: SignedInMember, patch: { name?: string | undefined; mailPreferences?: Partial<MailPreferences> | undefined }): Promise<void> {
  await inTransaction(async (transaction) => {
    const member = await Member.findByPk(actor.id, { transaction, lock: true, rejectOnEmpty: true })
    const renamed = patch.name !== undefined && patch.name !== member.name
    const before = member.name
    await member.update({ name: patch.name ?? member.name, mailPreferences: { ...member.mailPreferences, ...patch.mailPreferences } }, { transaction })
    if (!renamed) return
    await recordAudit(transaction, {
      act: 'member.rename',
      actorId: actor.id,
      groupId: actor.groupId,
      subject: { kind: 'member', id: actor.id, label: member.name },
      detail: { from: before, to: member.name },
    })
  })
}
