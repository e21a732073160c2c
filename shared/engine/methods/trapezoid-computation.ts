import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ONE, type Rational, compare, dyadic, multiply, rational, subtract } from '../arithmetic/rational.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import { reciprocalGamma } from '../series/gamma.ts'
import type { Computation, ComputationRequest, Outcome, ShardResult } from './computation.ts'
import { discretisationUpper, truncationAboveUpper, truncationBelowUpper } from './trapezoid-bounds.ts'
import { encloseConstant } from './trapezoid-outcome.ts'
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
    return this.series.map((one, index) => ({
      definition: this.request.definitions[index],
      method: 'transform',
      arithmetic: this.request.arithmetic,
      goal: this.request.goal,
      parameters: this.parameters,
      estimates: [],
      ...encloseConstant({
        sums: addShards(results, index),
        nodes: this.nodes,
        step: this.chosen.step,
        precision: this.chosen.precision,
        roundingBound: this.request.arithmetic === 'ball' ? 'A-3' : 'A-8',
        kappas,
        ...this.truncation(bounds, one, atLast[index][1]),
        gamma: gammaBounds,
      }),
    }))
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
