import type { Role } from '../../../../shared/permissions.ts'

/** What a member with this role does. */
export const ROLE_WORDS: Record<Role, string> = {
  researcher: 'states constants, starts runs, and drafts and submits claims',
  referee: 'rechecks the claims assigned to them, holds digits against them, and objects or confirms',
  lead: 'assigns referees, signs claims into the register, and keeps the group: its members, its rules, its audit trail',
}
