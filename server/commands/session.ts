import { Op, type Transaction } from 'sequelize'
import { passwordFits } from '../auth/passwords.ts'
import { countAttempt } from '../auth/throttle.ts'
import { change } from '../db.ts'
import { invalidField, notFound, Problem } from '../errors.ts'
import { Member } from '../models/member.ts'
import { Session } from '../models/session.ts'

const SESSION_DAYS = 14

/** Where a request came from, kept with the session so that its owner recognises it. */
export interface Origin {
  address: string
  userAgent: string
}

/** Checks e-mail and password, throttled per account and address, and opens a session. */
export async function signIn(email: string, password: string, origin: Origin): Promise<Session> {
  const attempt = await countAttempt(email, origin.address)
  const member = await Member.findOne({ where: { email, state: 'active' } })
  if (!(await passwordFits(password, member?.passwordHash)) || !member) {
    throw new Problem(401, 'wrong_credentials', 'The e-mail address or the password is wrong.')
  }
  await attempt.succeeded()
  return openSession(member.id, origin)
}

/** Opens a session for a member who has just proved to be them. */
export function openSession(memberId: string, { address, userAgent }: Origin, transaction?: Transaction): Promise<Session> {
  const expiresAt = new Date(Date.now() + SESSION_DAYS * 86_400_000)
  return Session.create({ memberId, address, userAgent: userAgent.slice(0, 300), expiresAt }, { transaction: transaction ?? null })
}

/** Ends one of the member's own sessions. */
export async function endSession(memberId: string, id: string): Promise<void> {
  const [count] = await Session.update({ endedAt: new Date() }, { where: { id, memberId, endedAt: null } })
  if (count === 0) throw notFound('session')
}

/** Ends all sessions of a member, or all but one. */
export async function endSessions(memberId: string, transaction: Transaction, except?: string): Promise<void> {
  await Session.update(
    { endedAt: new Date() },
    { where: { memberId, endedAt: null, ...(except !== undefined && { id: { [Op.ne]: except } }) }, transaction },
  )
}

/**
 * Lets a member who is signed in prove again who they are, before an act that weighs (signing, leaving, a new password).
 * Throttled like signing in; a wrong password is an error of the field it was typed into.
 */
export async function confirmPassword(memberId: string, password: string, address: string, field = 'password'): Promise<void> {
  const member = await Member.findByPk(memberId)
  if (!member) throw notFound('member')
  const attempt = await countAttempt(member.email, address)
  if (!(await passwordFits(password, member.passwordHash))) throw invalidField(field, 'is not your password')
  await attempt.succeeded()
}

/** Clears sessions that ended or expired long ago. */
export async function forgetOldSessions(): Promise<void> {
  await change(`DELETE FROM sessions WHERE coalesce(ended_at, expires_at) < now() - interval '90 days'`)
}
