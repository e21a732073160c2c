import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ONE, type Rational, ZERO, add, compare, dyadic, multiply, rational, subtract } from '../arithmetic/rational.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import { reciprocalGamma } from '../series/gamma.ts'
import type { Computation, ComputationRequest, Outcome, ShardResult } from './computation.ts'
import { type ExactBudgetItem, decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import { discretisationUpper, truncationAboveUpper, truncationBelowUpper } from './trapezoid-bounds.ts'
import { type TrapezoidParameters, writeParameters } from './trapezoid-parameters.ts'
import { LEVELS, type LevelSums, TrapezoidSweep } from './trapezoid-sweep.ts'

/** Bits that the arithmetic of the bounds has beyond that of the sum, so that they are not rounded up to its last unit. */
const BOUND_BITS = 64
/** About as many shards as there are, so that progress is smooth and an interruption loses little. */
const SHARDS = 64
const LEAST_NODES = 8

/** A run of the trapezoid with everything chosen: one sweep over the nodes for all its series (T-1 to T-7). */
export class TrapezoidComputation implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Record<string, string | number>
  readonly shardCount: number
  private readonly chosen: TrapezoidParameters
  private readonly series: readonly DirichletSeries[]
  private readonly power: Rational
  private readonly logPower: Rational
  private readonly block: number
  private readonly nodes: number
  private sweep: Promise<TrapezoidSweep> | undefined

  constructor(
    request: ComputationRequest,
    chosen: TrapezoidParameters,
    series: readonly DirichletSeries[],
    weight: { power: Rational; logPower: Rational },
  ) {
    this.request = request
    this.chosen = chosen
    this.parameters = writeParameters(chosen)
    this.series = series
    this.power = weight.power
    this.logPower = weight.logPower
    this.nodes = chosen.last - chosen.first + 1
    this.block = Math.max(LEAST_NODES, Math.ceil(this.nodes / SHARDS))
    this.shardCount = Math.ceil(this.nodes / this.block)
  }

  /** Nodes left of 0 need every zeta value, those right of it fewer and fewer. heuristic: affects speed only */
  shardCost(index: number): number {
    const [from, to] = this.range(index)
    return to - from + 1
  }

  async runShard(index: number): Promise<ShardResult> {
    const [from, to] = this.range(index)
    const sums = (await this.ready()).sum(from, to, this.series)
    return sums.map((levels) => levels.map(([lo, hi]) => [lo.toString(), hi.toString()]))
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    const sweep = await this.ready()
    const bounds = await createArithmetic(this.request.arithmetic, this.chosen.precision + BOUND_BITS)
    const gamma = reciprocalGamma(bounds, this.logPower)
    const gammaBounds: [Rational, Rational] = [bounds.lower(gamma), bounds.upper(gamma)]
    const kappas = Array.from({ length: LEVELS }, (_, level) => this.kappa(bounds, level))
    const atLast = sweep.atNode(this.chosen.last, this.series)
    return this.series.map((one, index) =>
      this.outcome(index, addShards(results, index), this.truncation(bounds, one, atLast[index][1]), kappas, gammaBounds),
    )
  }

  private range(index: number): [number, number] {
    const from = this.chosen.first + index * this.block
    return [from, Math.min(from + this.block - 1, this.chosen.last)]
  }

  private ready(): Promise<TrapezoidSweep> {
    this.sweep ??= createArithmetic(this.request.arithmetic, this.chosen.precision).then(
      (arithmetic) => new TrapezoidSweep(arithmetic, this.chosen, this.power, this.logPower),
    )
    return this.sweep
  }

  /** The bound of T-2 for the step 2^level h, with the gap widened in proportion, at most 1. */
  private kappa(bounds: Arithmetic<AnyNumber>, level: number): Rational {
    const widened = multiply(this.chosen.gap, rational(2 ** level))
    const gap = compare(widened, ONE) > 0 ? ONE : widened
    return discretisationUpper(bounds, multiply(this.chosen.step, rational(2 ** level)), gap, this.logPower)
  }

  private truncation(bounds: Arithmetic<AnyNumber>, series: DirichletSeries, lastValue: bigint): { below: Rational; above: Rational } {
    const { step, first, last, precision } = this.chosen
    const t = bounds.lower(bounds.exp(bounds.rational(multiply(step, rational(last)))))
    const value = dyadic(lastValue, precision)
    return {
      below: truncationBelowUpper(bounds, series, step, first, subtract(this.logPower, rational(series.pole))),
      above: truncationAboveUpper(bounds, series, step, value, t, this.logPower),
    }
  }

  /** T-2: I in [h sum (1 - kappa), (h sum + what was left out) / (1 - kappa)], and the constant is I / Gamma(b). */
  private outcome(
    index: number,
    sums: LevelSums,
    { below, above }: { below: Rational; above: Rational },
    kappas: Rational[],
    gamma: [Rational, Rational],
  ): Outcome {
    const { step, precision } = this.chosen
    const leftOut = add(below, above)
    const enclose = (level: number): { lo: Rational; hi: Rational; sumHi: Rational } | null => {
      const kappa = kappas[level]
      if (compare(kappa, rational(1, 2)) >= 0) return null
      const part = sums.slice(level).reduce(([lo, hi], [a, b]) => [lo + a, hi + b], [0n, 0n])
      const width = multiply(step, rational(2 ** level))
      const [sumLo, sumHi] = part.map((n) => multiply(dyadic(n, precision), width))
      // What is left out with the step 2^level h is at most 2^level times the bound for h, term by term.
      const most = add(sumHi, multiply(leftOut, rational(2 ** level)))
      const low = multiply(multiply(sumLo, subtract(ONE, kappa)), gamma[0])
      // All terms of the constant are positive.
      const lo = low.num < 0n ? ZERO : low
      const hi = multiply(multiply(most, add(ONE, multiply(kappa, rational(2)))), gamma[1])
      return { lo, hi, sumHi }
    }
    const finest = enclose(0)
    if (!finest) throw new Error('the step is too wide for its bound')
    const { lo, hi, sumHi } = finest
    const half = rational(1, 2)
    const items: ExactBudgetItem[] = [
      { source: 'discretisation', bound: 'T-2', magnitude: multiply(multiply(multiply(kappas[0], rational(3, 2)), sumHi), gamma[1]) },
      { source: 'truncation-below', bound: 'T-3', magnitude: multiply(multiply(below, half), gamma[1]) },
      { source: 'truncation-above', bound: 'T-4', magnitude: multiply(multiply(above, half), gamma[1]) },
    ]
    const counted = items.reduce((total, item) => add(total, item.magnitude), rational(0))
    const rounding = subtract(halfWidth(lo, hi), counted)
    return {
      definition: this.request.definitions[index],
      method: 'transform',
      arithmetic: this.request.arithmetic,
      goal: this.request.goal,
      parameters: this.parameters,
      estimates: [],
      ...describeEnclosure(lo, hi, [...items, { source: 'rounding', bound: this.request.arithmetic === 'ball' ? 'A-3' : 'A-8', magnitude: rounding.num > 0n ? rounding : rational(0) }]),
      convergence: [3, 2, 1, 0].flatMap((level) => {
        const enclosed = enclose(level)
        if (!enclosed) return []
        return [{ at: String(Math.floor(this.nodes / 2 ** level)), ...decimalEnclosure(enclosed.lo, enclosed.hi) }]
      }),
    }
  }
}

function addShards(results: readonly ShardResult[], index: number): LevelSums {
  const total = Array.from({ length: LEVELS }, (): [bigint, bigint] => [0n, 0n])
  for (const result of results as string[][][][]) {
    result[index].forEach(([lo, hi], level) => {
      total[level][0] += BigInt(lo)
      total[level][1] += BigInt(hi)
    })
  }
  return total
}
