import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import type { AnyNumber } from '../arithmetic/choose.ts'
import { abs, ceilShift, floorShift, max } from '../arithmetic/integers.ts'
import { ONE, type Rational, rational, subtract, toText } from '../arithmetic/rational.ts'
import type { DirichletSeries, SeriesPoint } from '../series/dirichlet.ts'
import type { EdgeSeries } from '../series/edge.ts'
import { areDescending, gaussNode } from '../series/gauss-legendre.ts'
import { type ProductRule, createProductRule, legendreMoments } from '../series/legendre-moments.ts'
import { PrimeZeta } from '../series/prime-zeta.ts'
import { ZetaPoint } from '../series/zeta.ts'
import { type ZetaContext, createZetaContext } from '../series/zeta-context.ts'
import type { PanelsParameters } from './panels-parameters.ts'

/** One series of a run: as it is away from the edge, and its form at the edge. */
export interface SweepSeries {
  readonly series: DirichletSeries
  readonly edge: EdgeSeries
}

/** A symmetric pair of nodes in plain integers, in units of 2^-precision but for centre and reach. */
interface PlainNode {
  centre: bigint
  reach: bigint
  weight: [bigint, bigint]
  legendre: [bigint, bigint][]
}

interface EdgeRule {
  rule: ProductRule<AnyNumber>
  scale: AnyNumber
}

/** What one block of pairs of one piece gives. All integers in units of 2^-precision. */
export interface BlockSums {
  /** lo and hi of each series' share of the integral of t^(b-1) D(s0+t). */
  sums: [bigint, bigint][]
  /** Edge only: for each exponent beta, for each power of the logarithm: at least the sum of |W_j|. */
  weights: Record<string, bigint[]>
  first: { centre: bigint; reach: bigint }
  last: { centre: bigint; reach: bigint }
}

/** Bits that the nodes have beyond the precision, so that their reach costs the weights nothing (P-6). */
export const NODE_BITS = 40

/** The nodes of one run (P-1). Piece 0 is the edge, piece i the panel i - 1. */
export class PanelsSweep {
  readonly arithmetic: Arithmetic<AnyNumber>
  private readonly wide: Arithmetic<AnyNumber>
  private readonly context: ZetaContext<AnyNumber>
  private readonly parameters: PanelsParameters
  private readonly excess: Rational
  private readonly logPower: Rational
  private readonly list: readonly SweepSeries[]
  private readonly logEdge: AnyNumber
  private readonly rules = new Map<string, EdgeRule>()

  constructor(
    arithmetic: Arithmetic<AnyNumber>,
    wide: Arithmetic<AnyNumber>,
    parameters: PanelsParameters,
    weight: { power: Rational; logPower: Rational },
    list: readonly SweepSeries[],
  ) {
    this.arithmetic = arithmetic
    this.wide = wide
    this.parameters = parameters
    this.excess = subtract(weight.power, ONE)
    this.logPower = weight.logPower
    this.list = list
    this.context = createZetaContext(arithmetic, parameters)
    for (const { series } of list) series.prepare?.(this.context)
    this.logEdge = arithmetic.log(arithmetic.rational(parameters.edge))
  }

  /** Sums over the pairs from <= index < to of a piece; the middle node of an odd rule is a pair of one. */
  sum(piece: number, from: number, to: number): BlockSums {
    const count = piece === 0 ? this.parameters.edgeNodes : this.parameters.panels[piece - 1].nodes
    const total: BlockSums = { sums: this.list.map(() => [0n, 0n]), weights: {}, first: { centre: 0n, reach: 0n }, last: { centre: 0n, reach: 0n } }
    const nodes: PlainNode[] = []
    if (piece === 0) this.edgeRules()
    for (let index = from; index < to; index++) {
      const node = this.node(count, index, piece === 0)
      nodes.push(node)
      const signs: (1 | -1)[] = 2 * index + 1 === count ? [1] : [1, -1]
      this.arithmetic.frame(() => (piece === 0 ? this.addEdge(total, node, signs) : this.addPanel(total, node, signs, piece - 1)))
    }
    if (!areDescending(nodes)) throw new RangeError('the nodes of the rule were not told apart')
    total.first = { centre: nodes[0].centre, reach: nodes[0].reach }
    total.last = { centre: nodes[nodes.length - 1].centre, reach: nodes[nodes.length - 1].reach }
    return total
  }

  private node(count: number, index: number, withLegendre: boolean): PlainNode {
    const { wide, arithmetic } = this
    const shift = wide.precision - arithmetic.precision
    const plain = (x: AnyNumber): [bigint, bigint] => {
      const [lo, hi] = wide.fixedBounds(x)
      return [floorShift(lo, shift), ceilShift(hi, shift)]
    }
    return wide.frame(() => {
      const node = gaussNode(wide, count, index, arithmetic.precision + NODE_BITS)
      return { centre: node.centre, reach: node.reach, weight: plain(node.weight), legendre: withLegendre ? node.legendre.map(plain) : [] }
    })
  }

  private interval([lo, hi]: readonly [bigint, bigint], bits: number): AnyNumber {
    const den = 1n << BigInt(bits)
    return this.arithmetic.between({ num: lo, den }, { num: hi, den })
  }

  /** (1 +- x)/2. */
  private unitNode(node: PlainNode, sign: 1 | -1): AnyNumber {
    const bits = this.arithmetic.precision + NODE_BITS
    const centre = (1n << BigInt(bits)) + (sign === 1 ? node.centre : -node.centre)
    return this.interval([centre - node.reach, centre + node.reach], bits + 1)
  }

  /** The point s0 + t. Where s0 = 1, `logT` is what takes the place of log t: log t itself, or at the edge log eps (P-2). */
  private point(t: AnyNumber, logT: AnyNumber): SeriesPoint<AnyNumber> {
    const { arithmetic, excess } = this
    if (excess.num === 0n) return new PrimeZeta(new ZetaPoint(this.context, t, logT))
    const shifted = arithmetic.add(t, arithmetic.rational(excess))
    return new PrimeZeta(new ZetaPoint(this.context, shifted, arithmetic.log(shifted)))
  }

  private addPanel(total: BlockSums, node: PlainNode, signs: (1 | -1)[], panelIndex: number): void {
    const { arithmetic, parameters, list } = this
    const { from, to } = parameters.panels[panelIndex]
    const width = subtract(to, from)
    // The weight on [from, to] is half the width times that on [-1, 1].
    const weight = arithmetic.scale(this.interval(node.weight, arithmetic.precision), rational(width.num, width.den * 2n))
    for (const sign of signs) {
      const t = arithmetic.add(arithmetic.rational(from), arithmetic.scale(this.unitNode(node, sign), width))
      const logT = arithmetic.log(t)
      const at = this.point(t, logT)
      list.forEach(({ series }, index) => {
        const exponent = subtract(this.logPower, rational(1 + series.pole))
        const value = arithmetic.multiply(series.evaluate(at), weight)
        this.accumulate(total.sums[index], exponent.num === 0n ? value : arithmetic.timesExp(value, arithmetic.scale(logT, exponent)))
      })
    }
  }

  private accumulate(sum: [bigint, bigint], value: AnyNumber): void {
    const [lo, hi] = this.arithmetic.fixedBounds(value)
    sum[0] += lo
    sum[1] += hi
  }

  private addEdge(total: BlockSums, node: PlainNode, signs: (1 | -1)[]): void {
    const { arithmetic, list } = this
    const half = arithmetic.scale(this.interval(node.weight, arithmetic.precision), rational(1, 2))
    const legendre = node.legendre.map((bounds) => this.interval(bounds, arithmetic.precision))
    const factors = new Map([...this.rules].map(([key, { rule, scale }]) => {
      const weight = arithmetic.multiply(half, scale)
      const pair = rule.atPair(legendre)
      return [key, { plus: pair.plus.map((w) => arithmetic.multiply(w, weight)), minus: pair.minus.map((w) => arithmetic.multiply(w, weight)) }]
    }))
    for (const sign of signs) {
      const t = arithmetic.scale(this.unitNode(node, sign), this.parameters.edge)
      const at = this.point(t, this.logEdge)
      list.forEach(({ edge }, index) => {
        const { plus, minus } = factors.get(toText(this.edgeExponent(edge)))!
        const weights = sign === 1 ? plus : minus
        const parts = edge.parts(at)
        let value = arithmetic.multiply(weights[0], parts[edge.logs])
        for (let i = 1; i <= edge.logs; i++) value = arithmetic.add(value, arithmetic.multiply(weights[i], parts[edge.logs - i]))
        this.accumulate(total.sums[index], value)
      })
      for (const [key, { plus, minus }] of factors) {
        const known = (total.weights[key] ??= plus.map(() => 0n))
        ;(sign === 1 ? plus : minus).forEach((w, i) => {
          const [lo, hi] = arithmetic.fixedBounds(w)
          known[i] += max(abs(lo), abs(hi))
        })
      }
    }
  }

  /** beta: the edge's weight is x^(beta-1) log(1/x)^i/i!. */
  edgeExponent(edge: EdgeSeries): Rational {
    return subtract(this.logPower, rational(edge.pole))
  }

  /**
   * For each exponent beta the product rule and eps^beta. Made when the first block of the edge asks, outside of any frame, so
   * that they live as long as the sweep.
   */
  private edgeRules(): Map<string, EdgeRule> {
    if (this.rules.size > 0) return this.rules
    const { arithmetic, wide, list } = this
    for (const { edge } of list) {
      const beta = this.edgeExponent(edge)
      const key = toText(beta)
      const logs = Math.max(...list.filter((one) => toText(this.edgeExponent(one.edge)) === key).map((one) => one.edge.logs))
      if (this.rules.has(key)) continue
      const moments = legendreMoments(wide, this.parameters.edgeNodes, beta, logs)
      const scale = arithmetic.exp(arithmetic.scale(this.logEdge, beta))
      this.rules.set(key, { rule: createProductRule(arithmetic, wide, moments), scale })
    }
    return this.rules
  }
}
