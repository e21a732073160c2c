import type { Invitation as InvitationView, InvitationOffer } from '../../shared/schemas/member.ts'
import type { SignedInMember } from '../middleware/request.ts'
import type { Invitation } from '../models/invitation.ts'
import { invitationState, mayManageInvitation } from '../policies/invitation.ts'

type Inviter = { id: string; name: string } | null

export function presentInvitation(invitation: Invitation, inviter: Inviter, reader: SignedInMember): InvitationView {
  const manageable = mayManageInvitation(reader, invitation)
  return {
    id: invitation.id,
    email: invitation.email,
    name: invitation.name,
    roles: invitation.roles,
    state: invitationState(invitation),
    invitedBy: inviter && { id: inviter.id, name: inviter.name },
    createdAt: invitation.createdAt.toISOString(),
    expiresAt: invitation.expiresAt.toISOString(),
    abilities: { resend: manageable, revoke: manageable },
  }
}

export const presentOffer = (invitation: Invitation, inviter: Inviter, group: { name: string }): InvitationOffer => ({
  email: invitation.email,
  name: invitation.name,
  group: group.name,
  roles: invitation.roles,
  invitedBy: inviter?.name ?? group.name,
  expiresAt: invitation.expiresAt.toISOString(),
})
