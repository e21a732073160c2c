import type { ConstantSummary } from '../../shared/schemas/constant.ts'
import type { ConstantRow } from '../queries/constant.ts'

/** The best enclosure that a row carries, or null. */
export function bestOf(row: ConstantRow): ConstantSummary['best'] {
  if (row.best_lo === null || row.best_hi === null) return null
  return { lo: row.best_lo, hi: row.best_hi, digits: { truncated: row.digits_truncated ?? 0, rounded: row.digits_rounded ?? 0 } }
}
