import { select } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

/** How many neighbours on each side, and how many enclosures around the digits, are looked at. */
const NEIGHBOURS = 25
const AROUND = 75

/** From so many decimals on few constants meet the digits, and the index on ranges finds them first. */
export const FEW_FROM_DECIMALS = 3

/** Constants whose best enclosures meet [$lo, $hi]. */
export const MEETS = (lo: string, hi: string): string => `best_lo IS NOT NULL AND numrange(best_lo, best_hi, '[]') && numrange(${lo}::numeric, ${hi}::numeric, '[]')`

export interface NearRow {
  id: string
  number: number
  best_lo: string
  best_hi: string
}

/**
 * The constants whose best enclosures meet [lo, hi], the narrowest where there are very many, and those next to it on both sides.
 * `lo` and `hi` are the numbers that pasted digits can stand for, `decimals` how many of the digits stand after the point.
 */
export async function constantsNear(reader: Reader, lo: string, hi: string, decimals: number): Promise<NearRow[]> {
  const columns = 'constant_id AS id, number, best_lo, best_hi'
  // OFFSET 0 keeps the planner from walking all enclosures by their width where few meet.
  const fence = decimals >= FEW_FROM_DECIMALS ? 'OFFSET 0' : ''
  return select<NearRow>(
    `(SELECT * FROM (SELECT ${columns} FROM register_entries WHERE audience = $audience AND ${MEETS('$lo', '$hi')} ${fence}) meeting ORDER BY best_hi - best_lo LIMIT ${AROUND})
     UNION
     (SELECT ${columns} FROM register_entries WHERE audience = $audience AND best_lo <= $lo::numeric ORDER BY best_lo DESC LIMIT ${NEIGHBOURS})
     UNION
     (SELECT ${columns} FROM register_entries WHERE audience = $audience AND best_lo > $lo::numeric ORDER BY best_lo LIMIT ${NEIGHBOURS})`,
    { audience: audienceOf(reader), lo, hi },
  )
}
