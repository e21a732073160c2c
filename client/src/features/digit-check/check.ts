import { checkDigits, summaryOfCheck } from '../../../../shared/digit-check.ts'
import type { DigitCheckResult, DigitVerdict, PrintedAs } from '../../../../shared/digit-check.ts'
import { plainDecimal, readDigits } from '../../../../shared/digit-reading.ts'
import { certifiedRounded, certifiedTruncated, decimalText, isDecimal, scaleEnclosure } from '../../../../shared/digits.ts'

/** What the pasted text says when it is held against an enclosure. */
export type Checked =
  | { kind: 'empty' }
  | { kind: 'unreadable'; reason: string }
  | {
      kind: 'checked'
      /** The number as it was understood, as plain decimal text. */
      read: string
      negative: boolean
      result: DigitCheckResult
      summary: string
      /** What it should read; null where nothing is wrong, or nothing is certain. */
      correct: CorrectDigits | null
    }

/** What the digits should read. */
export interface CorrectDigits {
  places: number
  text: string
}

/** Reads pasted text and holds it against [lo, hi]; the same code answers POST /digit-checks. */
export function checkText(text: string, reading: PrintedAs, lo: string, hi: string): Checked {
  if (text.trim() === '') return { kind: 'empty' }
  const read = readDigits(text)
  if (!read.ok) return { kind: 'unreadable', reason: read.reason }
  const result = checkDigits(read.number, reading, lo, hi)
  return {
    kind: 'checked',
    read: plainDecimal(read.number),
    negative: read.number.negative,
    result,
    summary: summaryOfCheck(result, reading),
    correct: result.firstWrong === null ? null : correctDigits(lo, hi, reading, read.number.fraction.length),
  }
}

/**
 * The digits that are certain, to the places asked for or, where the enclosure is too wide for those, to the most it decides. A tie
 * at an end counts as not decided. Null when not even the whole part is certain.
 */
export function correctDigits(lo: string, hi: string, reading: PrintedAs, places: number): CorrectDigits | null {
  const text = reading === 'truncated' ? truncatedTo(lo, hi, places) : roundedTo(lo, hi, places)
  if (text !== null) return { places, text }
  const most = reading === 'truncated' ? certifiedTruncated(lo, hi) : certifiedRounded(lo, hi)
  return most.text === null ? null : { places: most.decimals, text: most.text }
}

function truncatedTo(lo: string, hi: string, places: number): string | null {
  const certified = certifiedTruncated(lo, hi)
  if (certified.text === null || certified.decimals < places) return null
  const whole = certified.text.length - certified.decimals - (certified.decimals > 0 ? 1 : 0)
  return certified.text.slice(0, places === 0 ? whole : whole + 1 + places)
}

function roundedTo(lo: string, hi: string, places: number): string | null {
  const { low, high, places: own } = scaleEnclosure(lo, hi)
  if (places >= own) return low === high ? decimalText(low * 10n ** BigInt(places - own), places) : null
  const unit = 10n ** BigInt(own - places)
  for (const nearest of [(2n * low + unit) / (2n * unit), (2n * low - unit) / (2n * unit)]) {
    const centre = 2n * nearest * unit
    if (2n * low > centre - unit && 2n * high < centre + unit) return decimalText(nearest, places)
  }
  return null
}

/** Neighbouring digits of one verdict inside one printed group. */
export interface DigitRun {
  digits: string
  verdict: DigitVerdict
  /** Place of its first digit: 1 is the first after the point, 0 the units. */
  place: number
  /** Its first digit is the first that fits no number of the enclosure. */
  firstWrong: boolean
}

/** The digits as they are printed: the whole part, then groups of five, each cut where the verdict changes or the fault begins. */
export function printedGroups({ digits, sign, firstWrong }: DigitCheckResult): DigitRun[][] {
  const groups: DigitRun[][] = []
  // Where the sign is wrong already, the fault is pointed at there.
  const faultyPlace = sign === 'refuted' ? null : firstWrong
  for (const { digit, place, verdict: alone } of digits) {
    // A digit that is possible alone can be impossible after those before it.
    const verdict = place === faultyPlace ? 'refuted' : alone
    const opensGroup = groups.length === 0 || (place >= 1 && (place - 1) % 5 === 0)
    if (opensGroup) groups.push([])
    const group = groups[groups.length - 1] as DigitRun[]
    const run = group[group.length - 1]
    if (run && run.verdict === verdict && place !== faultyPlace) run.digits += digit
    else group.push({ digits: digit, verdict, place, firstWrong: place === faultyPlace })
  }
  return groups
}

/** Reads "[1.25, 1.26]" or two numbers apart by a comma, semicolon or line break; a reason where it cannot be read as an interval. */
export function readInterval(text: string): { ok: true; lo: string; hi: string } | { ok: false; reason: string } {
  const parts = text.trim().replace(/^[[(]\s*|\s*[\])]$/g, '').split(/\s*[,;\n]\s*|\s+/).filter((part) => part !== '')
  if (parts.length !== 2) return { ok: false, reason: 'Write two decimal numbers, such as [1.63661, 1.63664].' }
  const [lo = '', hi = ''] = parts.map((part) => part.replace('−', '-'))
  if (!isDecimal(lo) || !isDecimal(hi)) return { ok: false, reason: 'Write both ends as plain decimal numbers with a point.' }
  try {
    scaleEnclosure(lo, hi)
  } catch {
    return { ok: false, reason: 'The lower end must not lie above the upper end.' }
  }
  return { ok: true, lo, hi }
}
