import type { Group as GroupView } from '../../shared/schemas/group.ts'
import type { SignedInMember } from '../middleware/request.ts'
import type { Group } from '../models/group.ts'
import { groupAbilities } from '../policies/group.ts'

export const presentGroup = (group: Group, reader: SignedInMember): GroupView => ({
  id: group.id,
  name: group.name,
  confirmationsNeeded: group.confirmationsNeeded,
  recheckNeeded: group.recheckNeeded,
  reminderDays: group.reminderDays,
  public: group.public,
  abilities: groupAbilities(reader),
})
