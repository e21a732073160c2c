import type { Account, Member as MemberView } from '../../shared/schemas/member.ts'
import type { SignedInMember } from '../middleware/request.ts'
import type { Member } from '../models/member.ts'
import { memberAbilities } from '../policies/member.ts'

export const presentMember = (member: Member, reader: SignedInMember): MemberView => ({
  id: member.id,
  name: member.name,
  email: member.email,
  roles: member.roles,
  state: member.state,
  joinedAt: member.createdAt.toISOString(),
  leftAt: member.leftAt?.toISOString() ?? null,
  mailBouncedAt: member.mailBouncedAt?.toISOString() ?? null,
  abilities: memberAbilities(reader, member),
})

/** One's own account. A mail that was never switched off is wanted. */
export const presentAccount = (member: Member, group: { id: string; name: string }): Account => ({
  id: member.id,
  name: member.name,
  email: member.email,
  roles: member.roles,
  group: { id: group.id, name: group.name },
  mailPreferences: { 'claim-signed': true, 'claim-suspended': true, 'claim-withdrawn': true, ...member.mailPreferences },
})
