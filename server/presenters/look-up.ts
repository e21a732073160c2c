import type { z } from 'zod'
import { checkDigits, type PrintedAs } from '../../shared/digit-check.ts'
import { plainDecimal, type ReadNumber } from '../../shared/digit-reading.ts'
import { scaleEnclosure } from '../../shared/digits.ts'
import type { lookUpResult } from '../../shared/schemas/constant.ts'
import type { ConstantRow } from '../queries/constant.ts'
import { presentConstantSummary } from './constant.ts'
import { bestOf } from './constant-value.ts'

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

/**
 * Constants beside pasted digits: those that the digits can stand for first, the narrowest enclosure in front, then those that are
 * ruled out, the nearest in front.
 */
export function presentLookUp(number: ReadNumber, reading: PrintedAs, rows: readonly ConstantRow[]): Found[] {
  const value = plainDecimal(number)
  const found = rows.flatMap((row) => {
    const best = bestOf(row)
    if (!best) return []
    const check = checkDigits(number, reading, best.lo, best.hi)
    return [{ row, ruledOutAt: check.firstWrong, ...nearness(value, best.lo, best.hi) }]
  })
  found.sort((a, b) => {
    const out = Number(a.ruledOutAt !== null) - Number(b.ruledOutAt !== null)
    if (out !== 0) return out
    const byGap = compareScaled(a.gap, a.places, b.gap, b.places)
    const byWidth = compareScaled(a.width, a.places, b.width, b.places)
    return (a.ruledOutAt === null ? byWidth || byGap : byGap || byWidth) || a.row.number - b.row.number
  })
  return found.slice(0, SHOWN).map(({ row, ruledOutAt }) => ({
    constant: presentConstantSummary(row),
    compatibleTo: ruledOutAt === null ? number.fraction.length : Math.max(0, ruledOutAt - 1),
    ruledOutAt,
  }))
}
