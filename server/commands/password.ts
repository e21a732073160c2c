import { Op } from 'sequelize'
import { recordAudit } from '../audit/record.ts'
import { hashPassword } from '../auth/passwords.ts'
import { newToken, tokenHash } from '../auth/tokens.ts'
import { inTransaction } from '../db.ts'
import { env } from '../env.ts'
import { gone } from '../errors.ts'
import { queueMail } from '../mail/outbox.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Member } from '../models/member.ts'
import { PasswordReset } from '../models/password-reset.ts'
import { confirmPassword, endSessions } from './session.ts'

const RESET_MINUTES = 60
/** Mails an hour to one person, so that nobody's mailbox is filled by a stranger. */
const RESETS_AN_HOUR = 3

const usedUp = () => gone('link_used', 'This link has been used or has expired. Ask for a new one on the sign-in page.')

/** Sets a new password and ends all other sessions. */
export async function changePassword(member: SignedInMember, current: string, next: string, address: string): Promise<void> {
  await confirmPassword(member.id, current, address, 'current')
  const passwordHash = await hashPassword(next)
  await inTransaction(async (transaction) => {
    await Member.update({ passwordHash }, { where: { id: member.id }, transaction })
    await endSessions(member.id, transaction, member.via.kind === 'session' ? member.via.sessionId : undefined)
    await recordAudit(transaction, { act: 'password.change', actorId: member.id, groupId: member.groupId, subject: { kind: 'member', id: member.id, label: member.name } })
  })
}

/** Mails a one-time link to the address if it is a member's. Whoever asks is told the same either way. */
export async function requestPasswordReset(email: string): Promise<void> {
  const member = await Member.findOne({ where: { email, state: 'active' } })
  if (!member) return
  await inTransaction(async (transaction) => {
    // Locked, so that requests at once are counted one after the other.
    await Member.findByPk(member.id, { transaction, lock: true })
    const recent = await PasswordReset.count({ where: { memberId: member.id, createdAt: { [Op.gt]: new Date(Date.now() - 3_600_000) } }, transaction })
    if (recent >= RESETS_AN_HOUR) return
    const token = newToken()
    const expiresAt = new Date(Date.now() + RESET_MINUTES * 60_000)
    await PasswordReset.create({ memberId: member.id, tokenHash: tokenHash(token), expiresAt }, { transaction })
    await queueMail(
      transaction,
      'password-reset',
      { memberId: member.id },
      { name: member.name, link: `${env.publicUrl}/password-reset/${token}`, expires: expiresAt.toISOString() },
      { groupId: member.groupId },
    )
  })
}

/** The reset that a mailed token stands for, while it can be used. */
export async function openPasswordReset(token: string): Promise<{ reset: PasswordReset; member: Member }> {
  const reset = await PasswordReset.findOne({ where: { tokenHash: tokenHash(token), usedAt: null, expiresAt: { [Op.gt]: new Date() } } })
  const member = reset && (await Member.findOne({ where: { id: reset.memberId, state: 'active' } }))
  if (!reset || !member) throw usedUp()
  return { reset, member }
}

/** Sets the password by a mailed token. All links and all sessions of the member end. */
export async function completePasswordReset(token: string, password: string): Promise<void> {
  const { reset, member } = await openPasswordReset(token)
  const passwordHash = await hashPassword(password)
  await inTransaction(async (transaction) => {
    // Of two uses at once, one finds the link unused.
    const [count] = await PasswordReset.update({ usedAt: new Date() }, { where: { id: reset.id, usedAt: null }, transaction })
    if (count === 0) throw usedUp()
    await PasswordReset.update({ usedAt: new Date() }, { where: { memberId: member.id, usedAt: null }, transaction })
    await Member.update({ passwordHash }, { where: { id: member.id }, transaction })
    await endSessions(member.id, transaction)
    await recordAudit(transaction, { act: 'password.reset', actorId: member.id, groupId: member.groupId, subject: { kind: 'member', id: member.id, label: member.name } })
  })
}
