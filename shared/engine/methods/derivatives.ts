import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ONE, type Rational, ZERO, add, compare, divide, isInteger, multiply, negate, parseRational, rational, subtract, toText } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { centralDifferenceWeights, interpolationErrorUpper } from '../series/central-differences.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import { dirichletSeries } from '../series/families.ts'
import { PrimeZeta } from '../series/prime-zeta.ts'
import { ZetaPoint } from '../series/zeta.ts'
import { type ZetaContext, createZetaContext } from '../series/zeta-context.ts'
import type { Definition } from '../sets/definition.ts'
import type { Computation, ComputationRequest, Outcome, Parameters, ShardResult } from './computation.ts'
import { type Goal, decimalsAsked, radiusAimedAt } from './goal.ts'
import type { Forecast, MethodModule } from './method.ts'
import { type ExactBudgetItem, describeEnclosure, halfWidth } from './outcome.ts'

/** The reach of the points is this part of the radius of the disc on which the series is bounded. */
const REACH = 33
const SPARE_DIGITS = 5
const POINTS_PER_SHARD = 4
const MOST_DIGITS = 1_000

interface Task {
  series: DirichletSeries
  power: Rational
  /** m = -b: the order of the derivative. */
  order: number
  /** Radius of the disc around s0 on which |D(s)| <= D(s0 - radius). */
  radius: Rational
}

interface Choice {
  precision: number
  /** The points are s0 + j reach/half, -half <= j <= half. */
  half: number
  terms: number
  split: number
}

function taskOf(definition: Definition): Task {
  const misfit = (message: string): EngineRefusal => new EngineRefusal('method_does_not_fit', 'method', message)
  if (definition.type !== 'series') throw misfit('Derivatives serve sums of weights over a set of integers; this constant is of another kind.')
  const [power, logPower] = [parseRational(definition.weight.power), parseRational(definition.weight.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  if (logPower.num > 0n) throw misfit('Derivatives serve weights with log n to the power 0, 1, 2, … above; with log n below, use the transform.')
  if (!isInteger(logPower)) throw misfit('With log n above, its power must be a whole number: 1, 2, 3, ….')
  const series = dirichletSeries(definition.set, power)
  if (!series) throw misfit('This set has no Dirichlet series here.')
  const finitePrimes = definition.set.kind === 'smooth'
  if (!finitePrimes && compare(power, ONE) <= 0) throw new EngineRefusal('diverges', 'power', 'The sum diverges: without a logarithm below, the power of n must be above 1.')
  // Halfway to the nearest singularity: s = 1, or s = 0 for a finite Euler product.
  const room = finitePrimes ? power : subtract(power, ONE)
  return { series, power, order: Number(-logPower.num), radius: divide(room, rational(2)) }
}

function choose(task: Task, goal: Goal): Choice {
  const digits = decimalsAsked(goal, 'The derivative of the series', MOST_DIGITS)
  if (task.order > 60) throw new EngineRefusal('too_large', 'logPower', 'log n may stand above to a power of at most 60.')
  const room = Math.max(0, -Math.log2(Number(task.radius.num) / Number(task.radius.den))) // heuristic: affects speed only
  const bits = (digits + SPARE_DIGITS) * 3.3219281 // heuristic: affects speed only
  const lost = task.order * (room + 6) + room + task.order * Math.log2(task.order + 1) // heuristic: affects speed only
  const half = task.order === 0 ? 0 : Math.ceil((bits + lost + room) / 8) + task.order // heuristic: affects speed only
  const precision = Math.ceil(bits + lost + task.order * Math.log2(half + 1) + 40) // heuristic: affects speed only
  return { precision, half, terms: Math.ceil(precision / 2.54) + 1, split: 50 + Math.round(precision / 6) } // heuristic: affects speed only
}

function read(given: Parameters, order: number): Choice {
  const whole = (name: keyof Choice, least: number, most: number): number => {
    const value = given[name]
    if (typeof value !== 'number' || !Number.isInteger(value) || value < least || value > most) {
      throw new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be a whole number from ${least} to ${most}.`)
    }
    return value
  }
  const half = order === 0 ? whole('half', 0, 0) : whole('half', Math.ceil(order / 2), 3_000)
  return { precision: whole('precision', 32, 40_000), half, terms: whole('terms', 1, 20_000), split: whole('split', 3, 10_000) }
}

class DerivativeComputation implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Parameters
  readonly shardCount: number
  private readonly task: Task
  private readonly choice: Choice

  constructor(request: ComputationRequest, task: Task, choice: Choice) {
    this.request = request
    this.task = task
    this.choice = choice
    this.parameters = { ...choice }
    this.shardCount = Math.ceil((2 * choice.half + 1) / POINTS_PER_SHARD)
  }

  private get reach(): Rational {
    return divide(this.task.radius, rational(REACH))
  }

  shardCost(): number {
    return 1
  }

  /** Enclosures of D at the points of this shard, ends as fractions. */
  async runShard(index: number): Promise<ShardResult> {
    const a = await createArithmetic(this.request.arithmetic, this.choice.precision)
    const context = createZetaContext(a, this.choice)
    this.task.series.prepare?.(context)
    const spacing = this.choice.half === 0 ? ZERO : divide(this.reach, rational(this.choice.half))
    const first = index * POINTS_PER_SHARD - this.choice.half
    const last = Math.min(first + POINTS_PER_SHARD - 1, this.choice.half)
    return Array.from({ length: last - first + 1 }, (_, i) => {
      const value = this.valueAt(a, context, multiply(spacing, rational(first + i)))
      return [toText(a.lower(value)), toText(a.upper(value))]
    })
  }

  private valueAt(a: Arithmetic<AnyNumber>, context: ZetaContext<AnyNumber>, offset: Rational): AnyNumber {
    const excess = subtract(add(this.task.power, offset), ONE)
    // A finite Euler product never asks for the logarithm of the excess, which may be negative there.
    const logExcess = excess.num > 0n ? a.log(a.rational(excess)) : a.rational(ZERO)
    return this.task.series.evaluate(new PrimeZeta(new ZetaPoint(context, a.rational(excess), logExcess)))
  }

  /** F = (-1)^m D^(m)(s0), the derivative taken of the interpolating polynomial, with the error D-1. */
  async combine(results: ShardResult[]): Promise<Outcome[]> {
    const { order, radius } = this.task
    const { half } = this.choice
    const values = (results as string[][][]).flat().map(([lo, hi]) => [parseRational(lo)!, parseRational(hi)!] as const)
    // p^(m)(0) in the variable j is the derivative times spacing^m; the sign of (-1)^m goes with it.
    const scale = order === 0 ? ONE : power(divide(rational(-half), this.reach), order)
    let [lo, hi] = [ZERO, ZERO]
    centralDifferenceWeights(half, order).forEach((w, i) => {
      const weight = multiply(w, scale)
      const ends = [multiply(weight, values[i][0]), multiply(weight, values[i][1])]
      const [low, high] = weight.num < 0n ? [ends[1], ends[0]] : ends
      ;[lo, hi] = [add(lo, low), add(hi, high)]
    })
    const error = order === 0 ? ZERO : await this.interpolationError(radius)
    const items: ExactBudgetItem[] = [
      ...(order === 0 ? [] : [{ source: 'discretisation' as const, bound: 'D-1', magnitude: error }]),
      { source: 'rounding', bound: 'A-3', magnitude: halfWidth(lo, hi) },
    ]
    return [
      {
        definition: this.request.definitions[0],
        method: 'derivatives',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: [],
        ...describeEnclosure(subtract(lo, error), add(hi, error), items),
        convergence: [],
      },
    ]
  }

  private async interpolationError(radius: Rational): Promise<Rational> {
    const a = await createArithmetic(this.request.arithmetic, this.choice.precision)
    const context = createZetaContext(a, this.choice)
    this.task.series.prepare?.(context)
    const size = a.upper(this.valueAt(a, context, negate(radius)))
    return interpolationErrorUpper(size, radius, this.reach, 2 * this.choice.half + 1, this.task.order)
  }
}

function power(a: Rational, n: number): Rational {
  return rational(a.num ** BigInt(n), a.den ** BigInt(n))
}

/** Weights n^-s0 (log n)^m, m = 0, 1, 2, …: the Dirichlet series of the set or its m-th derivative at s0. */
export const derivatives: MethodModule = {
  name: 'derivatives',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const choice = choose(taskOf(definition), goal)
      const words = choice.precision / 64
      // heuristic: affects choice only
      const seconds = 0.01 + (2 * choice.half + 1) * (200 + 80 * words * words) * 1e-6 * (arithmetic === 'mpfr' ? 5 : 1)
      return { possible: true, radius: radiusAimedAt(goal), seconds: seconds / speed }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    if (request.definitions.length !== 1) throw new EngineRefusal('mixed_definitions', 'definitions', 'Derivatives are computed one constant at a time.')
    const task = taskOf(request.definitions[0])
    return new DerivativeComputation(request, task, request.parameters ? read(request.parameters, task.order) : choose(task, request.goal))
  },
}
