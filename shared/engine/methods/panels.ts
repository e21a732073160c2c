import { createBallArithmetic } from '../arithmetic/ball.ts'
import { ONE, type Rational, ZERO, compare } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import { type EdgeSeries, edgeSeries } from '../series/edge.ts'
import type { ComputationRequest } from './computation.ts'
import { type Goal, decimalsAsked, radiusAimedAt } from './goal.ts'
import { type MellinTask, mellinTask } from './mellin-task.ts'
import type { Forecast, MethodModule } from './method.ts'
import { PanelsComputation } from './panels-computation.ts'
import { type PanelsParameters, readParameters } from './panels-parameters.ts'
import { meanPoint, planPanels } from './panels-plan.ts'
import { cutIntoBlocks } from './panels-shards.ts'
import type { SweepSeries } from './panels-sweep.ts'
import { classCostAt } from './trapezoid-cost.ts'

const MOST_DIGITS = 1_000

interface Task extends MellinTask {
  readonly list: readonly SweepSeries[]
}

function taskOf(definitions: ComputationRequest['definitions']): Task {
  const task = mellinTask(definitions)
  const list = task.series.map((series, index): SweepSeries => {
    const edge = compare(task.power, ONE) === 0 ? edgeSeries(task.definitions[index].set) : smoothEdge(series)
    if (!edge) {
      throw new EngineRefusal('method_does_not_fit', 'method', 'Panels do not know how this set behaves at s = 1.')
    }
    return { series, edge }
  })
  return { ...task, list }
}

/** With s0 > 1 the series is analytic at s0 itself; it is bounded there by D(Re s), not by its parts. */
function smoothEdge(series: DirichletSeries): EdgeSeries {
  return {
    pole: 0,
    logs: 0,
    parts: (at) => [series.evaluate(at)],
    partBounds: () => {
      throw new Error('a series without a singularity at the edge has no parts')
    },
  }
}

function parametersFor(task: Task, goal: Goal): PanelsParameters {
  const digits = decimalsAsked(goal, 'The transform by panels', MOST_DIGITS)
  const [power, logPower] = [approx(task.power), approx(task.logPower)]
  const exponents = task.list.map(({ edge }) => logPower - edge.pole)
  return planPanels({
    digits,
    excess: power - 1,
    logPower,
    complexity: task.complexity,
    edgeExponent: Math.min(...exponents),
    room: power > 1 ? undefined : leastRoom(task),
    distinct: task.distinct,
    least: task.list.reduce((least, { series }) => (series.leastMember < least ? series.leastMember : least), task.list[0].series.leastMember),
    edgeGrowth: (eps, reach) =>
      power > 1
        ? 6 + Math.log2(1 + 1 / (power - 1)) // heuristic: affects speed only
        : Math.max(...task.list.map(({ edge }, index) => partsGrowth(edge.partBounds(eps, reach, ROUGH).map(approx), exponents[index]))),
  })
}

/** For what only the plan rests on. */
const ROUGH = createBallArithmetic(96)

function leastRoom({ list }: Task): Rational | undefined {
  const rooms = list.flatMap(({ edge }) => (edge.room ? [edge.room(ROUGH)] : []))
  return rooms.reduce<Rational | undefined>((least, room) => (least && compare(least, room) <= 0 ? least : room), undefined)
}

function approx({ num, den }: Rational): number {
  return Number(num) / Number(den) // heuristic: affects speed only
}

/** log2 of the factor of rho^-nodes in P-4, the weights taken for about twice their integral. heuristic: affects speed only */
function partsGrowth(bounds: readonly number[], exponent: number): number {
  const total = bounds.reduce((sum, _, i) => sum + bounds[bounds.length - 1 - i] * exponent ** -(i + 1), 0)
  return Math.log2(8 * total) // heuristic: affects speed only
}

/** CPU seconds for one sweep on the reference machine. heuristic: affects choice only */
function predictSeconds(p: PanelsParameters, task: Task, arithmetic: ComputationRequest['arithmetic']): number {
  const blocks = cutIntoBlocks(p, task.power, task.complexity)
  const microseconds = blocks.reduce((total, { cost }) => total + cost, 0)
  return 0.05 + (microseconds * (arithmetic === 'mpfr' ? 5 : 1) + ofClasses(p, task, arithmetic)) * 1e-6
}

/** Microseconds that the L-functions of residue classes take. heuristic: affects choice only */
function ofClasses(p: PanelsParameters, { definitions, power }: Task, arithmetic: ComputationRequest['arithmetic']): number {
  const pieces = [{ nodes: p.edgeNodes, from: ZERO, to: p.edge }, ...p.panels]
  return definitions.reduce((total, { set }) => {
    if (set.kind !== 'residue-class') return total
    return pieces.reduce((sum, { nodes, from, to }) => sum + nodes * classCostAt(set.modulus, meanPoint(power, from, to), p, arithmetic), total)
  }, 0)
}

/** The Mellin transform by a product rule at its singularity and Gauss-Legendre panels after. */
export const panels: MethodModule = {
  name: 'panels',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const task = taskOf([definition])
      const parameters = parametersFor(task, goal)
      return { possible: true, radius: radiusAimedAt(goal), seconds: predictSeconds(parameters, task, arithmetic) / speed }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    const task = taskOf(request.definitions)
    const parameters = request.parameters ? readParameters(request.parameters, task.power) : parametersFor(task, request.goal)
    return new PanelsComputation(request, parameters, task, task.list)
  },
}
