import { select } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

export interface EstimateUseRow {
  estimate: string
  number: number
  ordinal: number
  used_at: string
}

/** Signed claims open to this reader whose certificates rest on one of these estimates, by number. */
export async function usesOfEstimates(reader: Reader, ids: string[]): Promise<EstimateUseRow[]> {
  return select<EstimateUseRow>(
    `SELECT u->>'id' AS estimate, c.number, cl.ordinal, u->>'usedAt' AS used_at
     FROM runs r
     JOIN claims cl ON cl.run_id = r.id AND cl.state = 'signed'
     JOIN groups g ON g.id = cl.group_id AND (g.public OR g.id = $audience)
     JOIN constants c ON c.id = cl.constant_id
     CROSS JOIN LATERAL jsonb_array_elements(r.outcome->'estimates') AS u
     WHERE r.state = 'done' AND r.estimates && $ids::text[] AND u->>'id' = ANY($ids::text[])
     ORDER BY c.number, cl.ordinal`,
    { ids, audience: audienceOf(reader) },
  )
}
