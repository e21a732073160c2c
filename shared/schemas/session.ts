import { z } from 'zod'
import { id, instant, shortText } from './common.ts'
import { email, newPassword, password, role } from './member.ts'

/** POST /session */
export const signInInput = z.object({ email, password })
export type SignInInput = z.input<typeof signInInput>

/** GET /session: who is reading. `member` is null for a reader without account. */
export const session = z.object({
  member: z
    .object({
      id,
      name: z.string(),
      email: z.string(),
      roles: z.array(role),
      /** Rights of shared/permissions.ts, so that the client shows what this person may do. */
      rights: z.array(z.string()),
      group: z.object({ id, name: z.string() }),
    })
    .nullable(),
  /** What waits, for the navigation. */
  counts: z.object({ desk: z.number().int(), runs: z.number().int() }),
})
export type Session = z.infer<typeof session>

/** GET /sessions: where one is signed in. */
export const ownSession = z.object({
  id,
  /** The one that asks. */
  current: z.boolean(),
  address: z.string(),
  userAgent: z.string(),
  createdAt: instant,
  lastSeenAt: instant,
  expiresAt: instant,
})
export type OwnSession = z.infer<typeof ownSession>
export const ownSessionList = z.object({ items: z.array(ownSession) })

/** PUT /password: all other sessions end. */
export const passwordChange = z.object({ current: password, next: newPassword })

/** POST /password-resets: always answered alike, whether the address is known or not. */
export const passwordResetInput = z.object({ email })
/** GET /password-resets/:token */
export const passwordResetOffer = z.object({ email: z.string(), expiresAt: instant })
/** POST /password-resets/:token: all sessions end. */
export const passwordResetCompletion = z.object({ password: newPassword })

/** What an access token may do: read what its owner reads; also start runs and rechecks; also state constants and draft claims. */
export const tokenScope = z.enum(['read', 'run', 'draft'])
export type TokenScope = z.infer<typeof tokenScope>

/** POST /access-tokens */
export const accessTokenInput = z.object({
  name: shortText,
  scopes: z
    .array(tokenScope)
    .min(1, 'choose at least one')
    .transform((list) => tokenScope.options.filter((scope) => list.includes(scope))),
  /** Days until it expires. */
  days: z.number().int().min(1, 'at least one day').max(365, 'at most a year'),
})
export type AccessTokenInput = z.input<typeof accessTokenInput>
export const accessToken = z.object({
  id,
  name: z.string(),
  scopes: z.array(tokenScope),
  state: z.enum(['active', 'expired', 'revoked']),
  createdAt: instant,
  expiresAt: instant,
  lastUsedAt: instant.nullable(),
})
export type AccessToken = z.infer<typeof accessToken>
export const accessTokenList = z.object({ items: z.array(accessToken) })
/** Answer to POST: the only time that the token itself is shown. */
export const accessTokenCreated = accessToken.extend({ token: z.string() })
