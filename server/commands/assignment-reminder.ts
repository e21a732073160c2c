import type { Role } from '../../shared/permissions.ts'
import { inTransaction, select } from '../db.ts'
import { claimRows } from '../queries/claim.ts'
import { waitingFor } from '../queries/desk.ts'
import { deskText } from '../presenters/desk.ts'
import { queueMail } from '../mail/outbox.ts'
import { claimPath, labelOf } from './claim-locked.ts'

interface DueMember {
  id: string
  group_id: string
  name: string
  roles: Role[]
  reminder_days: number
}

const DAY = 86_400_000

/**
 * Reminds everybody for whom something has waited longer than the days that their group has set, in one mail with all of it, and not
 * again before as many days have passed. Answers how many were reminded. To be called now and then; calling it often does no harm.
 */
export async function remindAll(now = new Date()): Promise<number> {
  const members = await select<DueMember>(
    `SELECT m.id, m.group_id, m.name, m.roles, g.reminder_days FROM members m JOIN groups g ON g.id = m.group_id
     WHERE m.state = 'active' AND NOT EXISTS (SELECT 1 FROM outbox o WHERE o.member_id = m.id AND o.template = 'reminder' AND o.created_at > $now::timestamptz - make_interval(days => g.reminder_days))`,
    { now },
  )
  let reminded = 0
  for (const member of members) if (await remind(member, now)) reminded += 1
  return reminded
}

async function remind(member: DueMember, now: Date): Promise<boolean> {
  const waiting = await waitingFor({ id: member.id, groupId: member.group_id, roles: member.roles })
  const late = waiting.filter(({ kind, since }) => kind !== 'finish-draft' && now.getTime() - since.getTime() >= member.reminder_days * DAY)
  if (late.length === 0) return false
  const claims = new Map((await claimRows(late.map(({ claim_id }) => claim_id))).map((claim) => [claim.id, claim]))
  const items = late.flatMap((row) => {
    const claim = claims.get(row.claim_id)
    return claim ? [{ number: labelOf(claim, claim), what: deskText(row), days: Math.floor((now.getTime() - row.since.getTime()) / DAY), path: claimPath(claim, claim) }] : []
  })
  await inTransaction(async (transaction) => {
    // Two workers at once write one mail: the key is the same.
    const key = `reminder:${member.id}:${Math.floor(now.getTime() / DAY)}`
    await queueMail(transaction, 'reminder', { memberId: member.id }, { name: member.name, items }, { groupId: member.group_id, dedupeKey: key })
  })
  return true
}
