import type { Transaction } from 'sequelize'
import { select } from '../db.ts'

const ids = (rows: { id: string }[]): string[] => rows.map(({ id }) => id)

/** Active leads of a group. */
export async function leadsOf(groupId: string, transaction: Transaction): Promise<string[]> {
  return ids(await select<{ id: string }>(`SELECT id FROM members WHERE group_id = $groupId AND state = 'active' AND 'lead' = ANY (roles) ORDER BY id`, { groupId }, transaction))
}

/** Leads who may sign a claim: neither its author nor ever its referees. Where nobody is left, all leads, who then have to find one. */
export async function signatoriesOf(claim: { id: string; groupId: string; authorId: string }, transaction: Transaction): Promise<string[]> {
  const barred = await select<{ id: string }>(
    `SELECT referee_id AS id FROM assignments WHERE claim_id = $claimId AND (state <> 'declined' OR verdict IS NOT NULL)`,
    { claimId: claim.id },
    transaction,
  )
  const leads = await leadsOf(claim.groupId, transaction)
  const free = leads.filter((id) => id !== claim.authorId && !barred.some((referee) => referee.id === id))
  return free.length > 0 ? free : leads
}

/** Referees who are asked or at work. */
export async function refereesAtWork(claimId: string, transaction: Transaction): Promise<string[]> {
  return ids(await select<{ id: string }>(`SELECT referee_id AS id FROM assignments WHERE claim_id = $claimId AND state <> 'declined' ORDER BY asked_at, id`, { claimId }, transaction))
}

/** Referees who have said something about a claim. */
export async function refereesWithVerdict(claimId: string, transaction: Transaction): Promise<string[]> {
  return ids(await select<{ id: string }>('SELECT DISTINCT referee_id AS id FROM assignments WHERE claim_id = $claimId AND verdict IS NOT NULL ORDER BY referee_id', { claimId }, transaction))
}
