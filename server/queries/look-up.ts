import { select } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

/** How many neighbours on each side, and how many enclosures around the digits, are looked at. */
const NEIGHBOURS = 25
const AROUND = 200

/**
 * Ids of the constants whose best enclosures meet [lo, hi] and of those next to it on both sides. `lo` and `hi` are the numbers
 * that pasted digits can stand for.
 */
export async function constantsNear(reader: Reader, lo: string, hi: string): Promise<string[]> {
  const rows = await select<{ constant_id: string }>(
    `(SELECT constant_id FROM register_entries
      WHERE audience = $audience AND best_lo IS NOT NULL AND numrange(best_lo, best_hi, '[]') && numrange($lo::numeric, $hi::numeric, '[]')
      ORDER BY best_hi - best_lo LIMIT ${AROUND})
     UNION
     (SELECT constant_id FROM register_entries WHERE audience = $audience AND best_lo <= $lo::numeric ORDER BY best_lo DESC LIMIT ${NEIGHBOURS})
     UNION
     (SELECT constant_id FROM register_entries WHERE audience = $audience AND best_lo > $lo::numeric ORDER BY best_lo LIMIT ${NEIGHBOURS})`,
    { audience: audienceOf(reader), lo, hi },
  )
  return rows.map(({ constant_id: id }) => id)
}
