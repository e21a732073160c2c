import type { AnyNumber } from '../arithmetic/choose.ts'
import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, type Rational, multiply, rational, subtract } from '../arithmetic/rational.ts'
import type { DirichletSeries, SeriesPoint } from '../series/dirichlet.ts'
import { PrimeZeta } from '../series/prime-zeta.ts'
import { ZetaPoint } from '../series/zeta.ts'
import { type ZetaContext, createZetaContext } from '../series/zeta-context.ts'
import type { TrapezoidParameters } from './trapezoid-parameters.ts'

/** Sums are kept apart by how often 2 divides the node's index, so that the steps 2h, 4h and 8h come with the step h. */
export const LEVELS = 4

/** lo and hi of each level's sum of f(jh), in units of 2^-precision. */
export type LevelSums = [bigint, bigint][]

/** How often 2 divides j, at most LEVELS - 1; 0 is divisible by everything. */
export function levelOf(j: number): number {
  let level = 0
  for (let rest = j; level < LEVELS - 1 && rest % 2 === 0; rest /= 2) level++
  return level
}

/** The nodes of one run: evaluates f(u) Gamma(b) = e^((b-pole) u) (t^pole D(s0 + t)), t = e^u, u = jh, for several series at once. */
export class TrapezoidSweep {
  readonly arithmetic: Arithmetic<AnyNumber>
  private readonly context: ZetaContext<AnyNumber>
  private readonly parameters: TrapezoidParameters
  private readonly power: Rational
  private readonly logPower: Rational

  constructor(arithmetic: Arithmetic<AnyNumber>, parameters: TrapezoidParameters, power: Rational, logPower: Rational) {
    this.arithmetic = arithmetic
    this.parameters = parameters
    this.power = power
    this.logPower = logPower
    this.context = createZetaContext(arithmetic, parameters)
  }

  /** Integer bounds of f(jh) Gamma(b) for each series, in units of 2^-precision. Sums of integers do not depend on their order. */
  atNode(j: number, series: readonly DirichletSeries[]): [bigint, bigint][] {
    const { arithmetic } = this
    for (const one of series) one.prepare?.(this.context)
    return arithmetic.frame(() => {
      const u = multiply(this.parameters.step, rational(j))
      const at = this.point(u)
      return series.map((one) => {
        const exponent = multiply(subtract(this.logPower, rational(one.pole)), u)
        return arithmetic.fixedBounds(arithmetic.timesExp(one.evaluate(at), arithmetic.rational(exponent)))
      })
    })
  }

  /** Sums over the nodes from <= j <= to. */
  sum(from: number, to: number, series: readonly DirichletSeries[]): LevelSums[] {
    const sums = series.map(() => Array.from({ length: LEVELS }, (): [bigint, bigint] => [0n, 0n]))
    for (let j = from; j <= to; j++) {
      const level = levelOf(j)
      this.atNode(j, series).forEach(([lo, hi], index) => {
        sums[index][level][0] += lo
        sums[index][level][1] += hi
      })
    }
    return sums
  }

  private point(u: Rational): SeriesPoint<AnyNumber> {
    const { arithmetic } = this
    const logT = arithmetic.rational(u)
    const t = arithmetic.exp(logT)
    const distance = subtract(this.power, ONE)
    if (distance.num === 0n) return new PrimeZeta(new ZetaPoint(this.context, t, logT))
    const excess = arithmetic.add(t, arithmetic.rational(distance))
    return new PrimeZeta(new ZetaPoint(this.context, excess, arithmetic.log(excess)))
  }
}
