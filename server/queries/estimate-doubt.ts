import type { Transaction } from 'sequelize'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { select, selectOne } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

export interface DoubtRow {
  id: string
  estimate: string
  group_id: string
  group_name: string
  marked_by: string
  marker_name: string
  marked_at: Date
  reason: string
  lifted_at: Date | null
  lift_reason: string | null
}

const DOUBT = `SELECT d.id, d.estimate, d.group_id, g.name AS group_name, d.marked_by, m.name AS marker_name, d.marked_at, d.reason, d.lifted_at, d.lift_reason
  FROM estimate_doubts d JOIN groups g ON g.id = d.group_id JOIN members m ON m.id = d.marked_by`

/** Doubts about these estimates, lifted ones too, that this reader may know of: of their own group and of groups that publish. */
export const doubtsOfEstimates = (reader: Reader, ids: readonly string[]): Promise<DoubtRow[]> =>
  select(`${DOUBT} WHERE d.estimate = ANY ($ids::text[]) AND (g.public OR g.id = $audience) ORDER BY d.marked_at, d.id`, { ids, audience: audienceOf(reader) })

/** Doubts that are open about what a claim rests on, as far as this reader may know of them. */
export const doubtsOfClaim = (reader: Reader, claimId: string): Promise<DoubtRow[]> =>
  select(
    `${DOUBT} WHERE d.lifted_at IS NULL AND (g.public OR g.id = $audience) AND d.estimate IN (SELECT estimate FROM claim_estimates WHERE claim_id = $claimId) ORDER BY d.marked_at, d.id`,
    { claimId, audience: audienceOf(reader) },
  )

/** The open doubt of a group about an estimate. */
export const openDoubt = (groupId: string, estimate: string, transaction?: Transaction): Promise<DoubtRow | undefined> =>
  selectOne(`${DOUBT} WHERE d.group_id = $groupId AND d.estimate = $estimate AND d.lifted_at IS NULL`, { groupId, estimate }, transaction)

/** Ids of the estimates that a group has in doubt. */
export async function estimatesInDoubt(groupId: string, transaction?: Transaction): Promise<string[]> {
  const rows = await select<{ estimate: string }>('SELECT estimate FROM estimate_doubts WHERE group_id = $groupId AND lifted_at IS NULL ORDER BY estimate', { groupId }, transaction)
  return rows.map(({ estimate }) => estimate)
}

/** What a claim is about: its constant `k`, of an order the lesser, with the greater `g`. */
const ABOUT = `k.text || coalesce(' < ' || g.text, '')`

/** A claim that rests on an estimate. */
export interface RestingRow {
  id: string
  kind: 'enclosure' | 'stated' | 'order'
  state: ClaimState
  version: number
  ordinal: number
  constant_id: string
  number: number
  /** Its constant in words; for an order both, as "… < …". */
  text: string
  author_id: string
  author_name: string
  /** For an order: the claims on the estimate whose enclosures it compares. */
  through: { id: string; number: number; ordinal: number }[]
  /** Whether a doubt has suspended it, and it has been suspended ever since. */
  by_doubt: boolean
}

/**
 * Every claim of a group, from its submission on, that rests on an estimate, of which an order comes after the enclosures that it may
 * rest on, and a superseded claim before the one that superseded it: in this order they can be suspended one after the other.
 */
export const claimsOnEstimate = (groupId: string, estimate: string, transaction?: Transaction): Promise<RestingRow[]> =>
  select(
    `SELECT c.id, c.kind, c.state, c.version, c.ordinal, c.constant_id, k.number, ${ABOUT} AS text, c.author_id, m.name AS author_name, u.through,
       c.state = 'suspended' AND EXISTS (SELECT 1 FROM estimate_doubt_claims f WHERE f.claim_id = c.id AND f.since = c.since) AS by_doubt
     FROM claims c JOIN constants k ON k.id = c.constant_id LEFT JOIN constants g ON g.id = c.other_constant_id JOIN members m ON m.id = c.author_id
     CROSS JOIN LATERAL (
       SELECT count(*) AS uses, coalesce(jsonb_agg(DISTINCT jsonb_build_object('id', b.id, 'number', bk.number, 'ordinal', b.ordinal)) FILTER (WHERE b.id IS NOT NULL), '[]') AS through
       FROM claim_estimates used LEFT JOIN claims b ON b.id = used.through LEFT JOIN constants bk ON bk.id = b.constant_id
       WHERE used.claim_id = c.id AND used.estimate = $estimate) u
     WHERE c.group_id = $groupId AND c.state NOT IN ('draft', 'withdrawn') AND u.uses > 0
       AND c.id IN (
         SELECT own.id FROM claims own WHERE own.run_id = ANY (ARRAY(SELECT r.id FROM runs r WHERE r.state = 'done' AND r.estimates @> ARRAY[$estimate]::text[]))
         UNION ALL SELECT o.id FROM claims o WHERE o.kind = 'order')
     ORDER BY c.kind = 'order', k.number, c.state <> 'superseded', c.hi - c.lo DESC, c.ordinal`,
    { groupId, estimate },
    transaction,
  )

/** What of an estimate's constants could be computed anew: with what goal, what stands without it, and what has been started since. */
export interface AgainRow {
  constant_id: string
  number: number
  definition: unknown
  latex: string
  text: string
  aliases: string[]
  goal: { digits: number } | { width: string } | { cutoff: string }
  digits: number | null
  /** The narrowest other enclosure in force that does not rest on the estimate. */
  other_ordinal: number | null
  other_digits: number | null
  run_id: string | null
  run_state: 'queued' | 'running' | 'done' | 'failed' | 'stopped' | null
}

/** For each constant with one of these enclosures: the narrowest of them that a run has computed, to be computed again without the estimate. */
export const constantsToRunAgain = (groupId: string, estimate: string, claimIds: readonly string[], since: Date | null): Promise<AgainRow[]> =>
  select(
    `SELECT k.id AS constant_id, k.number, k.definition, k.latex, k.text, k.aliases, narrowest.goal, narrowest.digits,
       other.ordinal AS other_ordinal, other.digits AS other_digits, again.id AS run_id, again.state AS run_state
     FROM constants k
     CROSS JOIN LATERAL (
       SELECT r.goal, c.digits_truncated AS digits FROM claims c JOIN runs r ON r.id = c.run_id WHERE c.constant_id = k.id AND c.id = ANY ($claimIds::uuid[]) ORDER BY c.hi - c.lo, c.id LIMIT 1) narrowest
     LEFT JOIN LATERAL (
       SELECT c.ordinal, c.digits_truncated AS digits FROM claims c JOIN groups g ON g.id = c.group_id
       WHERE c.constant_id = k.id AND c.state IN ('signed', 'superseded') AND c.lo IS NOT NULL AND (g.public OR g.id = $groupId)
         AND NOT EXISTS (SELECT 1 FROM runs u WHERE u.id = c.run_id AND $estimate = ANY (u.estimates))
       ORDER BY c.hi - c.lo, c.id LIMIT 1) other ON true
     LEFT JOIN LATERAL (
       SELECT r.id, r.state FROM runs r WHERE r.constant_id = k.id AND r.group_id = $groupId AND r.purpose = 'run' AND r.created_at >= $since::timestamptz AND NOT $estimate = ANY (r.estimates)
       ORDER BY r.created_at DESC LIMIT 1) again ON true
     WHERE k.id = ANY (ARRAY(SELECT constant_id FROM claims WHERE id = ANY ($claimIds::uuid[])))
     ORDER BY k.number`,
    { groupId, estimate, claimIds, since },
  )

export interface OtherRow {
  number: number
  ordinal: number
  text: string
  member_id: string
  part: 'reviewed' | 'refereed' | 'rests-on-it'
}

/**
 * Who is to hear of a doubt beside the authors of a group's claims: referees of what waits, those who have said their word on what falls, and
 * authors elsewhere of orders that rest on it.
 */
export const othersTouched = (fallen: readonly string[], waiting: readonly string[], transaction: Transaction): Promise<OtherRow[]> =>
  select(
    `SELECT k.number, c.ordinal, ${ABOUT} AS text, touched.member_id, touched.part
     FROM (
       SELECT s.claim_id, s.referee_id AS member_id, 'reviewed' AS part FROM assignments s WHERE s.claim_id = ANY ($waiting::uuid[]) AND s.state <> 'declined'
       UNION
       SELECT s.claim_id, s.referee_id, 'refereed' FROM assignments s WHERE s.claim_id = ANY ($fallen::uuid[]) AND s.state <> 'declined' AND s.verdict IS NOT NULL
       UNION
       SELECT o.id, o.author_id, 'rests-on-it' FROM claims o CROSS JOIN LATERAL jsonb_array_elements((o.basis->'lesser'->'claims') || (o.basis->'greater'->'claims')) AS side (claim)
       WHERE o.kind = 'order' AND o.state NOT IN ('draft', 'withdrawn') AND (side.claim->>'id')::uuid = ANY ($fallen::uuid[])) touched
     JOIN claims c ON c.id = touched.claim_id JOIN constants k ON k.id = c.constant_id LEFT JOIN constants g ON g.id = c.other_constant_id ORDER BY k.number, c.ordinal, touched.member_id`,
    { fallen, waiting },
    transaction,
  )
