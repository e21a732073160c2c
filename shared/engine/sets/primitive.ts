import { EngineRefusal } from '../errors.ts'
import { SMALL_LIMIT, divisorsOf, factorSmall } from './primitive-factor.ts'

/** Which members divide which. */
export interface DivisibilityReport {
  /** No member divides another. */
  primitive: boolean
  /** How many pairs (a, b) of members have a | b, a < b. */
  pairs: number
  /** The first of them, ordered by a, then b. */
  examples: [divisor: string, multiple: string][]
}

/** The first pairs of all that are offered, in any order. */
class FirstPairs {
  count = 0
  private readonly kept: [number, number][] = []
  private readonly limit: number

  constructor(limit: number) {
    this.limit = limit
  }

  /** Indices of the divisor and of the multiple among the members. */
  offer(divisor: number, multiple: number): void {
    this.count++
    const { kept, limit } = this
    const precedes = ([a, b]: [number, number]): boolean => divisor < a || (divisor === a && multiple < b)
    if (kept.length === limit && !precedes(kept[limit - 1])) return
    let at = kept.length
    while (at > 0 && precedes(kept[at - 1])) at--
    kept.splice(at, 0, [divisor, multiple])
    if (kept.length > limit) kept.pop()
  }

  report(members: readonly string[]): DivisibilityReport {
    return { primitive: this.count === 0, pairs: this.count, examples: this.kept.map(([a, b]) => [members[a], members[b]]) }
  }
}

/** Finds the place of an integer below SMALL_LIMIT among the members: open addressing, at most half full. */
class PlaceTable {
  private readonly keys: Int32Array
  private readonly places: Int32Array
  private readonly shift: number

  constructor(values: readonly number[]) {
    let bits = 4
    while (2 ** bits < 2 * values.length) bits++
    this.shift = 32 - bits
    this.keys = new Int32Array(2 ** bits)
    this.places = new Int32Array(2 ** bits)
    values.forEach((value, place) => {
      let slot = this.slot(value)
      while (this.keys[slot] !== 0) slot = (slot + 1) & (this.keys.length - 1)
      this.keys[slot] = value
      this.places[slot] = place
    })
  }

  /** -1 where it is no member. */
  find(value: number): number {
    const { keys } = this
    for (let slot = this.slot(value); keys[slot] !== 0; slot = (slot + 1) & (keys.length - 1)) {
      if (keys[slot] === value) return this.places[slot]
    }
    return -1
  }

  private slot(value: number): number {
    return Math.imul(value, 0x9e3779b1) >>> this.shift
  }
}

/**
 * Whether a list is primitive, and if not which pairs break it. `members`: distinct integers >= 2, ascending, as decimal
 * strings. Exact for members of any size; a million members below 2^30 take seconds, and members above are compared pair by
 * pair, which is refused where it would take long.
 */
export function divisibility(members: readonly string[], limit = 100): DivisibilityReport {
  const pairs = new FirstPairs(limit)
  const small: number[] = []
  while (small.length < members.length && members[small.length].length <= 10 && Number(members[small.length]) < SMALL_LIMIT) {
    small.push(Number(members[small.length]))
  }
  smallPairs(small, pairs)
  largePairs(members, small.length, pairs)
  return pairs.report(members)
}

/** By walking the multiples of each member or the divisors of each, whichever is less work. */
function smallPairs(values: readonly number[], pairs: FirstPairs): void {
  if (values.length < 2) return
  const table = new PlaceTable(values)
  const largest = values[values.length - 1]
  const steps = values.reduce((total, value) => total + largest / value, 0)
  if (steps <= values.length * STEPS_PER_FACTORISATION) {
    values.forEach((value, place) => {
      for (let multiple = 2 * value; multiple <= largest; multiple += value) {
        const found = table.find(multiple)
        if (found >= 0) pairs.offer(place, found)
      }
    })
    return
  }
  values.forEach((value, place) => {
    for (const divisor of divisorsOf(factorSmall(value))) {
      if (divisor === value) continue
      const found = divisor > 1 ? table.find(divisor) : -1
      if (found >= 0) pairs.offer(found, place)
    }
  })
}

/** A factorisation costs about as much as so many look-ups. heuristic: affects speed only */
const STEPS_PER_FACTORISATION = 150
const MOST_COMPARISONS = 4e9

/** Primes whose divisibility is noted in a bit each: a can only divide b if its bits are among those of b. */
const MARKED_PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37, 41, 43, 47, 53, 59, 61, 67, 71, 73, 79, 83, 89, 97, 101, 103, 107, 109, 113]

/** Pairs whose multiple is members[from] or a later one. */
function largePairs(members: readonly string[], from: number, pairs: FirstPairs): void {
  const large = members.length - from
  if (large === 0) return
  if (large * members.length > MOST_COMPARISONS) {
    throw new EngineRefusal('too_many_large_members', 'members', `The list has ${large} members above ${SMALL_LIMIT}, too many to compare: split it.`)
  }
  const values = members.map(BigInt)
  const marks = Int32Array.from(values, (value) =>
    MARKED_PRIMES.reduce((bits, p, i) => (value % BigInt(p) === 0n ? bits | (1 << i) : bits), 0),
  )
  for (let place = from; place < values.length; place++) {
    const missing = ~marks[place]
    for (let other = 0; other < place; other++) {
      if ((marks[other] & missing) === 0 && values[place] % values[other] === 0n) pairs.offer(other, place)
    }
  }
}
