import { z } from 'zod'
import { ROLES } from '../permissions.ts'
import { id, instant, personRef, shortText } from './common.ts'

export const role = z.enum(ROLES)
/** Roles as they are given to somebody: at least one, each once. */
export const roles = z
  .array(role)
  .min(1, 'choose at least one role')
  .transform((list) => ROLES.filter((each) => list.includes(each)))
export const email = z.email('write an e-mail address').max(254).transform((text) => text.toLowerCase())

const BCRYPT_BYTES = 72
/** A new password. bcrypt looks at 72 bytes; a longer one is refused rather than cut. */
export const newPassword = z
  .string()
  .min(12, 'has at least 12 characters')
  .refine((text) => new TextEncoder().encode(text).length <= BCRYPT_BYTES, `has at most ${BCRYPT_BYTES} bytes`)
/** A password that is only compared. */
export const password = z.string().min(1, 'is needed').max(200)

/** Mails that a person may switch off; all others ask for an act and always go out. */
export const mailPreferences = z.object({ 'claim-signed': z.boolean(), 'claim-suspended': z.boolean(), 'claim-withdrawn': z.boolean() })
export type MailPreferences = z.infer<typeof mailPreferences>

/** GET /group/members */
export const member = z.object({
  id,
  name: z.string(),
  email: z.string(),
  roles: z.array(role),
  state: z.enum(['active', 'left']),
  joinedAt: instant,
  leftAt: instant.nullable(),
  /** Since when mail to this address comes back; null while it arrives. */
  mailBouncedAt: instant.nullable(),
  abilities: z.object({ changeRoles: z.boolean(), endMembership: z.boolean() }),
})
export type Member = z.infer<typeof member>
export const memberList = z.object({ items: z.array(member) })

/** PATCH /group/members/:id */
export const memberPatch = z.object({ roles })
/** POST /group/departure: leaving the group for good, with the password again. */
export const departureInput = z.object({ password })

/** GET, PATCH /account */
export const account = z.object({ id, name: z.string(), email: z.string(), roles: z.array(role), group: z.object({ id, name: z.string() }), mailPreferences })
export type Account = z.infer<typeof account>
export const accountPatch = z.object({ name: shortText.optional(), mailPreferences: mailPreferences.partial().optional() })

/** POST /invitations */
export const invitationInput = z.object({ email, name: shortText, roles })
export type InvitationInput = z.input<typeof invitationInput>
export const invitation = z.object({
  id,
  email: z.string(),
  name: z.string(),
  roles: z.array(role),
  state: z.enum(['open', 'accepted', 'expired', 'revoked']),
  invitedBy: personRef.nullable(),
  createdAt: instant,
  expiresAt: instant,
  abilities: z.object({ resend: z.boolean(), revoke: z.boolean() }),
})
export type Invitation = z.infer<typeof invitation>
export const invitationList = z.object({ items: z.array(invitation) })

/** A one-time token as it stands in a mailed link. */
export const oneTimeToken = z.object({ token: z.string().min(20).max(100) })
/** GET /invitations/accept/:token: what one is invited to. */
export const invitationOffer = z.object({ email: z.string(), name: z.string(), group: z.string(), roles: z.array(role), invitedBy: z.string(), expiresAt: instant })
export type InvitationOffer = z.infer<typeof invitationOffer>
/** POST /invitations/accept/:token: the account is made and signed in. */
export const invitationAcceptance = z.object({ name: shortText, password: newPassword })
