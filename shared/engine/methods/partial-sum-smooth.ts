import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { primesUpTo } from '../arithmetic/primes.ts'
import { type Rational, ZERO, add, compare, dyadic, parseRational, subtract, toText } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Interval } from '../estimates/prime-tail.ts'
import { chooseDecay, smoothTail, weightsFor } from '../estimates/smooth-tail.ts'
import type { SetOfIntegers } from '../sets/definition.ts'
import { MOST_SMOOTH, countSmooth, smoothUpTo } from '../sets/enumerate-products.ts'
import { sumBatch } from '../sieve/block-sums.ts'
import { type RationalWeight, type WeightExpansion, expandWeight } from '../sieve/weight.ts'
import type { Computation, ComputationRequest, Outcome, Parameters, ShardResult } from './computation.ts'
import { decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import { type PartialSumParameters, approximate, readPartialSumParameters } from './partial-sum-parameters.ts'
import { type Range, cutIntoRanges } from './partial-sum-ranges.ts'

export type SmoothSet = Extract<SetOfIntegers, { kind: 'smooth' }>

/** Members that are added up at a time. */
const BATCH = 4_096

/** All that fixes such a partial sum. */
export interface SmoothParameters extends Omit<PartialSumParameters, 'estimates'> {
  /** Which of the upper bounds of S-11 is used. */
  decay: Rational
}

export const primesOf = ({ y, exclude }: SmoothSet): number[] => primesUpTo(y).filter((p) => !exclude.includes(p))

/** Throws where a cut-off leaves more members than are added one by one. */
export function membersWithin(set: SmoothSet, cutoff: number): number {
  const count = countSmooth(set.y, set.exclude, cutoff)
  if (count <= MOST_SMOOTH) return count
  throw new EngineRefusal('out_of_range', 'cutoff', `More than ${MOST_SMOOTH} members lie below this cut-off: choose a smaller one, or the transform.`)
}

export function chooseSmoothParameters({ cutoff, precision }: PartialSumParameters, weights: readonly RationalWeight[]): SmoothParameters {
  const rough = weights.map(({ power, logPower }) => ({ power: approximate(power), logPower: approximate(logPower) }))
  const decay = chooseDecay(rough, cutoff)
  if (!decay) throw new EngineRefusal('cutoff_too_small', 'cutoff', 'The weight does not decrease yet at this cut-off: choose a larger one.')
  return { cutoff, precision, decay }
}

/** Reads parameters out of a certificate; what is not sound is refused. */
export function readSmoothParameters(given: Parameters, weights: readonly RationalWeight[]): SmoothParameters {
  const { cutoff, precision } = readPartialSumParameters(given)
  const decay = parseRational(String(given.decay ?? ''))
  if (!decay || decay.num < 0n || decay.den > 2n ** 40n || weights.some(({ power }) => compare(decay, power) >= 0)) {
    throw new EngineRefusal('unsound_parameter', 'decay', 'The parameter decay must be a fraction from 0 to below the power of n.')
  }
  return { cutoff, precision, decay }
}

/** Sums over the integers with prime factors in a finite list, member by member up to a cut-off, and bounds of the rest (F-1, S-11). */
export class SmoothPartialSum implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Parameters
  readonly shardCount: number
  private readonly chosen: SmoothParameters
  private readonly set: SmoothSet
  private readonly weights: readonly RationalWeight[]
  /** For each weight those that its tail needs. Single terms only: no Taylor coefficient is used. */
  private readonly expansions: readonly (readonly WeightExpansion[])[]
  private readonly ranges: readonly Range[]
  private made: Promise<Arithmetic<AnyNumber>> | undefined

  /** All definitions are over the one set. */
  constructor(request: ComputationRequest, chosen: SmoothParameters, set: SmoothSet, weights: readonly RationalWeight[]) {
    membersWithin(set, chosen.cutoff)
    this.request = request
    this.chosen = chosen
    this.parameters = { cutoff: String(chosen.cutoff), precision: chosen.precision, decay: toText(chosen.decay) }
    this.set = set
    this.weights = weights
    this.expansions = weights.map((weight) => weightsFor(weight, chosen.decay).map((one) => expandWeight(one, 0)))
    this.ranges = cutIntoRanges(chosen.cutoff, chosen.cutoff)
    this.shardCount = this.ranges.length
  }

  /** The members grow about like a power of the logarithm. heuristic: affects speed only */
  shardCost(index: number): number {
    return index + 1
  }

  async runShard(index: number): Promise<ShardResult> {
    const arithmetic = await this.arithmetic()
    const { lo, hi } = this.ranges[index]
    const members = smoothUpTo(this.set.y, this.set.exclude, hi).filter((n) => n > lo)
    const expansions = this.expansions.flat()
    const totals = expansions.map((): [bigint, bigint] => [0n, 0n])
    for (let from = 0; from < members.length; from += BATCH) {
      sumBatch(arithmetic, expansions, { blocks: [], singles: [members.slice(from, from + BATCH)] }).forEach(([[low, high]], i) => {
        totals[i][0] += low
        totals[i][1] += high
      })
    }
    return totals.map((ends) => ends.map(String))
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    const arithmetic = await this.arithmetic()
    const primes = primesOf(this.set)
    let next = 0
    return this.weights.map((weight, index) => {
      const first = next
      next += this.expansions[index].length
      const running = this.expansions[index].map((): [bigint, bigint] => [0n, 0n])
      const marks: { at: number; lo: Rational; hi: Rational; tail: Interval }[] = []
      this.ranges.forEach(({ hi: at }, shard) => {
        running.forEach((ends, i) => (results[shard] as string[][])[first + i].forEach((text, side) => (ends[side] += BigInt(text))))
        const sums = running.map(([lo, hi]) => ({ lo: dyadic(lo, this.chosen.precision), hi: dyadic(hi, this.chosen.precision) }))
        const tail = smoothTail(arithmetic, weight, at, primes, this.chosen.decay, sums)
        if (tail) marks.push({ at, lo: add(sums[0].lo, tail.lo), hi: add(sums[0].hi, tail.hi), tail })
      })
      const last = marks.at(-1)
      if (last?.at !== this.chosen.cutoff) throw new EngineRefusal('unsound_parameter', 'decay', 'The parameter decay is too small for this cut-off.')
      const half = halfWidth(last.tail.lo, last.tail.hi)
      const rest = subtract(halfWidth(last.lo, last.hi), half)
      return {
        definition: this.request.definitions[index],
        method: 'partial-sum',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: [],
        ...describeEnclosure(last.lo, last.hi, [
          { source: 'tail', bound: 'S-11', magnitude: half },
          { source: 'rounding', bound: 'F-1', magnitude: rest.num > 0n ? rest : ZERO },
        ]),
        convergence: marks.map((mark) => ({ at: String(mark.at), ...decimalEnclosure(mark.lo, mark.hi) })),
      }
    })
  }

  private arithmetic(): Promise<Arithmetic<AnyNumber>> {
    this.made ??= createArithmetic(this.request.arithmetic, this.chosen.precision)
    return this.made
  }
}
