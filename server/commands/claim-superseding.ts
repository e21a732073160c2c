import { judgeRegister } from '../../shared/claim-life.ts'
import { claimNumberText } from '../../shared/constant-number.ts'
import { select, selectOne } from '../db.ts'
import { Claim } from '../models/claim.ts'
import { factsOf } from '../queries/claim-review.ts'
import { refreshConflicts } from './claim-conflicts.ts'
import { moveTo, recordClaim, type LockedClaim } from './claim-locked.ts'

/**
 * Brings the signed claims of the locked claim's constant into order: one whose enclosure contains a narrower signed one is superseded
 * by it; one whose superseder has been suspended or withdrawn is restored. An enclosure that is wider but not around the narrower
 * one still tells something, so it stays signed. Narrow ones come first, so that one pass settles all.
 */
export async function settleRegister({ transaction, claim: acted, constant }: LockedClaim): Promise<void> {
  const entered = await select<{ id: string }>(
    `SELECT id FROM claims WHERE constant_id = $constantId AND state IN ('signed', 'superseded') AND lo IS NOT NULL ORDER BY hi - lo, signed_at, id`,
    { constantId: constant.id },
    transaction,
  )
  for (const { id } of entered) {
    const claim = id === acted.id ? acted : await Claim.findByPk(id, { transaction, lock: true, rejectOnEmpty: true })
    const facts = await factsOf(claim, null, {}, transaction)
    const act = claim.state === 'signed' ? 'supersede' : 'restore'
    const move = judgeRegister(act, claim.state, facts)
    const by = facts.narrowerSigned ? await narrowest(claim, transaction) : undefined
    claim.set({ supersededBy: by?.id ?? null })
    const from = claim.state
    await moveTo(transaction, claim, move.allowed ? move.to : from)
    if (!move.allowed) continue
    await recordClaim(transaction, claim, constant, { act, actorId: null, from, to: move.to, ...(by && { detail: { by: claimNumberText(constant.number, by.ordinal) } }) })
    if (act === 'restore') await refreshConflicts({ transaction, claim, constant })
  }
}

/** The narrowest signed claim that lies within the enclosure of this one. */
async function narrowest(claim: Claim, transaction: LockedClaim['transaction']): Promise<{ id: string; ordinal: number } | undefined> {
  return selectOne(
    `SELECT n.id, n.ordinal FROM claims c JOIN claims n ON n.constant_id = c.constant_id AND n.state = 'signed' AND n.lo >= c.lo AND n.hi <= c.hi AND n.hi - n.lo < c.hi - c.lo
     WHERE c.id = $id ORDER BY n.hi - n.lo, n.signed_at, n.id LIMIT 1`,
    { id: claim.id },
    transaction,
  )
}
