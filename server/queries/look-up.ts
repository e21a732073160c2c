import { select } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

/** How many neighbours on each side, and how many enclosures around the digits, are looked at. */
const NEIGHBOURS = 25
const AROUND = 40

/** Constants whose best enclosures meet an interval, as a condition that the index on ranges serves. */
export const MEETS = (lo: string, hi: string): string => `best_lo IS NOT NULL AND numrange(best_lo, best_hi, '[]') && numrange(${lo}::numeric, ${hi}::numeric, '[]')`

export interface NearRow {
  id: string
  number: number
  best_lo: string
  best_hi: string
}

/** Enclosures that meet the digits are all looked at up to so many; where there are more, they are walked by their width. */
const MANY = 2_000

/**
 * The constants whose best enclosures meet [lo, hi], the narrowest where there are very many, and those next to it on both sides.
 * `lo` and `hi` are the numbers that pasted digits can stand for.
 */
export async function constantsNear(reader: Reader, lo: string, hi: string): Promise<NearRow[]> {
  const columns = 'constant_id AS id, number, best_lo, best_hi'
  const mine = 'FROM register_entries WHERE audience = $audience'
  return select<NearRow>(
    `WITH meeting AS MATERIALIZED (SELECT ${columns} ${mine} AND ${MEETS('$lo', '$hi')} LIMIT ${MANY + 1}),
          met AS MATERIALIZED (SELECT count(*) AS count FROM meeting)
     (SELECT * FROM meeting WHERE (SELECT count FROM met) <= ${MANY} ORDER BY best_hi - best_lo LIMIT ${AROUND})
     UNION
     (SELECT ${columns} ${mine} AND ${MEETS('$lo', '$hi')} AND (SELECT count FROM met) > ${MANY} ORDER BY best_hi - best_lo LIMIT ${AROUND})
     UNION
     (SELECT ${columns} ${mine} AND best_lo <= $lo::numeric ORDER BY best_lo DESC LIMIT ${NEIGHBOURS})
     UNION
     (SELECT ${columns} ${mine} AND best_lo > $lo::numeric ORDER BY best_lo LIMIT ${NEIGHBOURS})`,
    { audience: audienceOf(reader), lo, hi },
  )
}
