import { recordAudit } from '../audit/record.ts'
import type { Json } from '../audit/canonical.ts'
import { inTransaction } from '../db.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Group } from '../models/group.ts'
import { reconsiderGroup } from './claim-consequences.ts'
import { refreshGroup } from './constant-best.ts'

type Rules = Pick<Group, 'confirmationsNeeded' | 'recheckNeeded' | 'reminderDays' | 'public'>
type RulesPatch = { [Rule in keyof Rules]?: Rules[Rule] | undefined }

/** Sets rules of the lead's own group. The trail shows each rule that changed, before and after. */
export async function changeRules(actor: SignedInMember, patch: RulesPatch): Promise<Group> {
  return inTransaction(async (transaction) => {
    const group = await Group.findByPk(actor.groupId, { transaction, lock: true, rejectOnEmpty: true })
    const changed = (Object.keys(patch) as (keyof Rules)[]).filter((rule) => patch[rule] !== undefined && patch[rule] !== group[rule])
    if (changed.length === 0) return group
    const values = (source: RulesPatch): { [key: string]: Json } => Object.fromEntries(changed.map((rule) => [rule, source[rule] as Json]))
    const detail = { from: values(group), to: values(patch) }
    await group.update(Object.fromEntries(changed.map((rule) => [rule, patch[rule]])), { transaction })
    if (changed.includes('public')) await refreshGroup(transaction, group.id)
    await recordAudit(transaction, { act: 'group.rules', actorId: actor.id, groupId: group.id, subject: { kind: 'group', id: group.id, label: group.name }, detail })
    // What was missing before may be enough now.
    if (changed.includes('confirmationsNeeded') || changed.includes('recheckNeeded')) await reconsiderGroup(transaction, group.id)
    return group
  })
}
