import { claimSlug, constantNumberText } from '../../shared/constant-number.ts'
import { select } from '../db.ts'
import { PUBLIC } from '../queries/audience.ts'

/** What readers ask for by name: taken from the database once, before the clock runs. */
export interface Facts {
  /** Constants and claims that are open to everybody. */
  constants: string[]
  claims: string[]
  /** Beginnings of best enclosures, with all the digits that both ends share. */
  digits: string[]
  groups: string[]
  evidence: string[]
  estimates: string[]
  invitation: string
}

const SAMPLE = 300

/** A sample spread evenly over the register, so that it does not depend on chance. */
export async function gatherFacts(invitation: string): Promise<Facts> {
  const known = await select<{ number: number; digits: string }>(
    `SELECT number, trunc(best_lo, least(coalesce(digits_truncated, 0), 40))::text AS digits FROM register_entries
     WHERE audience = $audience AND best_lo > 0 AND digits_truncated >= 4 ORDER BY md5(number::text) LIMIT ${SAMPLE}`,
    { audience: PUBLIC },
  )
  const claims = await select<{ number: number; ordinal: number }>(
    `SELECT c.number, cl.ordinal FROM claims cl JOIN constants c ON c.id = cl.constant_id JOIN groups g ON g.id = cl.group_id
     WHERE cl.signed_at IS NOT NULL AND g.public ORDER BY md5(cl.id::text) LIMIT ${SAMPLE}`,
  )
  const evidence = await select<{ id: string }>(
    `SELECT e.id FROM evidence e JOIN claims cl ON cl.id = e.claim_id JOIN groups g ON g.id = cl.group_id WHERE cl.signed_at IS NOT NULL AND g.public ORDER BY e.id LIMIT ${SAMPLE}`,
  )
  const estimates = await select<{ id: string }>(`SELECT DISTINCT unnest(estimates) AS id FROM (SELECT estimates FROM runs WHERE estimates <> '{}' LIMIT 5000) AS newest ORDER BY id`)
  return {
    constants: known.map(({ number }) => constantNumberText(number)),
    claims: claims.map(({ number, ordinal }) => claimSlug(number, ordinal)),
    digits: known.map(({ digits }) => digits),
    groups: (await select<{ id: string }>('SELECT id FROM groups WHERE public ORDER BY name')).map(({ id }) => id),
    evidence: evidence.map(({ id }) => id),
    estimates: estimates.map(({ id }) => id),
    invitation,
  }
}
