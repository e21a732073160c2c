import type { AccessToken as AccessTokenView } from '../../shared/schemas/session.ts'
import type { AccessToken } from '../models/access-token.ts'

function state({ revokedAt, expiresAt }: AccessToken): AccessTokenView['state'] {
  if (revokedAt) return 'revoked'
  return expiresAt.getTime() <= Date.now() ? 'expired' : 'active'
}

export const presentAccessToken = (token: AccessToken): AccessTokenView => ({
  id: token.id,
  name: token.name,
  scopes: token.scopes,
  state: state(token),
  createdAt: token.createdAt.toISOString(),
  expiresAt: token.expiresAt.toISOString(),
  lastUsedAt: token.lastUsedAt?.toISOString() ?? null,
})
