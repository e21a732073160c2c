import type { Transaction } from 'sequelize'
import { consequence, judgeRegister, type PersonAct } from '../../shared/claim-life.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { change, select } from '../db.ts'
import { onRunFinished } from '../jobs/run-finished.ts'
import { Member } from '../models/member.ts'
import type { Run } from '../models/run.ts'
import { leadsOf, signatoriesOf } from '../queries/claim-people.ts'
import { factsOf } from '../queries/claim-review.ts'
import { refreshConflicts } from './claim-conflicts.ts'
import { lockClaim, lockConstant, moveTo, recordClaim, shareClaimsOf, teller, type LockedClaim } from './claim-locked.ts'
import { settleRegister } from './claim-superseding.ts'
import { refreshBest } from './constant-best.ts'

/** What the register does of itself after an act (null: something else that touched the review) on a locked claim that was in the state `from`. */
export async function consequences(locked: LockedClaim, from: ClaimState, cause: PersonAct | null): Promise<void> {
  const { transaction, claim } = locked
  const reached = claim.state
  await reviewConsequences(locked, cause)
  if (claim.state !== from || reached !== from) {
    await refreshConflicts(locked)
    await settleRegister(locked)
  }
  await refreshBest(transaction, claim.constantId)
}

/** Endorses a claim in review when all that is needed is there, or puts it back among those that wait for a referee when none is left. */
async function reviewConsequences({ transaction, claim, constant }: LockedClaim, cause: PersonAct | null): Promise<void> {
  const facts = await factsOf(claim, null, {}, transaction)
  const act = consequence(claim.state, facts)
  if (act === undefined) return
  const move = judgeRegister(act, claim.state, facts)
  if (!move.allowed) return
  const from = claim.state
  const tell = teller(transaction, claim, constant)
  const author = await Member.findByPk(claim.authorId, { transaction, rejectOnEmpty: true })
  if (act === 'endorse') await tell('sign-request', await signatoriesOf(claim, transaction), { author: author.name, confirmations: facts.confirmations })
  // Of a referee who declines the leads are told by that very mail.
  else if (cause !== 'decline') await tell('claim-submitted', await leadsOf(claim.groupId, transaction), { author: author.name })
  await moveTo(transaction, claim, move.to)
  await recordClaim(transaction, claim, constant, { act, actorId: null, from, to: move.to, told: tell.told })
}

/** Looks again at a claim whose review may have become complete, or lost its last referee, by something that was no act on it. */
export async function reconsiderClaim(transaction: Transaction, claimId: string): Promise<void> {
  const locked = await lockClaim(transaction, claimId)
  await consequences(locked, locked.claim.state, null)
}

/** Looks again at every claim of a group that is in review: after its rules have changed, or what it holds in doubt. */
export async function reconsiderGroup(transaction: Transaction, groupId: string): Promise<void> {
  const claims = await select<{ id: string }>(`SELECT id FROM claims WHERE group_id = $groupId AND state = 'in-review' ORDER BY constant_id, id`, { groupId }, transaction)
  for (const { id } of claims) await reconsiderClaim(transaction, id)
}

/** A recheck that is done may complete a review; any run that is done may be the first to repeat a value from elsewhere. */
async function runFinished(transaction: Transaction, run: Run): Promise<void> {
  if (run.state !== 'done' || !run.outcome) return
  const { lo, hi } = run.outcome.enclosure
  await shareClaimsOf(transaction, run.groupId)
  await lockConstant(transaction, run.constantId)
  await change(
    `UPDATE claims SET repeated_here = true WHERE constant_id = $constantId AND kind = 'stated' AND NOT repeated_here AND lo <= $hi::numeric AND hi >= $lo::numeric`,
    { constantId: run.constantId, lo, hi },
    transaction,
  )
  if (run.claimId !== null) await reconsiderClaim(transaction, run.claimId)
}

onRunFinished.push(runFinished)
