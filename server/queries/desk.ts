import { hasRight } from '../../shared/permissions.ts'
import type { Desk } from '../../shared/schemas/claim.ts'
import { selectByKey } from '../db.ts'
import type { SignedInMember } from '../middleware/request.ts'

type Part = keyof Desk['total']
type Kind = Desk[Part][number]['kind']

/** Something that waits for a member: on which claim, since when, and a name or a number for its wording. */
export interface WaitingRow {
  part: Part
  kind: Kind
  claim_id: string
  since: Date
  who: string | null
  count: number
  /** How much waits in this part in all. */
  in_part: number
}

/** Items of one part that a desk shows: those that have waited longest. */
export const MOST_ON_DESK = 100

/** What an author is to do: finish drafts, answer objections, resubmit. */
const RESEARCHER = `
  SELECT 'researcher' AS part, CASE WHEN c.state = 'draft' THEN 'finish-draft' WHEN o.count > 0 THEN 'answer' ELSE 'resubmit' END AS kind,
         c.id AS claim_id, coalesce(o.since, c.since) AS since, NULL AS who, coalesce(o.count, 0)::int AS count
  FROM claims c LEFT JOIN LATERAL (SELECT count(*) AS count, min(since) AS since FROM objections WHERE claim_id = c.id AND state IN ('open', 'upheld')) o ON true
  WHERE c.author_id = $me AND c.state IN ('draft', 'returned')`

/** What a referee is to do: answer when asked, give a verdict on the claim as it stands, settle what was answered. */
const REFEREE = `
  SELECT 'referee', CASE WHEN s.state = 'asked' THEN 'accept' WHEN o.count > 0 THEN 'settle' ELSE 'review' END, c.id,
         CASE WHEN s.state = 'asked' THEN s.asked_at WHEN o.count > 0 THEN o.since ELSE greatest(s.answered_at, c.since) END, NULL, coalesce(o.count, 0)::int
  FROM assignments s JOIN claims c ON c.id = s.claim_id
  LEFT JOIN LATERAL (SELECT count(*) AS count, min(since) AS since FROM objections WHERE assignment_id = s.id AND state = 'answered') o ON true
  WHERE s.referee_id = $me AND c.author_id <> $me
    AND (s.state = 'asked' AND c.state IN ('in-review', 'returned', 'endorsed')
      OR s.state = 'accepted' AND o.count > 0 AND c.state IN ('in-review', 'returned')
      OR s.state = 'accepted' AND c.state = 'in-review' AND o.count = 0 AND (s.verdict IS NULL OR s.verdict = 'objected' OR s.verdict_digest <> c.digest))`

/** Estimates in doubt in the group of the claim `c` that it rests on. */
const DOUBTS = 'SELECT d.estimate FROM estimate_doubts d JOIN claim_estimates u ON u.estimate = d.estimate WHERE u.claim_id = c.id AND d.group_id = c.group_id AND d.lifted_at IS NULL'

/** Whether the group has any estimate in doubt at all: asked once, before every single claim is looked at. */
const ANY_DOUBT = 'EXISTS (SELECT 1 FROM estimate_doubts WHERE group_id = $group AND lifted_at IS NULL)'

/** What a lead is to do: find referees, remind those who are late, sign what one may sign, settle conflicts, decide on what is suspended. */
const LEAD = [
  `SELECT 'lead', 'assign', c.id, c.since, NULL, 0 FROM claims c WHERE c.group_id = $group AND c.state = 'submitted'`,
  // All referees have spoken and the confirmations are still too few.
  `SELECT 'lead', 'assign', c.id, a.since, NULL, 1 FROM claims c JOIN groups g ON g.id = c.group_id
   CROSS JOIN LATERAL (
     SELECT max(s.verdict_at) AS since, count(*) FILTER (WHERE s.verdict = 'confirmed' AND s.verdict_digest = c.digest) AS confirmed,
            count(*) FILTER (WHERE s.verdict IS DISTINCT FROM 'confirmed' OR s.verdict_digest <> c.digest) AS waiting
     FROM assignments s WHERE s.claim_id = c.id AND s.state <> 'declined') a
   WHERE c.group_id = $group AND c.state = 'in-review' AND a.waiting = 0 AND a.confirmed < g.confirmations_needed AND a.since IS NOT NULL`,
  `SELECT 'lead', 'remind', c.id, min(greatest(coalesce(s.answered_at, s.asked_at), c.since)), min(m.name), count(*)::int
   FROM claims c JOIN groups g ON g.id = c.group_id JOIN assignments s ON s.claim_id = c.id JOIN members m ON m.id = s.referee_id
   WHERE c.group_id = $group AND c.state = 'in-review' AND s.state <> 'declined' AND (s.verdict IS DISTINCT FROM 'confirmed' OR s.verdict_digest <> c.digest)
     AND greatest(coalesce(s.answered_at, s.asked_at), c.since, s.reminded_at) < now() - make_interval(days => g.reminder_days)
   GROUP BY c.id`,
  `SELECT 'lead', 'sign', c.id, c.since, NULL, 0 FROM claims c WHERE c.group_id = $group AND c.state = 'endorsed' AND c.author_id <> $me AND NOT (${ANY_DOUBT} AND EXISTS (${DOUBTS}))
     AND NOT EXISTS (SELECT 1 FROM assignments s WHERE s.claim_id = c.id AND s.referee_id = $me AND (s.state <> 'declined' OR s.verdict IS NOT NULL))`,
  `SELECT 'lead', 'conflict', c.id, min(k.opened_at), NULL, count(*)::int FROM conflicts k CROSS JOIN LATERAL unnest(ARRAY[k.claim_id, k.signed_claim_id]) AS side (id) JOIN claims c ON c.id = side.id
   WHERE c.group_id = $group AND k.closed_at IS NULL GROUP BY c.id`,
  `SELECT 'lead', 'decide', c.id, c.since, CASE WHEN ${ANY_DOUBT} THEN (SELECT min(d.estimate) FROM (${DOUBTS}) d) END, 0 FROM claims c WHERE c.group_id = $group AND c.state = 'suspended'`,
]

/** What waits for a member, by the rights of their roles, as SQL; null where their roles make nothing wait. */
function waitingSql(roles: SignedInMember['roles']): string | null {
  const parts = [
    ...(hasRight(roles, 'research') ? [RESEARCHER] : []),
    ...(hasRight(roles, 'referee') ? [REFEREE] : []),
    ...(hasRight(roles, 'claims.decide') ? LEAD : []),
  ]
  if (parts.length === 0) return null
  const named = `SELECT NULL AS part, NULL AS kind, NULL::uuid AS claim_id, NULL::timestamptz AS since, NULL AS who, 0 AS count WHERE $me::uuid IS NULL OR $group::uuid IS NULL`
  return [named, ...parts].join(' UNION ALL ')
}

/** What waits for a member, longest waiting first, up to `most` items a part. */
export async function waitingFor(member: Pick<SignedInMember, 'id' | 'groupId' | 'roles'>, most = Number.MAX_SAFE_INTEGER): Promise<WaitingRow[]> {
  const waiting = waitingSql(member.roles)
  if (waiting === null) return []
  return selectByKey<WaitingRow>(
    `SELECT part, kind, claim_id, since, who, count, in_part
     FROM (SELECT w.*, count(*) OVER (PARTITION BY part)::int AS in_part, row_number() OVER (PARTITION BY part ORDER BY since, claim_id, kind) AS place FROM (${waiting}) w) placed
     WHERE place <= $most ORDER BY since, claim_id, kind`,
    { me: member.id, group: member.groupId, most },
  )
}

/** How much waits for a member; drafts of one's own press nobody and do not count. */
export async function deskCount(member: Pick<SignedInMember, 'id' | 'groupId' | 'roles'>): Promise<number> {
  const waiting = waitingSql(member.roles)
  if (waiting === null) return 0
  const [row] = await selectByKey<{ count: number }>(`SELECT count(*)::int AS count FROM (${waiting}) w WHERE kind <> 'finish-draft'`, { me: member.id, group: member.groupId })
  return row?.count ?? 0
}
