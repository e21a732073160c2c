import type { AccessToken, TokenScope } from '../../../../shared/schemas/session.ts'

/** What a token with this scope may do. */
export const SCOPES: Record<TokenScope, { label: string; hint: string }> = {
  read: { label: 'read', hint: 'everything that you may read' },
  run: { label: 'run', hint: 'start, stop and resume runs' },
  draft: { label: 'draft', hint: 'state constants, draft and submit claims; reviewing and signing stay with people' },
}

export const TOKEN_STATES: Record<AccessToken['state'], string> = { active: 'in use', expired: 'expired', revoked: 'revoked' }

/** Lifetimes that are offered, in days. */
export const LIFETIMES: [days: number, words: string][] = [
  [7, 'a week'],
  [30, '30 days'],
  [90, '90 days'],
  [365, 'a year'],
]
