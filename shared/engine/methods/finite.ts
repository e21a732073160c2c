import { LIMITS } from '../../limits.ts'
import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { ZERO, dyadic, parseRational, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Definition } from '../sets/definition.ts'
import { type RationalWeight, weightAt } from '../sieve/weight.ts'
import type { Computation, ComputationRequest, Outcome, Parameters, ShardResult } from './computation.ts'
import { type Goal, decimalsAsked, radiusAimedAt } from './goal.ts'
import type { Forecast, MethodModule } from './method.ts'
import { decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'

/** Members of one shard. */
const BLOCK = 4_096
const PRECISIONS = [32, 8_000]

interface FiniteTask {
  members: readonly bigint[]
  weight: RationalWeight
}

function misfit(message: string): never {
  throw new EngineRefusal('method_does_not_fit', 'method', message)
}

function taskOf(definition: Definition): FiniteTask {
  if (definition.type !== 'series' || definition.set.kind !== 'finite') return misfit('This method adds up the members of a finite list.')
  const [power, logPower] = [parseRational(definition.weight.power), parseRational(definition.weight.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  return { members: definition.set.members.map(BigInt), weight: { power, logPower } }
}

/**
 * Bits for the digits asked for, for the number of terms, and for a power of the logarithm: above, where log n < 2^7, or below,
 * where (log 2)^-1 < 2^0.55 and the quotient loses this twice. heuristic: affects width only
 */
function precisionFor(goal: Goal, task: FiniteTask): number {
  const digits = decimalsAsked(goal, 'A finite sum', LIMITS.digits)
  const { num, den } = task.weight.logPower
  const growth = Number(num < 0n ? (-num * 7n) / den : (num * 11n) / (den * 10n)) + 1
  return Math.ceil((digits + 3) * 3.322) + task.members.length.toString(2).length + growth + 24 // heuristic: affects speed only, and width
}

function readPrecision({ precision }: Parameters): number {
  if (typeof precision !== 'number' || !Number.isInteger(precision) || precision < PRECISIONS[0] || precision > PRECISIONS[1]) {
    throw new EngineRefusal('unsound_parameter', 'precision', `The parameter precision must be a whole number from ${PRECISIONS[0]} to ${PRECISIONS[1]}.`)
  }
  return precision
}

/** Each term enclosed, and the enclosures added. */
class FiniteSum implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Record<string, string | number>
  readonly shardCount: number
  private readonly tasks: readonly FiniteTask[]
  /** The shards of each task, one after the other. */
  private readonly pieces: readonly { task: number; from: number; to: number }[]
  private readonly precision: number
  private made: Promise<Arithmetic<AnyNumber>> | undefined

  constructor(request: ComputationRequest, tasks: readonly FiniteTask[], precision: number) {
    this.request = request
    this.tasks = tasks
    this.precision = precision
    this.parameters = { precision }
    this.pieces = tasks.flatMap(({ members }, task) =>
      Array.from({ length: Math.ceil(members.length / BLOCK) }, (_, i) => ({ task, from: i * BLOCK, to: Math.min((i + 1) * BLOCK, members.length) })),
    )
    this.shardCount = this.pieces.length
  }

  /** heuristic: affects speed only */
  shardCost(index: number): number {
    return this.pieces[index].to - this.pieces[index].from
  }

  async runShard(index: number): Promise<ShardResult> {
    this.made ??= createArithmetic(this.request.arithmetic, this.precision)
    const arithmetic = await this.made
    const { task, from, to } = this.pieces[index]
    const { members, weight } = this.tasks[task]
    const [lo, hi] = arithmetic.frame(() => {
      let total = arithmetic.rational(ZERO)
      for (let i = from; i < to; i++) {
        const logN = arithmetic.log(arithmetic.rational(rational(members[i])))
        total = arithmetic.add(total, weightAt(arithmetic, weight, members[i], logN))
      }
      return arithmetic.fixedBounds(total)
    })
    return [lo.toString(), hi.toString()]
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    return this.tasks.map(({ members }, task) => {
      let [low, high, done] = [0n, 0n, 0]
      const convergence: Outcome['convergence'] = []
      const mine = this.pieces.flatMap((piece, shard) => (piece.task === task ? [{ ...piece, result: results[shard] as string[] }] : []))
      const marks = new Set([0.25, 0.5, 0.75, 1].map((share) => Math.ceil(share * mine.length)))
      for (const { to, result } of mine) {
        low += BigInt(result[0])
        high += BigInt(result[1])
        done++
        if (marks.has(done)) convergence.push({ at: String(to), ...decimalEnclosure(dyadic(low, this.precision), dyadic(high, this.precision)) })
      }
      const [lo, hi] = [dyadic(low, this.precision), dyadic(high, this.precision)]
      return {
        definition: this.request.definitions[task],
        method: 'finite',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: [],
        ...describeEnclosure(lo, hi, [{ source: 'rounding', bound: 'F-1', magnitude: halfWidth(lo, hi) }]),
        convergence: members.length > BLOCK ? convergence : [],
      }
    })
  }
}

/** Adds up the members of an uploaded list (F-1). */
export const finite: MethodModule = {
  name: 'finite',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const task = taskOf(definition)
      const words = precisionFor(goal, task) / 64
      const perTerm = (3 + 0.6 * words * words) * 1e-6 * (arithmetic === 'mpfr' ? 4 : 1)
      return { possible: true, radius: radiusAimedAt(goal), seconds: (0.05 + task.members.length * perTerm) / speed }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    const tasks = request.definitions.map(taskOf)
    const precision = request.parameters ? readPrecision(request.parameters) : Math.max(...tasks.map((task) => precisionFor(request.goal, task)))
    return new FiniteSum(request, tasks, precision)
  },
}
