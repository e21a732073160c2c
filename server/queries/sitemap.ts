import { select, selectOne } from '../db.ts'
import { PUBLIC } from './audience.ts'

/** The highest number of a public constant; 0 where there is none. */
export async function lastPublicNumber(): Promise<number> {
  const row = await selectOne<{ last: number | null }>('SELECT max(number) AS last FROM register_entries WHERE audience = $audience', { audience: PUBLIC })
  return row?.last ?? 0
}

/** Public constants with numbers after `after` up to `last`. */
export async function publicConstants(after: number, last: number): Promise<{ number: number; changed_at: Date }[]> {
  return select('SELECT number, changed_at FROM register_entries WHERE audience = $audience AND number > $after AND number <= $last ORDER BY number', { audience: PUBLIC, after, last })
}
