import { LIMITS } from '../../limits.ts'
import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { primesUpTo } from '../arithmetic/primes.ts'
import { type Rational, ZERO, add, multiply, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { eulerGamma } from '../series/euler-gamma.ts'
import { type PrimeExpansion, expandLogarithm, expandMertens, expandQuotient, expansionTail, valueAtPrime } from '../series/prime-expansion.ts'
import { PrimeZeta } from '../series/prime-zeta.ts'
import { ZetaPoint } from '../series/zeta.ts'
import { createZetaContext } from '../series/zeta-context.ts'
import type { Definition } from '../sets/definition.ts'
import type { Computation, ComputationRequest, Outcome } from './computation.ts'
import { type ExpansionParameters, chooseExpansionParameters, readExpansionParameters } from './expansion-parameters.ts'
import { decimalsAsked, radiusAimedAt } from './goal.ts'
import type { Forecast, MethodModule } from './method.ts'
import { describeEnclosure, halfWidth } from './outcome.ts'

/** A constant over the primes: its terms prime by prime, their expansion, and how the sum becomes the constant. */
interface Task {
  readonly expansion: PrimeExpansion
  readonly exclude: readonly number[]
  /** The term of one prime, to be added or multiplied. */
  term<N>(a: Arithmetic<N>, p: number): N
  readonly combine: 'sum' | 'product'
  readonly addsGamma: boolean
}

function taskOf(definition: Definition): Task {
  if (definition.type === 'named') {
    return {
      expansion: expandMertens(),
      exclude: [],
      term: (a, p) => a.add(a.log(a.rational(rational(p - 1, p))), a.rational(rational(1, p))),
      combine: 'sum',
      addsGamma: true,
    }
  }
  if (definition.type !== 'over-primes') {
    throw new EngineRefusal('method_does_not_fit', 'method', 'The expansion serves sums and products over the primes of a rational function.')
  }
  const { combine, exclude } = definition
  const [numerator, denominator] = [definition.numerator.map(BigInt), definition.denominator.map(BigInt)]
  const expansion = combine === 'sum' ? expandQuotient(numerator, denominator) : expandLogarithm(numerator, denominator)
  return {
    expansion,
    exclude,
    term: (a, p) => a.rational(valueAtPrime(numerator, denominator, p, combine)),
    combine,
    addsGamma: false,
  }
}

/**
 * Poles and zero factors lie at primes within the radius of the expansion: all of them are tried before anything is computed, so
 * that they are refused at once.
 */
function refuseBadPrimes(definition: Definition, task: Task): void {
  if (definition.type !== 'over-primes') return
  const [numerator, denominator] = [definition.numerator.map(BigInt), definition.denominator.map(BigInt)]
  const last = Number(task.expansion.radius.num / task.expansion.radius.den) + 1
  for (const p of primesUpTo(last)) if (!task.exclude.includes(p)) valueAtPrime(numerator, denominator, p, task.combine)
}

class ExpansionComputation implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Record<string, string | number>
  readonly shardCount = 1
  private readonly task: Task
  private readonly chosen: ExpansionParameters

  constructor(request: ComputationRequest, task: Task, chosen: ExpansionParameters) {
    this.request = request
    this.task = task
    this.chosen = chosen
    this.parameters = { ...chosen }
  }

  shardCost(): number {
    return 1
  }

  async runShard(): Promise<string[]> {
    const a = await createArithmetic(this.request.arithmetic, this.chosen.precision)
    const { value, tail } = this.enclose(a)
    return [a.lower(value), a.upper(value), tail].map((q) => `${q.num}/${q.den}`)
  }

  /**
   * *Claim*: `value` contains the constant; `tail` is the part of its radius that the omitted powers bring.
   * *Valid for*: split > radius. *Bound*: E-1, E-2, Z-1, Z-3.
   */
  private enclose(a: Arithmetic<AnyNumber>): { value: AnyNumber; tail: Rational } {
    const { expansion, exclude, combine, addsGamma } = this.task
    const { split, powers, terms } = this.chosen
    const zero = a.rational(ZERO)
    // The point s = 1: its multiples r >= 2 are all that is asked for, so the pole is never met.
    const primeZeta = new PrimeZeta(new ZetaPoint(createZetaContext(a, { terms, split }), zero, zero))
    let rough = zero
    for (let j = 2; j <= powers; j++) {
      const c = expansion.coefficient(j)
      if (c.num !== 0n) rough = a.add(rough, a.scale(primeZeta.overRoughPrimes(j), c))
    }
    const tail = expansionTail(expansion, split, powers)
    rough = a.addError(rough, a.rational(tail))
    const smooth = primesUpTo(split).filter((p) => !exclude.includes(p)).map((p) => this.task.term(a, p))
    const taken = exclude.filter((p) => p > split).map((p) => this.task.term(a, p))
    if (combine === 'product') {
      const product = [a.exp(rough), ...smooth].reduce((x, y) => a.multiply(x, y))
      return { value: taken.reduce((x, y) => a.divide(x, y), product), tail }
    }
    const start = addsGamma ? a.add(rough, eulerGamma(a)) : rough
    const total = smooth.reduce((x, y) => a.add(x, y), start)
    return { value: taken.reduce((x, y) => a.subtract(x, y), total), tail }
  }

  async combine(results: (string[] | unknown)[]): Promise<Outcome[]> {
    const [lo, hi, tail] = (results[0] as string[]).map((text) => rational(...(text.split('/').map(BigInt) as [bigint, bigint])))
    // In a product the tail of the logarithm acts on the whole value; hi bounds its share.
    const size = this.task.combine === 'product' ? multiply(tail, multiply(rational(2), magnitudeOf(lo, hi))) : tail
    const rounding = subtract(halfWidth(lo, hi), size)
    return [
      {
        definition: this.request.definitions[0],
        method: 'expansion',
        arithmetic: this.request.arithmetic,
        goal: this.request.goal,
        parameters: this.parameters,
        estimates: [],
        ...describeEnclosure(lo, hi, [
          { source: 'series', bound: 'E-2', magnitude: size },
          { source: 'rounding', bound: 'A-3', magnitude: rounding.num > 0n ? rounding : ZERO },
        ]),
        convergence: [],
      },
    ]
  }
}

function magnitudeOf(lo: Rational, hi: Rational): Rational {
  return add(lo.num < 0n ? rational(-lo.num, lo.den) : lo, hi.num < 0n ? rational(-hi.num, hi.den) : hi)
}

function parametersFor(task: Task, request: Pick<ComputationRequest, 'goal' | 'parameters'>): ExpansionParameters {
  if (request.parameters) return readExpansionParameters(request.parameters, task.expansion)
  return chooseExpansionParameters(decimalsAsked(request.goal, 'The expansion', LIMITS.digits), task.expansion)
}

/** Sums and products over the primes through the expansion of their terms in prime zeta values. */
export const expansion: MethodModule = {
  name: 'expansion',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const task = taskOf(definition)
      refuseBadPrimes(definition, task)
      const p = parametersFor(task, { goal })
      const words = p.precision / 64
      // heuristic: affects choice only
      const seconds = (0.01 + p.powers * p.terms * (0.15 + 0.03 * words * words) * 1e-6 + p.split * 2e-6) * (arithmetic === 'mpfr' ? 4 : 1)
      return { possible: true, radius: radiusAimedAt(goal), seconds: seconds / speed }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    if (request.definitions.length !== 1) throw new EngineRefusal('mixed_definitions', 'definitions', 'The expansion computes one constant at a time.')
    const task = taskOf(request.definitions[0])
    refuseBadPrimes(request.definitions[0], task)
    return new ExpansionComputation(request, task, parametersFor(task, request))
  },
}

