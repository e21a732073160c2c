import type { z } from 'zod'
import { checkDigits, type PrintedAs } from '../../shared/digit-check.ts'
import { plainDecimal, type ReadNumber } from '../../shared/digit-reading.ts'
import { scaleEnclosure } from '../../shared/digits.ts'
import type { lookUpResult } from '../../shared/schemas/constant.ts'
import type { ConstantRow } from '../queries/constant.ts'
import type { NearRow } from '../queries/look-up.ts'
import { presentConstantSummary } from './constant.ts'

type Found = z.infer<typeof lookUpResult>['items'][number]

const SHOWN = 25

/** Twice the distance of a number from the middle of an enclosure, and the enclosure's width, over one denominator. */
function nearness(value: string, lo: string, hi: string): { gap: bigint; width: bigint; places: number } {
  const ends = scaleEnclosure(lo, hi)
  const point = scaleEnclosure(value, value)
  const places = Math.max(ends.places, point.places)
  const up = (scaled: bigint, from: number): bigint => scaled * 10n ** BigInt(places - from)
  const [low, high, at] = [up(ends.low, ends.places), up(ends.high, ends.places), up(point.low, point.places)]
  return { gap: at < low ? low - at : at > high ? at - high : 0n, width: high - low, places }
}

/** -1, 0, 1 as a / 10^p is less than, equal to or greater than b / 10^q. */
function compareScaled(a: bigint, p: number, b: bigint, q: number): number {
  const [x, y] = [a * 10n ** BigInt(Math.max(0, q - p)), b * 10n ** BigInt(Math.max(0, p - q))]
  return x < y ? -1 : x > y ? 1 : 0
}

/** A constant beside the digits, and the place up to which they fit no number of its best enclosure any more, or null. */
interface Placed {
  id: string
  ruledOutAt: number | null
}

/**
 * Constants beside pasted digits: those that the digits can stand for first, the narrowest enclosure in front, then those that are
 * ruled out, the nearest in front; as many as are shown.
 */
export function placeBeside(number: ReadNumber, reading: PrintedAs, rows: readonly NearRow[]): Placed[] {
  const value = plainDecimal(number)
  const found = rows.map((row) => ({ row, ruledOutAt: checkDigits(number, reading, row.best_lo, row.best_hi).firstWrong, ...nearness(value, row.best_lo, row.best_hi) }))
  found.sort((a, b) => {
    const out = Number(a.ruledOutAt !== null) - Number(b.ruledOutAt !== null)
    if (out !== 0) return out
    const byGap = compareScaled(a.gap, a.places, b.gap, b.places)
    const byWidth = compareScaled(a.width, a.places, b.width, b.places)
    return (a.ruledOutAt === null ? byWidth || byGap : byGap || byWidth) || a.row.number - b.row.number
  })
  return found.slice(0, SHOWN).map(({ row, ruledOutAt }) => ({ id: row.id, ruledOutAt }))
}

/** The constants that were placed, in their order, as the register shows them. */
export function presentLookUp(number: ReadNumber, placed: readonly Placed[], rows: readonly ConstantRow[]): Found[] {
  const byId = new Map(rows.map((row) => [row.id, row]))
  return placed.flatMap(({ id, ruledOutAt }) => {
    const row = byId.get(id)
    return row ? [{ constant: presentConstantSummary(row), compatibleTo: ruledOutAt === null ? number.fraction.length : Math.max(0, ruledOutAt - 1), ruledOutAt }] : []
  })
}
