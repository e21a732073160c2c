import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ZERO, add, dyadic, subtract } from '../arithmetic/rational.ts'
import { anyTail, densityTail, integerDensity, squarefreeDensity } from '../estimates/density-tail.ts'
import type { Interval } from '../estimates/prime-tail.ts'
import type { SeriesDefinition, SetOfIntegers } from '../sets/definition.ts'
import { sumBatch } from '../sieve/block-sums.ts'
import { type Classification, factorMoments } from '../sieve/factor-moments.ts'
import { FACTOR_SIEVE_LIMIT } from '../sieve/factor-sieve.ts'
import { type RationalWeight, type WeightExpansion, expandWeight } from '../sieve/weight.ts'
import type { Computation, ComputationRequest, Outcome, ShardResult } from './computation.ts'
import { decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import { type PartialSumParameters, writePartialSumParameters } from './partial-sum-parameters.ts'
import { type Range, cutIntoRanges } from './partial-sum-ranges.ts'

export const LARGEST_INTEGER_CUTOFF = FACTOR_SIEVE_LIMIT
/** Integers in one shard. heuristic: affects speed only */
const LONGEST = 2 ** 24
const ORDER = 4

export type FactorSet = Extract<SetOfIntegers, { kind: 'integers' | 'squarefree' | 'almost-primes' | 'squarefree-almost-primes' | 'distinct-prime-factors' }>

const CLASSIFICATION: Record<FactorSet['kind'], Classification> = {
  integers: 'none',
  squarefree: 'squarefree',
  'almost-primes': 'all-factors',
  'squarefree-almost-primes': 'squarefree-factors',
  'distinct-prime-factors': 'distinct-factors',
}

/** The class that the sieve puts the members of a set in. */
const classOf = (set: FactorSet): number => ('k' in set ? set.k : 0)

/** Sums over integers sorted by their prime factors, up to a cut-off, and a tail from the density of the set (S-6, S-7, S-10). */
export class IntegerPartialSum implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Record<string, string | number>
  readonly shardCount: number
  private readonly chosen: PartialSumParameters
  private readonly sets: readonly FactorSet[]
  private readonly weights: readonly RationalWeight[]
  private readonly expansions: readonly WeightExpansion[]
  private readonly ranges: readonly Range[]
  private made: Promise<Arithmetic<AnyNumber>> | undefined

  /** All sets are of one kind, with the same exclusions. */
  constructor(request: ComputationRequest, chosen: PartialSumParameters, weights: readonly RationalWeight[]) {
    this.request = request
    this.chosen = { ...chosen, estimates: [] }
    this.parameters = writePartialSumParameters(this.chosen)
    this.sets = request.definitions.map((one) => (one as SeriesDefinition).set as FactorSet)
    this.weights = weights
    this.expansions = weights.map((weight) => expandWeight(weight, ORDER))
    this.ranges = cutIntoRanges(chosen.cutoff, LONGEST)
    this.shardCount = this.ranges.length
  }

  /** heuristic: affects speed only */
  shardCost(index: number): number {
    return this.ranges[index].hi - this.ranges[index].lo + 500_000
  }

  async runShard(index: number): Promise<ShardResult> {
    const arithmetic = await this.arithmetic()
    const { lo, hi } = this.ranges[index]
    const totals = this.sets.map(() => ({ low: 0n, high: 0n, count: 0n }))
    const take: Parameters<typeof factorMoments>[3] = (batch) => {
      const sums = sumBatch(arithmetic, this.expansions, batch)
      this.sets.forEach((set, i) => {
        const c = classOf(set)
        if (c >= batch.singles.length) return
        totals[i].low += sums[i][c][0]
        totals[i].high += sums[i][c][1]
        totals[i].count += batch.blocks.reduce((count, { classes }) => count + (classes[c][0] ?? 0n), BigInt(batch.singles[c].length))
      })
    }
    factorMoments(lo, hi, CLASSIFICATION[this.sets[0].kind], take, this.sets[0].exclude)
    return totals.map(({ low, high, count }) => [low, high, count].map(String))
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    const arithmetic = await this.arithmetic()
    return this.sets.map((set, index) => {
      const running = [0n, 0n, 0n]
      const marks: { at: number; lo: Interval['lo']; hi: Interval['hi']; tail: Interval }[] = []
      this.ranges.forEach(({ hi: at, mark }, shard) => {
        ;(results[shard] as string[][])[index].forEach((text, i) => (running[i] += BigInt(text)))
        if (!mark) return
        const tail = this.tail(arithmetic, set, this.weights[index], at, running[2] + 1n)
        const [low, high] = [running[0], running[1]].map((n) => dyadic(n, this.chosen.precision))
        marks.push({ at, lo: add(low, tail.lo), hi: add(high, tail.hi), tail })
      })
      const { lo, hi, tail } = marks[marks.length - 1]
      const half = halfWidth(tail.lo, tail.hi)
      const rest = subtract(halfWidth(lo, hi), half)
      return {
        definition: this.request.definitions[index],
        method: 'partial-sum',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: [],
        ...describeEnclosure(lo, hi, [
          { source: 'tail', bound: 'S-10', magnitude: half },
          { source: 'series', bound: 'S-3', magnitude: rest.num > 0n ? rest : ZERO },
        ]),
        convergence: marks.map((mark) => ({ at: String(mark.at), ...decimalEnclosure(mark.lo, mark.hi) })),
      }
    })
  }

  private tail(arithmetic: Arithmetic<AnyNumber>, set: FactorSet, weight: RationalWeight, x: number, count: bigint): Interval {
    if (set.kind === 'integers') return densityTail(arithmetic, weight, x, count, integerDensity(arithmetic, set.exclude))
    if (set.kind === 'squarefree') return densityTail(arithmetic, weight, x, count, squarefreeDensity(arithmetic, set.exclude))
    return anyTail(arithmetic, weight, x)
  }

  private arithmetic(): Promise<Arithmetic<AnyNumber>> {
    this.made ??= createArithmetic(this.request.arithmetic, this.chosen.precision)
    return this.made
  }
}

/** About half the width of the tail. heuristic: affects choice only */
export function integerTailRadius(set: FactorSet, power: number, logPower: number, cutoff: number): number {
  const l = Math.log(cutoff) // heuristic: affects speed only
  const weight = cutoff ** -power * l ** -logPower
  const exclusions = 2 ** Math.min(set.exclude.length, 60)
  const whole = power > 1 ? (weight * cutoff) / (power - 1) / 2 : (l ** (1 - logPower) / (logPower - 1)) / 2
  if (set.kind === 'integers') return Math.min(whole, exclusions * weight)
  if (set.kind === 'squarefree') return Math.min(whole, (exclusions + 1) * 2 * Math.sqrt(cutoff) * weight) // heuristic: affects speed only
  return whole
}
