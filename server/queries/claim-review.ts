import type { Transaction } from 'sequelize'
import type { Facts, Standing } from '../../shared/claim-life.ts'
import { kindOf } from '../claim-kinds/kinds.ts'
import { selectByKey, selectOne } from '../db.ts'
import { notFound } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'

/** What the questions of this file need to know of a claim. */
export interface ClaimRef {
  id: string
  kind: string
  groupId: string
  authorId: string
}

/** How a member stands to a claim. */
export async function standingOf(member: SignedInMember, claim: ClaimRef, transaction?: Transaction): Promise<Standing> {
  const [row] = await selectByKey<{ active: Standing['assignment'] | null; declined: boolean; ever: boolean }>(
    `SELECT max(state) FILTER (WHERE state <> 'declined') AS active, bool_or(state = 'declined') AS declined, bool_or(state = 'accepted' OR verdict IS NOT NULL) AS ever
     FROM assignments WHERE claim_id = $claimId AND referee_id = $memberId`,
    { claimId: claim.id, memberId: member.id },
    transaction,
  )
  return {
    roles: member.roles,
    sameGroup: member.groupId === claim.groupId,
    author: member.id === claim.authorId,
    assignment: row?.active ?? (row?.declined ? 'declined' : 'none'),
    everReferee: row?.ever ?? false,
  }
}

/** What an act is about besides the claim. */
export interface ActSubject {
  objectionId?: string | undefined
  assignmentId?: string | undefined
}

interface FactsRow {
  unanswered: number
  unsettled: number
  own_unsettled: number
  own_confirmed: boolean
  active_referees: number
  confirmations: number
  confirmations_needed: number
  recheck_needed: boolean
  recheck_meets: boolean
  recheck_disjoint: boolean
  contradicted: boolean
  narrower_signed: boolean
  estimate_in_doubt: boolean
}

/** Runs that recheck the claim `c` and are done, with their enclosures and whether they are independent of the claim's own run. */
const FINISHED_RECHECKS = `
  SELECT (r.outcome->'enclosure'->>'lo')::numeric AS lo, (r.outcome->'enclosure'->>'hi')::numeric AS hi,
         own.id IS NULL OR own.method <> r.method OR own.arithmetic <> r.arithmetic AS independent
  FROM runs r LEFT JOIN runs own ON own.id = c.run_id WHERE r.claim_id = c.id AND r.state = 'done'`

const FACTS = `
  SELECT o.unanswered, o.unsettled, o.own_unsettled, a.own_confirmed, a.active_referees, a.confirmations, g.confirmations_needed, g.recheck_needed, x.*,
    EXISTS (SELECT 1 FROM conflicts k JOIN claims other ON other.id = CASE WHEN k.claim_id = c.id THEN k.signed_claim_id ELSE k.claim_id END
            WHERE (k.claim_id = c.id OR k.signed_claim_id = c.id) AND k.closed_at IS NULL AND other.state IN ('signed', 'superseded')) AS contradicted,
    EXISTS (SELECT 1 FROM claims n WHERE n.constant_id = c.constant_id AND n.id <> c.id AND n.state = 'signed' AND n.lo >= c.lo AND n.hi <= c.hi AND n.hi - n.lo < c.hi - c.lo) AS narrower_signed,
    EXISTS (SELECT 1 FROM estimate_doubts d JOIN claim_estimates u ON u.estimate = d.estimate WHERE u.claim_id = c.id AND d.group_id = c.group_id AND d.lifted_at IS NULL) AS estimate_in_doubt
  FROM claims c JOIN groups g ON g.id = c.group_id
  CROSS JOIN LATERAL (
    SELECT count(*) FILTER (WHERE o.state IN ('open', 'upheld'))::int AS unanswered, count(*) FILTER (WHERE o.state <> 'settled')::int AS unsettled,
           count(*) FILTER (WHERE o.state <> 'settled' AND s.referee_id = $memberId)::int AS own_unsettled
    FROM objections o JOIN assignments s ON s.id = o.assignment_id WHERE o.claim_id = c.id) o
  CROSS JOIN LATERAL (
    SELECT coalesce(bool_or(s.referee_id = $memberId AND s.state = 'accepted' AND s.verdict = 'confirmed' AND s.verdict_digest = c.digest), false) AS own_confirmed,
           count(*) FILTER (WHERE s.state IN ('asked', 'accepted') AND m.state = 'active' AND 'referee' = ANY (m.roles))::int AS active_referees,
           count(*) FILTER (WHERE s.state = 'accepted' AND s.verdict = 'confirmed' AND s.verdict_digest = c.digest
             AND NOT EXISTS (SELECT 1 FROM objections o WHERE o.assignment_id = s.id AND o.state <> 'settled'))::int AS confirmations
    FROM assignments s JOIN members m ON m.id = s.referee_id WHERE s.claim_id = c.id) a
  CROSS JOIN LATERAL (
    SELECT coalesce(bool_or(f.independent AND f.lo <= c.hi AND f.hi >= c.lo), false) AS recheck_meets, coalesce(bool_or(f.lo > c.hi OR f.hi < c.lo), false) AS recheck_disjoint
    FROM (${FINISHED_RECHECKS}) f) x
  WHERE c.id = $claimId`

/** The facts of a claim's review, as they are for this member (or for nobody in particular). */
export async function factsOf(claim: ClaimRef, memberId: string | null, subject: ActSubject = {}, transaction?: Transaction): Promise<Facts> {
  const [row] = await selectByKey<FactsRow>(FACTS, { claimId: claim.id, memberId }, transaction)
  if (!row) throw notFound('claim')
  const objection = subject.objectionId === undefined ? undefined : await objectionFacts(claim.id, subject.objectionId, memberId, transaction)
  const waits = subject.assignmentId === undefined ? undefined : await assignmentWaits(claim.id, subject.assignmentId, transaction)
  return {
    unanswered: row.unanswered,
    unsettled: row.unsettled,
    ownUnsettled: row.own_unsettled,
    ownConfirmed: row.own_confirmed,
    activeReferees: row.active_referees,
    confirmations: row.confirmations,
    confirmationsNeeded: row.confirmations_needed,
    recheckNeeded: row.recheck_needed && kindOf(claim).computed,
    recheckMeets: row.recheck_meets,
    recheckDisjoint: row.recheck_disjoint,
    contradicted: row.contradicted,
    narrowerSigned: row.narrower_signed,
    estimateInDoubt: row.estimate_in_doubt,
    ...(objection && { objection }),
    ...(waits !== undefined && { assignmentWaits: waits }),
  }
}

async function objectionFacts(claimId: string, objectionId: string, memberId: string | null, transaction?: Transaction): Promise<Facts['objection']> {
  const row = await selectOne<{ state: NonNullable<Facts['objection']>['state']; own: boolean; gone: boolean }>(
    `SELECT o.state, coalesce(s.referee_id = $memberId, false) AS own, s.state = 'declined' OR m.state <> 'active' OR NOT 'referee' = ANY (m.roles) AS gone
     FROM objections o JOIN assignments s ON s.id = o.assignment_id JOIN members m ON m.id = s.referee_id WHERE o.id = $objectionId AND o.claim_id = $claimId`,
    { claimId, objectionId, memberId },
    transaction,
  )
  return row && { state: row.state, own: row.own, refereeGone: row.gone }
}

/** Whether a referee still owes something: an answer to being asked, or a verdict on the claim as it stands; undefined where the claim has no such assignment. */
async function assignmentWaits(claimId: string, assignmentId: string, transaction?: Transaction): Promise<boolean | undefined> {
  const row = await selectOne<{ waits: boolean }>(
    `SELECT s.state <> 'declined' AND (s.verdict IS NULL OR s.verdict_digest <> c.digest OR EXISTS (SELECT 1 FROM objections o WHERE o.assignment_id = s.id AND o.state = 'answered')) AS waits
     FROM assignments s JOIN claims c ON c.id = s.claim_id WHERE s.id = $assignmentId AND s.claim_id = $claimId`,
    { claimId, assignmentId },
    transaction,
  )
  return row?.waits
}
