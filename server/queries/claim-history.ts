import type { Transaction } from 'sequelize'
import { actParticiple, type LifeAct } from '../../shared/claim-life.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { selectByKey, selectOne } from '../db.ts'

/** One thing that happened to a claim, as the audit trail has it. */
export interface HistoryRow {
  at: Date
  actor_name: string
  act: string
  from: ClaimState | null
  to: ClaimState | null
  reason: string | null
}

/** Everything that happened to a claim, first things first. */
export async function historyOf(claimId: string): Promise<HistoryRow[]> {
  return selectByKey<HistoryRow>(
    `SELECT at, actor_name, substr(act, 7) AS act, detail->>'from' AS from, detail->>'to' AS to, reason
     FROM audit_entries WHERE subject_kind = 'claim' AND subject_id = $claimId AND act LIKE 'claim.%' ORDER BY seq`,
    { claimId },
  )
}

/** The last change of a claim in words: "signed by N. N."; undefined where none is known. */
export async function lastEvent(claimId: string, transaction?: Transaction): Promise<string | undefined> {
  const row = await selectOne<{ actor_name: string; act: LifeAct }>(
    `SELECT actor_name, substr(act, 7) AS act FROM audit_entries
     WHERE subject_kind = 'claim' AND subject_id = $claimId AND (act = 'claim.edit' OR detail->>'from' IS DISTINCT FROM detail->>'to') ORDER BY seq DESC LIMIT 1`,
    { claimId },
    transaction,
  )
  const participle = row && actParticiple(row.act)
  return participle && `${participle} by ${row.actor_name}`
}
