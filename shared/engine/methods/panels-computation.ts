import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../arithmetic/choose.ts'
import { bitLength, factorial, max } from '../arithmetic/integers.ts'
import { ONE, type Rational, ZERO, add, ceil, ceilScaled, divide, dyadic, multiply, rational, subtract, toText } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { reciprocalGamma } from '../series/gamma.ts'
import { areDescending, spareBits } from '../series/gauss-legendre.ts'
import type { Computation, ComputationRequest, Enclosure, Outcome, Parameters, ShardResult } from './computation.ts'
import type { MellinTask } from './mellin-task.ts'
import { type ExactBudgetItem, decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import { type Summand, edgeErrorUpper, panelErrorUpper, seriesUpper, tailUpper } from './panels-bounds.ts'
import { type PanelsParameters, writeParameters } from './panels-parameters.ts'
import { type BlockResult, type Block, cutIntoBlocks, readBlock, writeBlock } from './panels-shards.ts'
import { NODE_BITS, PanelsSweep, type SweepSeries } from './panels-sweep.ts'

/** Bits that the arithmetic of the bounds has beyond that of the sums, so that they are not rounded up to its last unit. */
const BOUND_BITS = 64

/**
 * What the pieces up to some point give for one series: lo and hi of their sums, and the bounds of their errors rounded up, all in
 * units of 2^-bits.
 */
interface Prefix {
  bits: number
  nodes: number
  lo: bigint
  hi: bigint
  edge: bigint
  panels: bigint
  /** Bound of the integral beyond the last piece; null where none applies yet. */
  tail: bigint | null
}

/** A run by panels with everything chosen (P-1 to P-8): the edge [0, eps], then panel after panel, then a bound of the rest. */
export class PanelsComputation implements Computation {
  readonly request: ComputationRequest
  readonly parameters: Parameters
  readonly shardCount: number
  private readonly chosen: PanelsParameters
  private readonly task: MellinTask
  private readonly list: readonly SweepSeries[]
  private readonly blocks: readonly Block[]
  private sweep: Promise<PanelsSweep> | undefined

  constructor(request: ComputationRequest, chosen: PanelsParameters, task: MellinTask, list: readonly SweepSeries[]) {
    this.request = request
    this.chosen = chosen
    this.parameters = writeParameters(chosen)
    this.task = task
    this.list = list
    this.blocks = cutIntoBlocks(chosen, task.power, task.complexity)
    this.shardCount = this.blocks.length
  }

  shardCost(index: number): number {
    return this.blocks[index].cost
  }

  async runShard(index: number): Promise<ShardResult> {
    const block = this.blocks[index]
    try {
      return writeBlock(block, (await this.ready()).sum(block.piece, block.from, block.to))
    } catch (error) {
      // Only parameters from outside can be so poor that an interval holds what a logarithm or a quotient must not meet.
      if (!(error instanceof RangeError)) throw error
      throw new EngineRefusal('unsound_parameter', 'precision', `These parameters enclose too little to go on: ${error.message}.`)
    }
  }

  async interim(results: (ShardResult | undefined)[]): Promise<Enclosure[] | null> {
    const pieces = this.pieces(this.blocks.map((block, i) => (results[i] === undefined ? null : readBlock(block, results[i]))))
    const bounds = await this.boundArithmetic()
    const gamma = await this.gammaBounds()
    const found = this.list.map((_, index) => {
      const last = this.prefixes(bounds, pieces, index).filter((prefix) => prefix.tail !== null).pop()
      return last && decimalEnclosure(...enclose(last, gamma))
    })
    return found.every((one) => one !== undefined) ? found : null
  }

  async combine(results: ShardResult[]): Promise<Outcome[]> {
    if (results.length !== this.shardCount) throw new Error('a run by panels is combined from the results of all its shards')
    const pieces = this.pieces(results.map((result, i) => readBlock(this.blocks[i], result)))
    const bounds = await this.boundArithmetic()
    const gamma = await this.gammaBounds()
    return this.list.map((_, index) => this.outcome(index, this.prefixes(bounds, pieces, index), gamma))
  }

  private boundArithmetic(): Promise<Arithmetic<AnyNumber>> {
    return createArithmetic(this.request.arithmetic, this.chosen.precision + BOUND_BITS)
  }

  /** 1/Gamma(b) may be tiny: the size of Gamma(b) is added to the bits. */
  private async gammaBounds(): Promise<GammaBounds> {
    const { logPower } = this.task
    const a = await createArithmetic(this.request.arithmetic, this.chosen.precision + BOUND_BITS + bitLength(factorial(Number(ceil(logPower)))))
    const [low, high] = a.fixedBounds(reciprocalGamma(a, logPower))
    return { low, high, bits: a.precision }
  }

  private ready(): Promise<PanelsSweep> {
    const { precision, edgeNodes, panels } = this.chosen
    const most = Math.max(edgeNodes, ...panels.map((panel) => panel.nodes))
    this.sweep ??= Promise.all([
      createArithmetic(this.request.arithmetic, precision),
      createArithmetic(this.request.arithmetic, precision + NODE_BITS + spareBits(most)),
    ]).then(([arithmetic, wide]) => new PanelsSweep(arithmetic, wide, this.chosen, this.task, this.list))
    return this.sweep
  }

  /** The blocks of the leading pieces that are complete, piece by piece (null where missing), their nodes checked throughout (P-6). */
  private pieces(results: readonly (BlockResult | null)[]): BlockResult[][] {
    const pieces: BlockResult[][] = []
    for (let piece = 0; piece <= this.chosen.panels.length; piece++) {
      const found = results.filter((_, index) => this.blocks[index].piece === piece)
      const complete = found.filter((one) => one !== null)
      if (complete.length < found.length) break
      const nodes = complete.flatMap(({ first, last }) => (first.centre === last.centre ? [first] : [first, last]))
      const { centre, reach } = nodes[nodes.length - 1]
      const count = this.chosen.panels[piece - 1]?.nodes ?? this.chosen.edgeNodes
      // P-6: all roots are there, and none twice, if the intervals and their mirror images are disjoint.
      if (!areDescending(nodes) || !(count % 2 === 1 ? centre === 0n : centre > reach)) {
        throw new Error('the nodes of a rule are not in order: these results do not belong together')
      }
      pieces.push(complete)
    }
    return pieces
  }

  private prefixes(bounds: Arithmetic<AnyNumber>, pieces: readonly BlockResult[][], index: number): Prefix[] {
    const { chosen, task, list } = this
    const summand: Summand = { power: task.power, logPower: task.logPower, least: list[index].series.leastMember }
    const bits = chosen.precision + BOUND_BITS
    const units = (error: Rational): bigint => ceilScaled(error, bits)
    const prefixes: Prefix[] = []
    pieces.forEach((blocks, piece) => {
      const before = prefixes[piece - 1] ?? { bits, nodes: 0, lo: 0n, hi: 0n, edge: 0n, panels: 0n, tail: null }
      const [lo, hi] = blocks.reduce(([a, b], { sums }) => [a + sums[index][0], b + sums[index][1]], [0n, 0n])
      const panel = chosen.panels[piece - 1]
      const tail = tailUpper(bounds, panel?.to ?? chosen.edge, summand)
      prefixes.push({
        bits,
        nodes: before.nodes + (panel?.nodes ?? chosen.edgeNodes),
        lo: before.lo + (lo << BigInt(BOUND_BITS)),
        hi: before.hi + (hi << BigInt(BOUND_BITS)),
        edge: panel ? before.edge : units(this.edgeError(bounds, blocks, index, summand)),
        panels: panel ? before.panels + units(panelErrorUpper(bounds, panel, summand)) : 0n,
        tail: tail && units(tail),
      })
    })
    return prefixes
  }

  /** P-4 for every power of the logarithm, with the bounds of P-3 where s0 = 1 and |D(s)| <= D(Re s) else. */
  private edgeError(bounds: Arithmetic<AnyNumber>, blocks: readonly BlockResult[], index: number, summand: Summand): Rational {
    const { edge: eps, edgeReach, edgeNodes, precision } = this.chosen
    const { edge } = this.list[index]
    const beta = subtract(this.task.logPower, rational(edge.pole))
    const scale = bounds.exp(bounds.scale(bounds.log(bounds.rational(eps)), beta))
    const most = this.task.power.num === this.task.power.den
      ? edge.partBounds(eps, edgeReach, bounds).map((bound) => bounds.rational(bound))
      : [seriesUpper(bounds, summand.least, subtract(this.task.power, edgeReach))]
    let total = ZERO
    let norm = ONE
    for (let i = 0; i <= edge.logs; i++) {
      // The integral of the weight over [0, 1] is beta^-(i+1); the weights W_j have eps^beta in them already.
      norm = divide(norm, beta)
      const sizes = blocks.reduce((sum, { weights }) => sum + weights[toText(beta)][i], 0n)
      const both = add(bounds.upper(bounds.scale(scale, norm)), dyadic(sizes, precision))
      total = add(total, edgeErrorUpper(bounds, eps, edgeReach, edgeNodes, both, most[edge.logs - i]))
    }
    return total
  }

  private outcome(index: number, prefixes: readonly Prefix[], gamma: GammaBounds): Outcome {
    const whole = prefixes[prefixes.length - 1]
    if (prefixes.length <= this.chosen.panels.length || whole.tail === null) throw new Error('results are missing, or the last panel ends too early')
    const [lo, hi] = enclose(whole, gamma)
    const share = (units: bigint): Rational => dyadic(units * gamma.high, whole.bits + gamma.bits)
    const items: ExactBudgetItem[] = [
      { source: 'discretisation', bound: 'P-4', magnitude: share(whole.edge) },
      { source: 'discretisation', bound: 'P-7', magnitude: share(whole.panels) },
      { source: 'truncation-above', bound: 'P-8', magnitude: multiply(share(whole.tail), rational(1, 2)) },
    ]
    const rounding = subtract(halfWidth(lo, hi), items.reduce((total, item) => add(total, item.magnitude), ZERO))
    return {
      definition: this.request.definitions[index],
      method: 'panels',
      arithmetic: this.request.arithmetic,
      goal: this.request.goal,
      parameters: this.parameters,
      estimates: [],
      ...describeEnclosure(lo, hi, [...items, { source: 'rounding', bound: 'A-3', magnitude: rounding.num > 0n ? rounding : ZERO }]),
      convergence: prefixes.flatMap((prefix) => (prefix.tail === null ? [] : [{ at: String(prefix.nodes), ...decimalEnclosure(...enclose(prefix, gamma)) }])),
    }
  }
}

/** 1/Gamma(b) in [low, high] 2^-bits. */
interface GammaBounds {
  low: bigint
  high: bigint
  bits: number
}

/**
 * The integral is within the sums' bounds, widened by the discretisation and, above, by the tail, and it is not negative (P-1); the
 * constant is it over Gamma(b).
 */
function enclose(prefix: Prefix, gamma: GammaBounds): [Rational, Rational] {
  const error = prefix.edge + prefix.panels
  const lo = max(0n, prefix.lo - error)
  const hi = max(0n, prefix.hi + error + (prefix.tail ?? 0n))
  const bits = prefix.bits + gamma.bits
  return [dyadic(lo * gamma.low, bits), dyadic(hi * gamma.high, bits)]
}
