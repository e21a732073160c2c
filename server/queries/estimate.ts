import { select } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

export interface EstimateUseRow {
  estimate: string
  number: number
  ordinal: number
  used_at: string
  /** How many claims rest on this estimate in all. */
  uses: number
}

/** Signed claims open to this reader whose certificates rest on one of these estimates: of each the newest, up to `most`. */
export async function usesOfEstimates(reader: Reader, ids: string[], most: number): Promise<EstimateUseRow[]> {
  return select<EstimateUseRow>(
    `WITH open AS MATERIALIZED (SELECT id FROM groups WHERE public OR id = $audience),
     counted AS MATERIALIZED (
       SELECT estimate, count(*)::int AS uses FROM estimate_uses WHERE group_id = ANY (ARRAY(SELECT id FROM open)) AND estimate = ANY ($ids::text[]) GROUP BY estimate)
     SELECT counted.estimate, c.number, cl.ordinal, newest.used_at, counted.uses
     FROM counted
     CROSS JOIN LATERAL (
       SELECT u.claim_id, u.used_at, u.signed_at FROM estimate_uses u WHERE u.estimate = counted.estimate AND u.group_id = ANY (ARRAY(SELECT id FROM open)) ORDER BY u.signed_at DESC, u.claim_id LIMIT $most) newest
     JOIN claims cl ON cl.id = newest.claim_id JOIN constants c ON c.id = cl.constant_id ORDER BY newest.signed_at DESC, c.number`,
    { ids, audience: audienceOf(reader), most },
  )
}
