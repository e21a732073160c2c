/** Roles of a member and the rights that they carry. What else a rule forbids (one's own claim, say) is checked on the loaded row. */
export const ROLES = ['researcher', 'referee', 'lead'] as const
export type Role = (typeof ROLES)[number]

/** Each right with the roles that have it: the table of who may what, in one place. */
const RIGHTS = {
  /** Read the group's drafts, runs and reviews. A referee reads those assigned to them, which is checked on the claim. */
  'group-work.read': ['researcher', 'lead'],
  /** State a constant, start a run, draft and submit a claim, upload evidence and sets. */
  research: ['researcher', 'lead'],
  /** Recheck, check digits, object, confirm, decline: on the claims that one is assigned to. */
  referee: ['referee'],
  /** Assign referees, return, sign, suspend, withdraw. */
  'claims.decide': ['lead'],
  /** Invite members, add and take roles, end a membership. */
  'members.manage': ['lead'],
  'group.set-rules': ['lead'],
  'estimates.doubt': ['lead'],
  'audit.read': ['lead'],
  'outbox.manage': ['lead'],
} as const satisfies Record<string, readonly Role[]>

export type Right = keyof typeof RIGHTS

/** Whether any of these roles carries the right. */
export function hasRight(roles: readonly Role[], right: Right): boolean {
  return (RIGHTS[right] as readonly Role[]).some((role) => roles.includes(role))
}

/** Every right that these roles carry. */
export function rightsOf(roles: readonly Role[]): Right[] {
  return (Object.keys(RIGHTS) as Right[]).filter((right) => hasRight(roles, right))
}
