import { claimNumberText } from '../../shared/constant-number.ts'
import { change } from '../db.ts'
import { recordClaim, type LockedClaim } from './claim-locked.ts'

interface Changed {
  ordinal: number
}

/** Claims `a` and `b` contradict each other: both are before the register, one is signed, and their enclosures have no common point. */
const CONTRADICT = `a.constant_id = b.constant_id AND a.id <> b.id AND (a.lo > b.hi OR a.hi < b.lo)
  AND a.state NOT IN ('draft', 'withdrawn') AND b.state NOT IN ('draft', 'withdrawn')`

/**
 * Opens a conflict with every signed claim that the locked one does not meet (or, once it is signed, with every claim that does not meet
 * it), and closes those that are no more: one side withdrawn, or its enclosure replaced by one that meets.
 */
export async function refreshConflicts({ transaction, claim, constant }: LockedClaim): Promise<void> {
  const closed = await change<Changed>(
    `UPDATE conflicts k SET closed_at = now() FROM claims a, claims b
     WHERE k.closed_at IS NULL AND $id IN (k.claim_id, k.signed_claim_id) AND a.id = $id AND b.id IN (k.claim_id, k.signed_claim_id) AND b.id <> a.id
       AND NOT (${CONTRADICT}) RETURNING b.ordinal`,
    { id: claim.id },
    transaction,
  )
  const opened = await change<Changed>(
    `INSERT INTO conflicts (claim_id, signed_claim_id)
     SELECT CASE WHEN b.state = 'signed' THEN a.id ELSE b.id END, CASE WHEN b.state = 'signed' THEN b.id ELSE a.id END
     FROM claims a JOIN claims b ON ${CONTRADICT} WHERE a.id = $id AND 'signed' IN (a.state, b.state)
     ON CONFLICT DO NOTHING
     RETURNING (SELECT ordinal FROM claims WHERE id IN (claim_id, signed_claim_id) AND id <> $id)`,
    { id: claim.id },
    transaction,
  )
  for (const [act, changed] of [['conflict-closed', closed], ['conflict', opened]] as const) {
    for (const { ordinal } of changed) {
      const detail = { with: claimNumberText(constant.number, ordinal) }
      await recordClaim(transaction, claim, constant, { act, actorId: null, from: claim.state, to: claim.state, detail })
    }
  }
}
