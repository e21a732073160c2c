import { recordAudit } from '../audit/record.ts'
import { newToken, tokenHash } from '../auth/tokens.ts'
import { inTransaction } from '../db.ts'
import { conflict, notFound } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { AccessToken } from '../models/access-token.ts'
import type { TokenScope } from '../../shared/schemas/session.ts'

/** Names the product, so that a token that leaked into a file is recognised for what it is. */
const PREFIX = 'mst_'
const MOST = 50

/** Makes a token; the answer holds it in clear, once. */
export async function createAccessToken(
  member: SignedInMember,
  { name, scopes, days }: { name: string; scopes: TokenScope[]; days: number },
): Promise<{ row: AccessToken; token: string }> {
  const token = newToken(PREFIX)
  const expiresAt = new Date(Date.now() + days * 86_400_000)
  return inTransaction(async (transaction) => {
    const count = await AccessToken.count({ where: { memberId: member.id, revokedAt: null }, transaction })
    if (count >= MOST) throw conflict('too_many_tokens', `You have ${MOST} access tokens. Revoke one first.`)
    const row = await AccessToken.create({ memberId: member.id, name, scopes, tokenHash: tokenHash(token), expiresAt }, { transaction })
    await recordAudit(transaction, {
      act: 'access-token.create',
      actorId: member.id,
      groupId: member.groupId,
      subject: { kind: 'access-token', id: row.id, label: name },
      detail: { scopes, expiresAt: expiresAt.toISOString() },
    })
    return { row, token }
  })
}

/** Revokes one of the member's own tokens. */
export async function revokeAccessToken(member: SignedInMember, id: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const row = await AccessToken.findOne({ where: { id, memberId: member.id, revokedAt: null }, transaction, lock: true })
    if (!row) throw notFound('access token')
    await row.update({ revokedAt: new Date() }, { transaction })
    await recordAudit(transaction, { act: 'access-token.revoke', actorId: member.id, groupId: member.groupId, subject: { kind: 'access-token', id, label: row.name } })
  })
}
