import { bitLength } from '../arithmetic/integers.ts'
import { primesUpTo } from '../arithmetic/primes.ts'
import { floorSqrt } from './integer-root.ts'

/**
 * How many prime factors the integers of a range have. While an integer is worked on its 16 bits hold, from the lowest: 7 bits
 * for the sum of floor(3 log2 p) over the prime factors found so far, 5 for their number with multiplicity, 4 for the number
 * of distinct ones. Below 2^32 none of them can overflow into the next: they are at most 96, 31 and 9 (S-6).
 */
const LOG_BITS = 7
const LOG_MASK = 2 ** LOG_BITS - 1
const ONE_FACTOR = 2 ** LOG_BITS
const ONE_DISTINCT = 2 ** 12

export const FACTOR_SIEVE_LIMIT = 2 ** 32 - 1

/** A code as handed over: all = number of prime factors with multiplicity, distinct = number of distinct ones. */
export const CODES = 512
export const allFactors = (code: number): number => code & 31
export const distinctFactors = (code: number): number => code >> 5

/** Prime powers that divide this are added by copying a pattern of this period. */
const PATTERN_PERIOD = 2 ** 4 * 3 ** 2 * 5 * 7 * 11
/** Integers of one segment. heuristic: affects speed only */
const SEGMENT = 2 ** 15

/** What a multiple of the prime power p^a, a >= 1, gets: the prime counts once more, and as a new one where a = 1. */
function increment(p: number, a: number): number {
  const log = bitLength(BigInt(p) ** 3n) - 1
  return log + ONE_FACTOR + (a === 1 ? ONE_DISTINCT : 0)
}

let patternMemory: Uint16Array | undefined

function pattern(): Uint16Array {
  if (patternMemory) return patternMemory
  const codes = new Uint16Array(PATTERN_PERIOD + SEGMENT)
  for (const p of [2, 3, 5, 7, 11]) {
    for (let a = 1, power = p; PATTERN_PERIOD % power === 0; a++, power *= p) {
      for (let i = 0; i < codes.length; i += power) codes[i] += increment(p, a)
    }
  }
  patternMemory = codes
  return codes
}

/** The prime powers p^a <= hi, p <= sqrt(hi), that the pattern leaves. */
function remainingPowers(hi: number): { steps: Float64Array; increments: Uint16Array } {
  const steps: number[] = []
  const increments: number[] = []
  for (const p of primesUpTo(floorSqrt(hi))) {
    for (let a = 1, power = p; power <= hi; a++, power *= p) {
      if (PATTERN_PERIOD % power === 0) continue
      steps.push(power)
      increments.push(increment(p, a))
    }
  }
  return { steps: Float64Array.from(steps), increments: Uint16Array.from(increments) }
}

function addAt(codes: Uint16Array, start: number, step: number, amount: number, end: number): number {
  let i = start
  for (; i < end; i += step) codes[i] += amount
  return i
}

/**
 * Visits the integers lo < n <= hi in order and in segments: codes[i], for 0 <= i < count, belongs to first + i. An integer
 * divisible by an excluded prime gets the code 0, which otherwise only n = 1 has.
 *
 * *Claim*: allFactors(codes[i]) and distinctFactors(codes[i]) are the numbers of prime factors of first + i.
 * *Valid for*: 0 <= lo <= hi <= FACTOR_SIEVE_LIMIT. *Bound*: S-6.
 */
export function sieveFactors(
  lo: number,
  hi: number,
  visit: (codes: Uint16Array, first: number, count: number) => void,
  exclude: readonly number[] = [],
): void {
  if (hi > FACTOR_SIEVE_LIMIT) throw new RangeError('range too large for the sieve of prime factors')
  const { steps, increments } = remainingPowers(hi)
  const codes = new Uint16Array(SEGMENT)
  const prepared = pattern()
  const next = Float64Array.from(steps, (step) => firstMultiple(lo + 1, step))
  for (let first = lo + 1; first <= hi; ) {
    // Within a segment integers grow by a factor 2 at most: then one threshold serves for all.
    const count = Math.min(SEGMENT, hi - first + 1, first)
    const phase = first % PATTERN_PERIOD
    codes.set(prepared.subarray(phase, phase + count))
    const last = first + count - 1
    for (let k = 0; k < steps.length; k++) {
      if (next[k] <= last) next[k] = first + addAt(codes, next[k] - first, steps[k], increments[k], count)
    }
    finish(codes, first, count)
    for (const p of exclude) for (let i = firstMultiple(first, p) - first; i < count; i += p) codes[i] = 0
    visit(codes, first, count)
    first += count
  }
}

function firstMultiple(from: number, step: number): number {
  return Math.ceil(from / step) * step
}

/**
 * Adds the prime factor above sqrt(hi) that an integer may have left, and drops the logarithms.
 * S-6: with first <= n < 2 first and e = floor(log2 first) >= 4, the logarithms of a complete factorisation sum to at least
 * 2.5 e >= 2 e + 2, those of one that lacks a prime above sqrt(n) to less than 1.5 (e + 2) <= 2 e + 2.
 */
function finish(codes: Uint16Array, first: number, count: number): void {
  if (first < SMALL) {
    for (let i = 0; i < count; i++) codes[i] = smallCode(first + i)
    return
  }
  const threshold = 2 * (31 - Math.clz32(first)) + 2
  for (let i = 0; i < count; i++) {
    const code = codes[i]
    codes[i] = (code >> LOG_BITS) + ((code & LOG_MASK) < threshold ? (ONE_FACTOR + ONE_DISTINCT) >> LOG_BITS : 0)
  }
}

const SMALL = 2 ** 8
function smallCode(n: number): number {
  let [all, distinct, rest] = [0, 0, n]
  for (let d = 2; rest > 1; d++) {
    if (rest % d !== 0) continue
    distinct++
    for (; rest % d === 0; rest /= d) all++
  }
  return all + 32 * distinct
}
