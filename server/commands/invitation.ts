import { Op, type Transaction } from 'sequelize'
import type { Role } from '../../shared/permissions.ts'
import { recordAudit } from '../audit/record.ts'
import { hashPassword } from '../auth/passwords.ts'
import { newToken, tokenHash } from '../auth/tokens.ts'
import { inTransaction, sqlState } from '../db.ts'
import { env } from '../env.ts'
import { conflict, gone, notFound } from '../errors.ts'
import { queueMail } from '../mail/outbox.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Group } from '../models/group.ts'
import { Invitation } from '../models/invitation.ts'
import { Member } from '../models/member.ts'
import type { Session } from '../models/session.ts'
import { mayManageInvitation } from '../policies/invitation.ts'
import { openSession, type Origin } from './session.ts'

const DAYS = 7
const UNIQUE_VIOLATION = '23505'

const expiry = () => new Date(Date.now() + DAYS * 86_400_000)
const alreadyMember = () => conflict('already_member', 'There is an account with this e-mail address already.')
const usedUp = () => gone('link_used', 'This invitation has been used, was taken back or has expired. Ask the lead who invited you for a new one.')

const linkOf = (token: string): string => `${env.publicUrl}/invitations/${token}`

async function mailLink(invitation: Invitation, actor: { name: string; groupName: string }, token: string, transaction: Transaction): Promise<void> {
  await queueMail(
    transaction,
    'invitation',
    { email: invitation.email, name: invitation.name },
    {
      inviter: actor.name,
      group: actor.groupName,
      roles: invitation.roles,
      link: linkOf(token),
      expires: invitation.expiresAt.toISOString(),
    },
    { groupId: invitation.groupId },
  )
}

function audit(transaction: Transaction, act: string, actor: { id: string | null; groupId: string }, invitation: Invitation): Promise<void> {
  return recordAudit(transaction, {
    act,
    actorId: actor.id,
    groupId: actor.groupId,
    subject: { kind: 'invitation', id: invitation.id, label: invitation.email },
    detail: { name: invitation.name, roles: invitation.roles },
  })
}

/** Invites somebody into the lead's group by a mailed one-time link. */
export async function invite(actor: SignedInMember, person: { email: string; name: string; roles: Role[] }): Promise<Invitation> {
  const token = newToken()
  try {
    return await inTransaction(async (transaction) => {
      if (await Member.findOne({ where: { email: person.email, state: 'active' }, transaction })) throw alreadyMember()
      const invitation = await Invitation.create(
        { ...person, groupId: actor.groupId, inviterId: actor.id, tokenHash: tokenHash(token), expiresAt: expiry() },
        { transaction },
      )
      await mailLink(invitation, actor, token, transaction)
      await audit(transaction, 'invitation.create', actor, invitation)
      return invitation
    })
  } catch (error) {
    if (sqlState(error) !== UNIQUE_VIOLATION) throw error
    throw conflict('already_invited', 'This person is invited already. Send the invitation again, or take it back first.')
  }
}

/** Invites the first lead of a group from the command line and answers the link. The group is made if there is none of that name. */
export async function inviteFirstLead({ group: name, ...person }: { group: string; email: string; name: string }): Promise<string> {
  const token = newToken()
  return inTransaction(async (transaction) => {
    if (await Member.findOne({ where: { email: person.email, state: 'active' }, transaction })) throw alreadyMember()
    const [group] = await Group.findOrCreate({ where: { name }, transaction })
    // An earlier invitation that was not used gives way: its link may be lost.
    await Invitation.update({ revokedAt: new Date() }, { where: { groupId: group.id, email: person.email, acceptedAt: null, revokedAt: null }, transaction })
    const invitation = await Invitation.create(
      { ...person, roles: ['lead'], groupId: group.id, inviterId: null, tokenHash: tokenHash(token), expiresAt: expiry() },
      { transaction },
    )
    await mailLink(invitation, { name: group.name, groupName: group.name }, token, transaction)
    await audit(transaction, 'invitation.create', { id: null, groupId: group.id }, invitation)
    return linkOf(token)
  })
}

async function loadManaged(actor: SignedInMember, id: string, transaction: Transaction): Promise<Invitation> {
  const invitation = await Invitation.findByPk(id, { transaction, lock: true })
  if (!invitation || !mayManageInvitation(actor, invitation)) throw notFound('open invitation')
  return invitation
}

/** Sends an invitation again, with a new link; the old one is void. */
export async function resendInvitation(actor: SignedInMember, id: string): Promise<Invitation> {
  const token = newToken()
  return inTransaction(async (transaction) => {
    const invitation = await loadManaged(actor, id, transaction)
    await invitation.update({ tokenHash: tokenHash(token), expiresAt: expiry() }, { transaction })
    await mailLink(invitation, actor, token, transaction)
    await audit(transaction, 'invitation.resend', actor, invitation)
    return invitation
  })
}

export async function revokeInvitation(actor: SignedInMember, id: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const invitation = await loadManaged(actor, id, transaction)
    await invitation.update({ revokedAt: new Date() }, { transaction })
    await audit(transaction, 'invitation.revoke', actor, invitation)
  })
}

/** The invitation that a mailed token stands for, while it can be accepted. */
export async function openInvitation(token: string, transaction?: Transaction): Promise<Invitation> {
  const invitation = await Invitation.findOne({
    where: { tokenHash: tokenHash(token), acceptedAt: null, revokedAt: null, expiresAt: { [Op.gt]: new Date() } },
    ...(transaction && { transaction, lock: true }),
  })
  if (!invitation) throw usedUp()
  return invitation
}

/** Makes the account that an invitation promises and signs the new member in. */
export async function acceptInvitation(token: string, { name, password }: { name: string; password: string }, origin: Origin): Promise<Session> {
  await openInvitation(token)
  const passwordHash = await hashPassword(password)
  try {
    return await inTransaction(async (transaction) => {
      const invitation = await openInvitation(token, transaction)
      const group = await Group.findByPk(invitation.groupId, { transaction, rejectOnEmpty: true })
      const member = await Member.create({ groupId: group.id, email: invitation.email, name, passwordHash, roles: invitation.roles }, { transaction })
      await invitation.update({ acceptedAt: new Date(), memberId: member.id }, { transaction })
      const session = await openSession(member.id, origin, transaction)
      await recordAudit(transaction, {
        act: 'member.join',
        actorId: member.id,
        groupId: group.id,
        subject: { kind: 'member', id: member.id, label: name },
        detail: { roles: invitation.roles, invitation: invitation.id },
      })
      return session
    })
  } catch (error) {
    if (sqlState(error) !== UNIQUE_VIOLATION) throw error
    throw alreadyMember()
  }
}
