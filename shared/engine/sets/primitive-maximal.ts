import { EngineRefusal } from '../errors.ts'
import { SMALL_LIMIT, divisorsOf, factorSmall } from './primitive-factor.ts'

/** Whether a primitive list could take in one more integer up to a bound and stay primitive. */
export interface MaximalityReport {
  upTo: number
  maximal: boolean
  /** How many integers 2 <= m <= upTo neither divide a member nor are divisible by one. */
  addable: number
  /** The first of them. */
  examples: number[]
}

export const MOST_UP_TO = 100_000_000
/** Divisions of large members that are worth doing. heuristic: affects speed only */
const MOST_DIVISIONS = 5e7

/**
 * *Claim*: exact. *Valid for*: distinct members >= 2 as decimal strings, 2 <= upTo <= MOST_UP_TO. Refuses where members too
 * large to be factored quickly would have to be divided by too many candidates.
 */
export function maximality(members: readonly string[], upTo: number, limit = 100): MaximalityReport {
  if (!Number.isInteger(upTo) || upTo < 2 || upTo > MOST_UP_TO) {
    throw new EngineRefusal('out_of_range', 'upTo', `The bound must be a whole number from 2 to ${MOST_UP_TO}.`)
  }
  // related[m] = 1: m is a member, or divides one, or is divisible by one.
  const related = new Uint8Array(upTo + 1)
  const large: bigint[] = []
  for (const member of members) {
    const value = member.length <= 10 ? Number(member) : SMALL_LIMIT
    if (value < SMALL_LIMIT) {
      for (let m = value; m <= upTo; m += value) related[m] = 1
      for (const divisor of divisorsOf(factorSmall(value))) if (divisor <= upTo) related[divisor] = 1
    } else {
      large.push(BigInt(member))
    }
  }
  if (large.length > 0) markDivisors(related, large)

  const report: MaximalityReport = { upTo, maximal: true, addable: 0, examples: [] }
  for (let m = 2; m <= upTo; m++) {
    if (related[m]) continue
    report.maximal = false
    report.addable++
    if (report.examples.length < limit) report.examples.push(m)
  }
  return report
}

/** Members above `upTo` matter by their divisors only. */
function markDivisors(related: Uint8Array, large: readonly bigint[]): void {
  let open = 0
  for (let m = 2; m < related.length; m++) if (!related[m]) open++
  if (open * large.length > MOST_DIVISIONS) {
    throw new EngineRefusal('too_slow', 'upTo', 'The list has large members whose divisors are too many to try: choose a smaller bound.')
  }
  for (let m = 2; m < related.length; m++) {
    if (!related[m] && large.some((value) => value % BigInt(m) === 0n)) related[m] = 1
  }
}
