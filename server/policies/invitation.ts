import { hasRight, type Role } from '../../shared/permissions.ts'

type Actor = { groupId: string; roles: readonly Role[] }
type Subject = { groupId: string; acceptedAt: Date | null; revokedAt: Date | null; expiresAt: Date }

export type InvitationState = 'open' | 'accepted' | 'expired' | 'revoked'

export function invitationState({ acceptedAt, revokedAt, expiresAt }: Subject): InvitationState {
  if (acceptedAt) return 'accepted'
  if (revokedAt) return 'revoked'
  return expiresAt.getTime() <= Date.now() ? 'expired' : 'open'
}

/** Send again or revoke: leads of the group, until it is accepted or revoked. */
export const mayManageInvitation = (actor: Actor, invitation: Subject): boolean =>
  hasRight(actor.roles, 'members.manage') && invitation.groupId === actor.groupId && ['open', 'expired'].includes(invitationState(invitation))
