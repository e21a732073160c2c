import { summaryOfCheck, type DigitCheckResult, type PrintedAs } from '../../shared/digit-check.ts'
import { plainDecimal, type ReadNumber } from '../../shared/digit-reading.ts'
import type { DigitCheck } from '../../shared/schemas/claim.ts'

export const presentDigitCheck = (number: ReadNumber, reading: PrintedAs, enclosure: { lo: string; hi: string }, result: DigitCheckResult): DigitCheck => ({
  read: plainDecimal(number),
  sign: result.sign,
  digits: result.digits.map(({ digit, place, verdict }) => ({ digit, place, verdict })),
  whole: result.whole,
  firstWrong: result.firstWrong,
  confirmed: result.confirmed,
  uncertainty: result.uncertainty,
  summary: summaryOfCheck(result, reading),
  enclosure: { lo: enclosure.lo, hi: enclosure.hi },
})
