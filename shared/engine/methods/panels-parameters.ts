import { ONE, type Rational, compare, parseRational, rational, subtract, toText } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Parameters } from './computation.ts'
import { type Panel, leftEnd } from './panels-bounds.ts'

/** All that fixes a run by panels. Any values in range give a true enclosure; good ones give a narrow one quickly. */
export interface PanelsParameters {
  /** Bits after the binary point. */
  precision: number
  /** [0, edge] is the piece with the singularity, done by the product rule with `edgeNodes` nodes. */
  edge: Rational
  edgeNodes: number
  /** The ellipse of the product rule has its left end at -edgeReach. */
  edgeReach: Rational
  /** Adjoining panels, the first from `edge`. */
  panels: Panel[]
  /** See ZetaSettings. */
  terms: number
  split: number
}

const MOST_NODES = 5_000

const WHOLE: Record<'precision' | 'edgeNodes' | 'terms' | 'split', [number, number]> = {
  precision: [32, 12_000],
  edgeNodes: [2, MOST_NODES],
  terms: [1, 5_000],
  split: [3, 5_000],
}
const MOST_PANELS = 400
/** Of every fraction. */
const MOST_BITS = 1n << 200n

function unsound(name: string, what: string): EngineRefusal {
  return new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be ${what}.`)
}

/**
 * Reads parameters out of a certificate; what is not in range is refused, nothing is trusted beyond that. With s0 = 1 the
 * bounds at the edge need edge <= 1 and edgeReach < 1/2 (P-3; over a residue class they refuse more themselves, P-9), with s0 > 1
 * edgeReach < s0 - 1; each panel's ellipse must lie in Re t > 0.
 */
export function readParameters(given: Parameters, power: Rational): PanelsParameters {
  const whole = (name: keyof typeof WHOLE): number => {
    const value = given[name]
    const [least, most] = WHOLE[name]
    if (typeof value !== 'number' || !Number.isInteger(value) || value < least || value > most) {
      throw unsound(name, `a whole number from ${least} to ${most}`)
    }
    return value
  }
  const fraction = (name: string, text: unknown): Rational => {
    const value = parseRational(String(text ?? ''))
    if (!value || value.num <= 0n || value.num > MOST_BITS || value.den > MOST_BITS) throw unsound(name, 'made of fractions above 0')
    return value
  }
  const list = (name: string): Rational[] => {
    const items = String(given[name] ?? '').split(',')
    if (items.length > MOST_PANELS) throw unsound(name, `a list of at most ${MOST_PANELS}`)
    return items.map((item) => fraction(name, item))
  }

  const edge = fraction('edge', given.edge)
  const edgeReach = fraction('edgeReach', given.edgeReach)
  const room = subtract(power, ONE)
  if (room.num === 0n && compare(edge, ONE) > 0) throw unsound('edge', 'at most 1')
  if (compare(edgeReach, room.num === 0n ? rational(1, 2) : room) >= 0) throw unsound('edgeReach', 'nearer to the edge')

  const [ends, nodes, axes] = [list('panelEnds'), list('panelNodes'), list('panelAxes')]
  if (nodes.length !== ends.length || axes.length !== ends.length) throw unsound('panelNodes', 'as long as panelEnds')
  const panels = ends.map((to, i): Panel => {
    const from = i === 0 ? edge : ends[i - 1]
    if (compare(from, to) >= 0) throw unsound('panelEnds', 'ascending')
    if (nodes[i].den !== 1n || nodes[i].num < 2n || nodes[i].num > BigInt(MOST_NODES)) throw unsound('panelNodes', `whole numbers from 2 to ${MOST_NODES}`)
    const panel: Panel = { from, to, nodes: Number(nodes[i].num), axis: axes[i] }
    if (compare(panel.axis, ONE) <= 0 || leftEnd(panel).num <= 0n) throw unsound('panelAxes', 'above 1 and small enough to stay right of 0')
    return panel
  })
  return { precision: whole('precision'), edge, edgeNodes: whole('edgeNodes'), edgeReach, panels, terms: whole('terms'), split: whole('split') }
}

export function writeParameters(p: PanelsParameters): Parameters {
  const list = (item: (panel: Panel) => string): string => p.panels.map(item).join(',')
  return {
    precision: p.precision,
    edge: toText(p.edge),
    edgeNodes: p.edgeNodes,
    edgeReach: toText(p.edgeReach),
    panelEnds: list((panel) => toText(panel.to)),
    panelNodes: list((panel) => String(panel.nodes)),
    panelAxes: list((panel) => toText(panel.axis)),
    terms: p.terms,
    split: p.split,
  }
}
