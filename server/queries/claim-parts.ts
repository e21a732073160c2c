import type { Claim } from '../../shared/schemas/claim.ts'
import { selectByKey } from '../db.ts'

/** What hangs on a claim, each list first things first. */

export interface EvidenceRow {
  id: string
  name: string
  media_type: string
  bytes: number
  digest: string
  uploaded_by: string
  uploader_name: string
  uploaded_at: Date
}

export const evidenceOf = (claimId: string): Promise<EvidenceRow[]> =>
  selectByKey(
    `SELECT e.id, e.name, e.media_type, e.bytes, e.digest, e.uploaded_by, m.name AS uploader_name, e.uploaded_at
     FROM evidence e JOIN members m ON m.id = e.uploaded_by WHERE e.claim_id = $claimId ORDER BY e.uploaded_at, e.id`,
    { claimId },
  )

export interface AssignmentRow {
  id: string
  referee_id: string
  referee_name: string
  referee_group: string
  state: Claim['assignments'][number]['state']
  decline_reason: string | null
  verdict: 'confirmed' | 'objected' | null
  verdict_current: boolean
  remark: string | null
  checklist: { item: string; checked: boolean }[]
  asked_at: Date
  answered_at: Date | null
  verdict_at: Date | null
}

export const assignmentsOf = (claimId: string): Promise<AssignmentRow[]> =>
  selectByKey(
    `SELECT s.id, s.referee_id, m.name AS referee_name, g.name AS referee_group, s.state, s.decline_reason, s.verdict, coalesce(s.verdict_digest = c.digest, false) AS verdict_current,
       s.remark, s.checklist, s.asked_at, s.answered_at, s.verdict_at
     FROM assignments s JOIN claims c ON c.id = s.claim_id JOIN members m ON m.id = s.referee_id JOIN groups g ON g.id = m.group_id WHERE s.claim_id = $claimId ORDER BY s.asked_at, s.id`,
    { claimId },
  )

export interface ObjectionRow {
  id: string
  referee_id: string
  referee_name: string
  referee_gone: boolean
  state: Claim['objections'][number]['state']
  messages: { author_id: string; author_name: string; text: string; at: string }[]
}

export const objectionsOf = (claimId: string): Promise<ObjectionRow[]> =>
  selectByKey(
    `SELECT o.id, s.referee_id, m.name AS referee_name, s.state = 'declined' OR m.state <> 'active' OR NOT 'referee' = ANY (m.roles) AS referee_gone, o.state,
       (SELECT json_agg(json_build_object('author_id', w.id, 'author_name', w.name, 'text', t.text, 'at', t.at) ORDER BY t.at, t.id)
        FROM objection_messages t JOIN members w ON w.id = t.author_id WHERE t.objection_id = o.id) AS messages
     FROM objections o JOIN assignments s ON s.id = o.assignment_id JOIN members m ON m.id = s.referee_id WHERE o.claim_id = $claimId ORDER BY o.raised_at, o.id`,
    { claimId },
  )

export interface RecheckRow {
  id: string
  started_by: string
  starter_name: string
  state: Claim['rechecks'][number]['state']
  progress: string
  method: Claim['rechecks'][number]['method']
  arithmetic: Claim['rechecks'][number]['arithmetic']
  lo: string | null
  hi: string | null
  verdict: 'meets' | 'disjoint' | null
  independent: boolean
  finished_at: Date | null
  failure: string | null
}

export const rechecksOf = (claimId: string): Promise<RecheckRow[]> =>
  selectByKey(
    `SELECT r.id, r.started_by, m.name AS starter_name, r.state, r.progress, r.method, r.arithmetic, e.lo, e.hi, r.finished_at, r.failure,
       CASE WHEN e.lo IS NULL OR c.lo IS NULL THEN NULL WHEN e.lo::numeric <= c.hi AND e.hi::numeric >= c.lo THEN 'meets' ELSE 'disjoint' END AS verdict,
       own.id IS NULL OR own.method <> r.method OR own.arithmetic <> r.arithmetic AS independent
     FROM runs r JOIN claims c ON c.id = r.claim_id JOIN members m ON m.id = r.started_by LEFT JOIN runs own ON own.id = c.run_id
     CROSS JOIN LATERAL (SELECT r.outcome->'enclosure'->>'lo' AS lo, r.outcome->'enclosure'->>'hi' AS hi) e
     WHERE r.claim_id = $claimId ORDER BY r.created_at, r.id`,
    { claimId },
  )

export interface ConflictRow {
  other_id: string
  number: number
  ordinal: number
  opened_at: Date
  closed_at: Date | null
  /** Whether the other claim is open to everybody. */
  open: boolean
  other_group: string
}

export const conflictsOfClaim = (claimId: string): Promise<ConflictRow[]> =>
  selectByKey(
    `SELECT other.id AS other_id, c.number, other.ordinal, k.opened_at, k.closed_at, other.signed_at IS NOT NULL AND g.public AS open, other.group_id AS other_group
     FROM conflicts k JOIN claims other ON other.id = CASE WHEN k.claim_id = $claimId THEN k.signed_claim_id ELSE k.claim_id END JOIN constants c ON c.id = other.constant_id JOIN groups g ON g.id = other.group_id
     WHERE k.claim_id = $claimId OR k.signed_claim_id = $claimId ORDER BY k.opened_at, k.id`,
    { claimId },
  )

/** Members of any group who may be asked to referee a claim. */
export const possibleRefereesOf = (claimId: string): Promise<{ id: string; name: string; group: string }[]> =>
  selectByKey(
    `SELECT m.id, m.name, g.name AS "group" FROM members m JOIN groups g ON g.id = m.group_id JOIN claims c ON c.id = $claimId
     WHERE m.state = 'active' AND 'referee' = ANY (m.roles) AND m.id <> c.author_id
       AND NOT EXISTS (SELECT 1 FROM assignments s WHERE s.claim_id = c.id AND s.referee_id = m.id AND s.state <> 'declined')
     ORDER BY m.group_id <> c.group_id, g.name, m.name, m.id LIMIT 500`,
    { claimId },
  )

/** A referee's own verdict while it is being written. */
export async function verdictDraftOf(claimId: string, memberId: string): Promise<string | null> {
  const [row] = await selectByKey<{ draft: string | null }>(`SELECT draft FROM assignments WHERE claim_id = $claimId AND referee_id = $memberId AND state <> 'declined'`, { claimId, memberId })
  return row?.draft ?? null
}
