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
    `WITH used AS MATERIALIZED (
       SELECT r.id, u->>'id' AS estimate, u->>'usedAt' AS used_at
       FROM runs r CROSS JOIN LATERAL jsonb_array_elements(r.outcome->'estimates') AS u
       WHERE r.state = 'done' AND r.estimates && $ids::text[] AND u->>'id' = ANY ($ids::text[])
     ), ranked AS (
       SELECT used.estimate, cl.constant_id, cl.ordinal, used.used_at, cl.signed_at,
              count(*) OVER (PARTITION BY used.estimate) AS uses, row_number() OVER (PARTITION BY used.estimate ORDER BY cl.signed_at DESC, cl.id) AS place
       FROM used JOIN claims cl ON cl.run_id = used.id AND cl.state = 'signed' JOIN groups g ON g.id = cl.group_id AND (g.public OR g.id = $audience)
     )
     SELECT ranked.estimate, c.number, ranked.ordinal, ranked.used_at, ranked.uses::int
     FROM ranked JOIN constants c ON c.id = ranked.constant_id WHERE place <= $most ORDER BY ranked.signed_at DESC, c.number`,
    { ids, audience: audienceOf(reader), most },
  )
}
