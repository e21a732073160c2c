import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ZERO, add, dyadic, rational, subtract } from '../arithmetic/rational.ts'
import { envelopeBeyond } from '../estimates/envelope.ts'
import { type Interval, type Tail, classTail, primeTail } from '../estimates/prime-tail.ts'
import { sumBatch } from '../sieve/block-sums.ts'
import { HIGHEST_ORDER, primeMoments } from '../sieve/prime-moments.ts'
import { type RationalWeight, type WeightExpansion, expandWeight, weightAt } from '../sieve/weight.ts'
import type { Computation, ComputationRequest, Outcome, ShardResult } from './computation.ts'
import { decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import { type Range, cutIntoRanges } from './partial-sum-ranges.ts'
import { type PartialSumParameters, writePartialSumParameters } from './partial-sum-parameters.ts'

/** One constant of a run: a weight summed over the primes but finitely many, or over those of a residue class. */
export interface PrimeSumTask {
  weight: RationalWeight
  exclude: readonly number[]
}

/** theta(x) is the sum of log p. */
const LOGARITHM: RationalWeight = { power: ZERO, logPower: rational(-1) }

/** Sums over the primes up to a cut-off by exact moments, and a tail from theta (S-1 to S-5). */
export class PrimePartialSum implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Record<string, string | number>
  readonly shardCount: number
  private readonly chosen: PartialSumParameters
  private readonly tasks: readonly PrimeSumTask[]
  private readonly residueClass: { modulus: number; residue: number } | undefined
  private readonly ranges: readonly Range[]
  /** One for each task, then the logarithm's. */
  private readonly expansions: readonly WeightExpansion[]
  private made: Promise<Arithmetic<AnyNumber>> | undefined

  constructor(
    request: ComputationRequest,
    chosen: PartialSumParameters,
    tasks: readonly PrimeSumTask[],
    residueClass?: { modulus: number; residue: number },
  ) {
    this.request = request
    this.chosen = chosen
    this.parameters = writePartialSumParameters(chosen)
    this.tasks = tasks
    this.residueClass = residueClass
    this.ranges = cutIntoRanges(chosen.cutoff)
    this.shardCount = this.ranges.length
    this.expansions = [...tasks.map(({ weight }) => weight), LOGARITHM].map((weight) => expandWeight(weight, HIGHEST_ORDER))
  }

  /** heuristic: affects speed only */
  shardCost(index: number): number {
    const { lo, hi } = this.ranges[index]
    return hi - lo + 2_000_000
  }

  async runShard(index: number): Promise<ShardResult> {
    const arithmetic = await this.arithmetic()
    const { lo, hi } = this.ranges[index]
    const totals = this.expansions.map((): [bigint, bigint] => [0n, 0n])
    primeMoments(
      lo,
      hi,
      (batch) =>
        sumBatch(arithmetic, this.expansions, batch).forEach(([[low, high]], i) => {
          totals[i][0] += low
          totals[i][1] += high
        }),
      { residueClass: this.residueClass },
    )
    return totals.map(([low, high]) => [low.toString(), high.toString()])
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    const arithmetic = await this.arithmetic()
    const sums = runningSums(results as string[][][], this.chosen.precision)
    return this.tasks.map((task, index) => {
      const excluded = this.excludedSum(arithmetic, task)
      const enclose = (shard: number): { total: Interval; tail: Tail } => {
        const at = sums[shard]
        const tail = this.tail(arithmetic, task, this.ranges[shard].hi, at[at.length - 1])
        const total = {
          lo: subtract(add(at[index].lo, tail.sum.lo), excluded.hi),
          hi: subtract(add(at[index].hi, tail.sum.hi), excluded.lo),
        }
        return { total, tail }
      }
      const marks = this.ranges.flatMap((range, shard) => (shard === this.ranges.length - 1 || (range.mark && this.isBounded(arithmetic, range.hi)) ? [shard] : []))
      const { total, tail } = enclose(this.ranges.length - 1)
      const half = { num: tail.uncertainty.num, den: tail.uncertainty.den * 2n }
      return {
        definition: this.request.definitions[index],
        method: 'partial-sum',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: tail.uses,
        ...describeEnclosure(total.lo, total.hi, [
          { source: 'tail', bound: 'S-5', magnitude: half },
          { source: 'series', bound: 'S-3', magnitude: subtract(halfWidth(total.lo, total.hi), half) },
        ]),
        convergence: marks.map((shard) => {
          const { lo, hi } = enclose(shard).total
          return { at: String(this.ranges[shard].hi), ...decimalEnclosure(lo, hi) }
        }),
      }
    })
  }

  private arithmetic(): Promise<Arithmetic<AnyNumber>> {
    this.made ??= createArithmetic(this.request.arithmetic, this.chosen.precision)
    return this.made
  }

  private tail(arithmetic: Arithmetic<AnyNumber>, { weight }: PrimeSumTask, cutoff: number, theta: Interval): Tail {
    const { estimates } = this.chosen
    if (!this.residueClass) return primeTail(arithmetic, weight, cutoff, theta, estimates)
    return classTail(arithmetic, weight, cutoff, theta, this.residueClass.modulus, estimates)
  }

  /** Whether the estimates bound what lies beyond a cut-off: without some of them they may do so from a later one only. */
  private isBounded(arithmetic: Arithmetic<AnyNumber>, cutoff: number): boolean {
    return envelopeBeyond(arithmetic, cutoff, this.chosen.estimates, this.tasks[0].weight, this.residueClass?.modulus ?? 1) !== null
  }

  private excludedSum(arithmetic: Arithmetic<AnyNumber>, { weight, exclude }: PrimeSumTask): Interval {
    return arithmetic.frame(() => {
      const terms = exclude.map((p) => weightAt(arithmetic, weight, p, arithmetic.log(arithmetic.rational(rational(p)))))
      const sum = terms.reduce((total, one) => arithmetic.add(total, one), arithmetic.rational(ZERO))
      return { lo: arithmetic.lower(sum), hi: arithmetic.upper(sum) }
    })
  }
}

/** For each shard the sums up to its end, exactly as enclosed. */
function runningSums(results: readonly string[][][], precision: number): Interval[][] {
  const running: [bigint, bigint][] = results[0].map(() => [0n, 0n])
  return results.map((result) =>
    result.map(([lo, hi], i) => {
      running[i][0] += BigInt(lo)
      running[i][1] += BigInt(hi)
      return { lo: dyadic(running[i][0], precision), hi: dyadic(running[i][1], precision) }
    }),
  )
}
