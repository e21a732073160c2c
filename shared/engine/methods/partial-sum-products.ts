import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ONE, type Rational, ZERO, add, compare, dyadic, multiply, parseRational, rational, subtract, toText } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { envelopeBeyond } from '../estimates/envelope.ts'
import { PrimePowerTail } from '../estimates/prime-power-tail.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import { reciprocalGamma } from '../series/gamma.ts'
import { sumBatch } from '../sieve/block-sums.ts'
import { BinTable, type LogBins, addToBins, mergeBin } from '../sieve/log-moments.ts'
import { HIGHEST_ORDER, primeMoments } from '../sieve/prime-moments.ts'
import { expandWeight } from '../sieve/weight.ts'
import type { Computation, ComputationRequest, EstimateUse, Outcome, Parameters, ShardResult } from './computation.ts'
import type { MellinTask } from './mellin-task.ts'
import { decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import { type PartialSumParameters, readPartialSumParameters, writePartialSumParameters } from './partial-sum-parameters.ts'
import { PartialPrimePoint, type PrimeKnowledge, type ProductSet, logsOfSmallPrimes } from './partial-sum-powers.ts'
import { type Range, cutIntoRanges } from './partial-sum-ranges.ts'
import { discretisationUpper, truncationAboveUpper, truncationBelowUpper } from './trapezoid-bounds.ts'
import { chooseParameters } from './trapezoid-parameters.ts'

/** As this weight does the sums of p^-s use theta. */
const RECIPROCAL = { power: ONE, logPower: ZERO }

/** The quadrature is made finer than any cut-off can be. heuristic: affects width only */
const DIGITS = 9

export interface ProductParameters extends PartialSumParameters {
  /** The trapezoid's step, strip and nodes, as in T-2. */
  step: Rational
  gap: Rational
  first: number
  last: number
}

export function chooseProductParameters(chosen: PartialSumParameters, task: MellinTask): ProductParameters {
  const { step, gap, first, last } = chooseParameters(DIGITS, task.series, task.power, task.logPower, task.complexity, task.distinct)
  // Even, so that every other node is a sum with the step 2h.
  return { ...chosen, step, gap, first: first - (((first % 2) + 2) % 2), last: last + (last % 2) }
}

export function readProductParameters(given: Parameters): ProductParameters {
  const fraction = (name: 'step' | 'gap'): Rational => {
    const value = parseRational(String(given[name] ?? ''))
    if (value && value.num > 0n && compare(value, ONE) <= 0 && value.den <= 2n ** 40n) return value
    throw new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be a fraction above 0 and at most 1.`)
  }
  const whole = (name: 'first' | 'last', least: number, most: number): number => {
    const value = given[name]
    if (typeof value === 'number' && Number.isInteger(value) && value % 2 === 0 && value >= least && value <= most) return value
    throw new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be an even number from ${least} to ${most}.`)
  }
  return { ...readPartialSumParameters(given), step: fraction('step'), gap: fraction('gap'), first: whole('first', -100_000, -2), last: whole('last', 2, 10_000) }
}

/** What one cut-off gives for one constant. */
interface Enclosed {
  lo: Rational
  hi: Rational
  items: { source: 'discretisation' | 'truncation-below' | 'truncation-above'; bound: string; magnitude: Rational }[]
  uses: EstimateUse[]
}

/**
 * Sums over products of k primes from the primes up to a cut-off: their Dirichlet series D is made of the sums of p^-js over the
 * primes, which are added up to the cut-off and bounded beyond, and F = 1/Gamma(b) integral of t^(b-1) D(s0+t) dt by the
 * trapezoid rule (S-9, T-1 to T-4). No zeta value occurs.
 */
export class ProductPartialSum implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Record<string, string | number>
  readonly shardCount: number
  private readonly chosen: ProductParameters
  private readonly task: MellinTask
  private readonly ranges: readonly Range[]
  private made: Promise<Arithmetic<AnyNumber>> | undefined

  constructor(request: ComputationRequest, chosen: ProductParameters, task: MellinTask) {
    this.request = request
    this.chosen = chosen
    this.task = task
    this.parameters = { ...writePartialSumParameters(chosen), step: toText(chosen.step), gap: toText(chosen.gap), first: chosen.first, last: chosen.last }
    this.ranges = cutIntoRanges(chosen.cutoff)
    this.shardCount = this.ranges.length
  }

  /** heuristic: affects speed only */
  shardCost(index: number): number {
    return this.ranges[index].hi - this.ranges[index].lo + 2_000_000
  }

  async runShard(index: number): Promise<ShardResult> {
    const arithmetic = await this.arithmetic()
    const { lo, hi } = this.ranges[index]
    const bins: LogBins = new Map()
    const theta = [0n, 0n]
    const logarithm = [expandWeight({ power: ZERO, logPower: rational(-1) }, HIGHEST_ORDER)]
    primeMoments(lo, hi, (batch) => {
      addToBins(arithmetic, batch, bins)
      const [[[low, high]]] = sumBatch(arithmetic, logarithm, batch)
      theta[0] += low
      theta[1] += high
    })
    const text = (ends: readonly bigint[]): string[] => ends.map(String)
    return { theta: text(theta), bins: [...bins].map(([bin, sums]) => [bin, sums.map(text)]) }
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    const arithmetic = await this.arithmetic()
    const bounds = await createArithmetic(this.request.arithmetic, this.chosen.precision + 32)
    const knowledge = new Running(this.chosen.precision)
    const convergence: Outcome['convergence'][] = this.task.series.map(() => [])
    let last: Enclosed[] = []
    this.ranges.forEach(({ hi, mark }, shard) => {
      knowledge.add(results[shard] as unknown as ShardText)
      const final = shard === this.ranges.length - 1
      const shown = mark && isDecade(hi) && hi >= this.chosen.cutoff / 5_000
      // Without some of the estimates what lies beyond may be bounded from a later cut-off only.
      if (!final && !(shown && envelopeBeyond(arithmetic, hi, this.chosen.estimates, RECIPROCAL, 1))) return
      last = arithmetic.frame(() => this.enclose(arithmetic, bounds, knowledge, hi, final ? 1 : 2))
      last.forEach((one, index) => convergence[index].push({ at: String(hi), ...decimalEnclosure(one.lo, one.hi) }))
    })
    return last.map(({ lo, hi, items, uses }, index) => {
      const counted = items.reduce((total, item) => add(total, item.magnitude), ZERO)
      const rest = subtract(halfWidth(lo, hi), counted)
      return {
        definition: this.request.definitions[index],
        method: 'partial-sum',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: uses,
        ...describeEnclosure(lo, hi, [{ source: 'tail', bound: 'S-9', magnitude: rest.num > 0n ? rest : ZERO }, ...items]),
        convergence: convergence[index],
      }
    })
  }

  private arithmetic(): Promise<Arithmetic<AnyNumber>> {
    this.made ??= createArithmetic(this.request.arithmetic, this.chosen.precision)
    return this.made
  }

  /** T-2 with the step `stride` h: I in [h sum (1 - kappa), (h sum + what was left out)/(1 - kappa)], F = I/Gamma(b). */
  private enclose(a: Arithmetic<AnyNumber>, bounds: Arithmetic<AnyNumber>, running: Running, cutoff: number, stride: 1 | 2): Enclosed[] {
    const { step, gap, first, last, precision, estimates } = this.chosen
    const { logPower, series } = this.task
    const knowledge = running.numbers(a, cutoff, (theta) => new PrimePowerTail(a, cutoff, theta, estimates))
    const logs = logsOfSmallPrimes(a)
    const sums = series.map((): [bigint, bigint] => [0n, 0n])
    let atLast: bigint[] = []
    for (let j = first; j <= last; j += stride) {
      const u = multiply(step, rational(j))
      const ends = a.frame(() => this.atNode(a, knowledge, logs, u))
      ends.forEach(([lo, hi], i) => {
        sums[i][0] += lo
        sums[i][1] += hi
      })
      atLast = ends.map(([, hi]) => hi)
    }
    const width = multiply(step, rational(stride))
    const wide = multiply(gap, rational(stride))
    const kappa = discretisationUpper(bounds, width, compare(wide, ONE) > 0 ? ONE : wide, logPower)
    if (compare(kappa, rational(1, 2)) >= 0) throw new EngineRefusal('unsound_parameter', 'step', 'The step is too wide for its bound.')
    const t = bounds.lower(bounds.exp(bounds.rational(multiply(step, rational(last)))))
    const gamma = reciprocalGamma(bounds, logPower)
    const [gammaLo, gammaHi] = [bounds.lower(gamma), bounds.upper(gamma)]
    return series.map((one: DirichletSeries, i) => {
      const below = multiply(truncationBelowUpper(bounds, one, step, first, subtract(logPower, rational(one.pole))), rational(stride))
      const above = multiply(truncationAboveUpper(bounds, one, step, dyadic(atLast[i], precision), t, logPower), rational(stride))
      const [lo, hi] = sums[i].map((n) => multiply(dyadic(n, precision), width))
      const most = add(hi, add(below, above))
      const half = multiply(gammaHi, rational(1, 2))
      return {
        lo: multiply(multiply(lo, subtract(ONE, kappa)), gammaLo),
        hi: multiply(multiply(most, add(ONE, multiply(kappa, rational(2)))), gammaHi),
        items: [
          { source: 'discretisation', bound: 'T-2', magnitude: multiply(multiply(kappa, rational(3)), multiply(hi, half)) },
          { source: 'truncation-below', bound: 'T-3', magnitude: multiply(below, half) },
          { source: 'truncation-above', bound: 'T-4', magnitude: multiply(above, half) },
        ],
        uses: knowledge.tail.uses,
      }
    })
  }

  /** Integer ends of e^(bu) D(s0 + e^u), for each constant. */
  private atNode(a: Arithmetic<AnyNumber>, knowledge: PrimeKnowledge<AnyNumber>, logs: readonly AnyNumber[], u: Rational): [bigint, bigint][] {
    const { power, logPower, definitions } = this.task
    const logT = a.rational(u)
    const t = a.exp(logT)
    const distance = subtract(power, ONE)
    const y = distance.num === 0n ? t : a.add(t, a.rational(distance))
    const point = new PartialPrimePoint(a, knowledge, logs, y, distance.num === 0n ? logT : a.log(y))
    return definitions.map(({ set }) => a.fixedBounds(a.timesExp(point.series(set as ProductSet), a.rational(multiply(logPower, u)))))
  }
}

const isDecade = (n: number): boolean => /^10+$/.test(String(n))

interface ShardText {
  theta: [string, string]
  bins: [number, [string, string][]][]
}

/** What the shards so far know together. */
class Running {
  private readonly precision: number
  private readonly bins: LogBins = new Map()
  private readonly theta: [bigint, bigint] = [0n, 0n]

  constructor(precision: number) {
    this.precision = precision
  }

  add({ theta, bins }: ShardText): void {
    this.theta[0] += BigInt(theta[0])
    this.theta[1] += BigInt(theta[1])
    for (const [bin, sums] of bins) mergeBin(this.bins, bin, sums.map(([lo, hi]) => [BigInt(lo), BigInt(hi)]))
  }

  numbers<N>(arithmetic: Arithmetic<N>, cutoff: number, tail: (theta: { lo: Rational; hi: Rational }) => PrimePowerTail<N>): PrimeKnowledge<N> {
    const theta = { lo: dyadic(this.theta[0], this.precision), hi: dyadic(this.theta[1], this.precision) }
    return { cutoff, bins: new BinTable(arithmetic, this.bins), tail: tail(theta) }
  }
}
