import { type Rational, compare, parseRational, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import { dirichletSeries } from '../series/families.ts'
import type { Definition, SeriesDefinition } from '../sets/definition.ts'

/** Sums F = 1/Gamma(b) integral of t^(b-1) D(s0+t) over t > 0 with one weight: what either quadrature of it works on (T-1). */
export interface MellinTask {
  readonly definitions: readonly SeriesDefinition[]
  readonly series: readonly DirichletSeries[]
  /** s0. */
  readonly power: Rational
  /** b. */
  readonly logPower: Rational
  /** The largest k. */
  readonly complexity: number
  /** Whether sums over (p^s - 1)^-j occur, which lose more bits than the others. */
  readonly distinct: boolean
}

/** The task for these definitions; refuses what has no such integral, or definitions that do not share one weight. */
export function mellinTask(definitions: readonly Definition[]): MellinTask {
  if (!definitions.every((one) => one.type === 'series')) {
    throw new EngineRefusal('method_does_not_fit', 'method', 'The transform sums weights over a set of integers; this constant is of another kind.')
  }
  const { weight } = definitions[0]
  const [power, logPower] = [parseRational(weight.power), parseRational(weight.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  if (logPower.num <= 0n) {
    throw new EngineRefusal('method_does_not_fit', 'method', 'The transform needs a positive power of the logarithm; use the method for derivatives.')
  }
  const series = definitions.map(({ set, weight: other }) => {
    if (other.power !== weight.power || other.logPower !== weight.logPower) {
      throw new EngineRefusal('mixed_weights', 'definitions', 'One sweep serves one weight: ask for other weights in runs of their own.')
    }
    const found = dirichletSeries(set, power)
    if (!found) throw new EngineRefusal('method_does_not_fit', 'method', 'The transform does not know the Dirichlet series of this set.')
    if (compare(logPower, rational(found.pole)) <= 0) {
      throw new EngineRefusal('diverges', 'logPower', 'The sum diverges: over such a set 1/(n log^b n) needs b > 1.')
    }
    return found
  })
  return {
    definitions,
    series,
    power,
    logPower,
    complexity: Math.max(...definitions.map(({ set }) => ('k' in set ? set.k : 1))),
    distinct: definitions.some(({ set }) => set.kind === 'distinct-prime-factors'),
  }
}
