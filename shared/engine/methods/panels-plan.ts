import { type Rational, parseRational, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Panel } from './panels-bounds.ts'
import type { PanelsParameters } from './panels-parameters.ts'

/**
 * Chooses edge, panels, ellipses and numbers of nodes by a model of their cost. Doubles may be used here: every choice is
 * recorded, and the bounds are computed from what was recorded. heuristic: affects speed only
 */

/** What the plan depends on. */
export interface PlanInput {
  digits: number
  /** s0 - 1 and b. */
  excess: number
  logPower: number
  /** Largest k, how the parts at the edge may grow (log2), and the exponent beta of its weight. */
  complexity: number
  edgeGrowth: (eps: Rational, reach: Rational) => number
  edgeExponent: number
  /** Where s0 = 1: what edge and reach together may not exceed, if anything. */
  room?: Rational
  least: bigint
  /** Whether 1/(p^s - 1) takes the place of p^-s, whose powers lose accuracy. */
  distinct: boolean
}

/** Digits computed beyond those asked for, so that the digits asked for are certified but for rare strings of 0 or 9. */
const SPARE_DIGITS = 5
/** Panel ends are the edge times these and their multiples by powers of 4. */
const GRID = [1, 1.25, 1.5, 1.75, 2, 2.5, 3, 3.5]
/** Semi-axes tried, as parts of the way from 1 to where the ellipse touches 0. */
const PARTS = [0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.85, 0.9, 0.93, 0.96, 0.98]
const AXIS_DENOMINATOR = 1_024
const LEAST_PRECISION = 64

const log2 = (x: number): number => Math.log2(x) // heuristic: affects speed only
const ellipse = (axis: number): number => log2(axis + Math.sqrt(axis * axis - 1)) // heuristic: affects speed only

/** log2 of least^-sigma (1 + least/(sigma - 1)) for sigma = 1 + x. */
function logSeries(x: number, logLeast: number): number {
  return logLeast * -(1 + x) + log2(1 + 2 ** Math.min(logLeast, 500) / x)
}

/**
 * Microseconds for one node at s on the reference machine: powers, zeta values, Newton's identities. Shards are cut by it, so it
 * is made of operations alone that are the same on every machine. heuristic: affects speed only
 */
export function nodeCost(p: { precision: number; terms: number; split: number; complexity: number }, s: number): number {
  const words = p.precision / 64
  const orders = p.precision / roughLog2(p.split) / Math.max(1, s) + 1
  const product = 0.12 + 0.006 * words * words
  return 40 + orders * (1.2 * p.terms * product + 4) + 0.25 * p.terms * (2 + product * words) + p.complexity * p.complexity * 0.4
}

/** The s whose cost is about the mean over the nodes of a panel: 1/s has the mean 1/sqrt(from to) over them. */
function meanOf(from: number, to: number): number {
  return Math.sqrt(from * to) // heuristic: affects speed only
}

/** The same for the part [from, to] of t, s = power + t. */
export function meanPoint(power: Rational, from: Rational, to: Rational): number {
  return meanOf(approx(power) + approx(from), approx(power) + approx(to))
}

/** log2 of a whole number, linear between powers of 2. */
function roughLog2(n: number): number {
  const whole = 31 - Math.clz32(n)
  return whole + n / (1 << whole) - 1
}

export function planPanels(input: PlanInput): PanelsParameters {
  const { excess, logPower: b, digits } = input
  const logLeast = log2(Number(input.least > 1n << 1000n ? 1n << 1000n : input.least))
  // The integral is Gamma(b) times the constant, and may be wrong by as much more.
  const bits = (digits + SPARE_DIGITS) * log2(10) - logGamma(b)
  const end = truncationPoint(bits, 1 + excess, b, logLeast)
  const cost = (s: number): number => nodeCost({ ...settingsFor(input, bits, end), complexity: input.complexity }, s)

  const plans = edgesFor(excess, input.room).map(({ edge, reach }) => {
    const eps = exact(edge)
    const edgeBits = bits + input.edgeGrowth(eps, reach) + input.edgeExponent * log2(edge)
    const edgeNodes = Math.max(2, Math.ceil(edgeBits / ellipse(1 + (2 * approx(reach)) / edge)) + 1)
    const { panels, total } = bestPanels(edge, Math.max(end, Math.ceil(2 * edge)), bits, b, excess, logLeast, cost)
    // The product rule costs a row of Legendre polynomials a node and as many products a power of the logarithm.
    const rule = edgeNodes * edgeNodes * (0.4 + 0.12 * input.complexity) * (1 + (bits / 512) ** 2) * 0.5
    return { edge: eps, edgeReach: reach, edgeNodes, panels, total: total + edgeNodes * cost(1 + excess) + rule }
  })
  const { edge, edgeReach, edgeNodes, panels } = plans.reduce((best, plan) => (plan.total < best.total ? plan : best))
  return { ...settingsFor(input, bits, approx(panels[panels.length - 1].to)), edge, edgeReach, edgeNodes, panels }
}

/** The edges that are tried, each with its reach: together within the room, if that is limited. */
function edgesFor(excess: number, room: Rational | undefined): { edge: number; reach: Rational }[] {
  if (excess > 0) {
    const unit = 2 ** Math.round(log2(excess))
    return [4, 2, 1, 0.5].map((part) => ({ edge: unit * part, reach: scaled(excess, 15 / 16) }))
  }
  if (!room) return [1, 0.5, 0.25].map((edge) => ({ edge, reach: rational(31, 64) }))
  const unit = 2 ** Math.floor(log2(approx(room)))
  return [0.5, 0.25, 0.125].map((part) => ({ edge: unit * part, reach: subtract(room, exact(unit * part)) }))
}

/** Bits for sums of many terms, for t^(b-1) up to t = last, for weights near 0, for 1/(s0 - 1), for powers of 1/(p^s - 1). */
function settingsFor(input: PlanInput, bits: number, last: number): Pick<PanelsParameters, 'precision' | 'terms' | 'split'> {
  const { excess, complexity, distinct, edgeExponent } = input
  const weights = Math.max(0, input.logPower - 1) * log2(last) + complexity * Math.max(0, -log2(Math.min(1, edgeExponent)))
  const values = (excess > 0 ? log2(1 + 1 / excess) : 0) + (distinct ? 2 * complexity + 10 : 0)
  const precision = Math.max(LEAST_PRECISION, Math.ceil(bits + 30 + weights + values))
  return { precision, terms: Math.ceil(precision / 2.54) + 1, split: Math.max(50, Math.ceil(precision / 2.54)) }
}

/** log2 of Gamma(b), by Stirling's formula and Gamma(b) = Gamma(b + 1)/b. heuristic: affects speed only */
function logGamma(b: number): number {
  if (b < 8) return logGamma(b + 1) - log2(b)
  return (b - 0.5) * log2(b) + (0.9189 - b + 1 / (12 * b)) * Math.LOG2E
}

/** t with t^b least^-(s0 + t) about 2^-bits (P-8). */
function truncationPoint(bits: number, s0: number, b: number, logLeast: number): number {
  let end = Math.max(1, Math.ceil((2 * b) / logLeast))
  while (Math.max(0, b - 1) * log2(end) - (s0 + end) * logLeast + logLeast > -bits) end += 1
  return end
}

interface Chain {
  panels: Panel[]
  total: number
}

/** The cheapest chain of panels from edge to `end`, between them over the ends of the grid. */
function bestPanels(edge: number, end: number, bits: number, b: number, excess: number, logLeast: number, cost: (s: number) => number): Chain {
  const points: number[] = []
  for (let scale = edge; scale < end; scale *= 4) points.push(...GRID.map((part) => scale * part).filter((point) => point < end))
  points.push(end)
  if (points.length > 2_000) throw new EngineRefusal('too_slow', 'logPower', 'The sum converges too slowly for this method: ask for fewer digits.')
  const best: Chain[] = [{ panels: [], total: 0 }]
  for (let i = 1; i < points.length; i++) {
    for (let j = i - 1; j >= 0 && points[i] <= 16 * points[j]; j--) {
      const { nodes, axis } = fewestNodes(points[j], points[i], bits, b, excess, logLeast)
      const total = best[j].total + nodes * cost(meanOf(1 + excess + points[j], 1 + excess + points[i])) + nodes * nodes * 1.5
      if (best[i] && best[i].total <= total) continue
      best[i] = { total, panels: [...best[j].panels, { from: exact(points[j]), to: exact(points[i]), nodes, axis: rational(axis, AXIS_DENOMINATOR) }] }
    }
  }
  return best[best.length - 1]
}

/** The ellipse that needs the fewest nodes (P-7). */
function fewestNodes(from: number, to: number, bits: number, b: number, excess: number, logLeast: number): { nodes: number; axis: number } {
  const [centre, half] = [(from + to) / 2, (to - from) / 2]
  const touching = centre / half
  let best = { nodes: Infinity, axis: 0 }
  for (const part of PARTS) {
    const axis = Math.max(AXIS_DENOMINATOR + 1, Math.floor((1 + (touching - 1) * part) * AXIS_DENOMINATOR))
    const semi = axis / AXIS_DENOMINATOR
    const left = centre - semi * half
    if (left <= 0) continue
    const weight = b >= 1 ? Math.ceil(b - 1) * Math.max(0, log2(centre + semi * half)) : Math.ceil(1 - b) * Math.max(0, -log2(left))
    const height = bits + 2.1 + log2(half) + weight + logSeries(excess + left, logLeast)
    const nodes = Math.max(2, Math.ceil(height / (2 * ellipse(semi))) + 1)
    if (nodes < best.nodes) best = { nodes, axis }
  }
  return best
}

/** Exactly the double, a dyadic fraction. */
function exact(x: number): Rational {
  let den = 1n
  while (!Number.isInteger(x)) {
    x *= 2
    den *= 2n
  }
  return rational(BigInt(x), den)
}

/** A short fraction near x part, below it. */
function scaled(x: number, part: number): Rational {
  const text = (x * part).toPrecision(3)
  return parseRational(text) ?? exact(x * part)
}

function approx(a: Rational): number {
  return Number(a.num) / Number(a.den) // heuristic: affects speed only
}
