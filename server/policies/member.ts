import { hasRight, type Role } from '../../shared/permissions.ts'

type Actor = { id: string; groupId: string; roles: readonly Role[] }
type Subject = { id: string; groupId: string; state: string }

/** Change the roles of somebody, or end their membership: leads, in their own group, while the other is a member. */
export const mayManage = (actor: Actor, member: Subject): boolean =>
  hasRight(actor.roles, 'members.manage') && member.groupId === actor.groupId && member.state === 'active'

export const memberAbilities = (actor: Actor, member: Subject) => ({
  changeRoles: mayManage(actor, member),
  // One's own leaving has its own way, with the password.
  endMembership: mayManage(actor, member) && member.id !== actor.id,
})
