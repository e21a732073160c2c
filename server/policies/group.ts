import { hasRight, type Role } from '../../shared/permissions.ts'

type Actor = { groupId: string; roles: readonly Role[] }

/** What a member may do with their own group. */
export const groupAbilities = ({ roles }: Actor) => ({
  setRules: hasRight(roles, 'group.set-rules'),
  manageMembers: hasRight(roles, 'members.manage'),
  readAudit: hasRight(roles, 'audit.read'),
  manageOutbox: hasRight(roles, 'outbox.manage'),
  leave: true,
})
