import { parseRational, compare, type Rational } from '../../shared/engine/arithmetic/rational.ts'
import { METHODS } from '../../shared/engine/engine.ts'
import type { ArithmeticName, Method } from '../../shared/engine/methods/computation.ts'
import { type Goal, serves } from '../../shared/engine/methods/goal.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import type { Plan } from '../../shared/schemas/run.ts'
import { env } from '../env.ts'
import { invalidField } from '../errors.ts'
import { machineSpeed } from './calibration.ts'

type ForecastView = Plan['forecasts'][number]

const ARITHMETICS: readonly ArithmeticName[] = ['ball', 'mpfr']

/** Whether an interval of this radius serves the goal. */
function reaches(goal: Goal, radius: string | null): boolean {
  const value = radius === null ? null : parseRational(radius)
  return value !== null && serves(goal, value)
}

/** The field of the request that holds the goal. */
const goalField = (goal: Goal): string => `goal.${Object.keys(goal)[0]}`

/** What every method, with either arithmetic, says of a definition and a goal without some of the estimates; the quickest that reaches the goal is recommended. */
export async function forecasts(definition: Definition, goal: Goal, without: readonly string[] = []): Promise<ForecastView[]> {
  const speed = await machineSpeed()
  const views = Object.values(METHODS).flatMap((method) =>
    ARITHMETICS.map((arithmetic): ForecastView => {
      const forecast = method.forecast(definition, goal, arithmetic, speed, without)
      return forecast.possible
        ? { method: method.name, arithmetic, possible: true, reason: null, radius: forecast.radius, seconds: forecast.seconds, recommended: false }
        : { method: method.name, arithmetic, possible: false, reason: forecast.reason, radius: null, seconds: null, recommended: false }
    }),
  )
  const able = views.filter((view) => view.possible && reaches(goal, view.radius))
  const quickest = able.reduce<ForecastView | null>((best, view) => (best === null || (view.seconds ?? 0) < (best.seconds ?? 0) ? view : best), null)
  if (quickest) quickest.recommended = true
  return views
}

/** The method to compute with: the one that is named, or of those that reach the goal the quickest. Refuses what cannot be done. */
export async function chooseForecast(
  definition: Definition,
  goal: Goal,
  method: Method | 'auto',
  arithmetic: ArithmeticName,
  without: readonly string[] = [],
): Promise<{ method: Method; arithmetic: ArithmeticName; forecastSeconds: number | null }> {
  const views = (await forecasts(definition, goal, without)).filter((view) => view.arithmetic === arithmetic && (method === 'auto' || view.method === method))
  const able = views.filter((view) => view.possible && (method !== 'auto' || reaches(goal, view.radius)))
  const chosen = able.reduce<ForecastView | null>((best, view) => (best === null || (view.seconds ?? 0) < (best.seconds ?? 0) ? view : best), null)
  if (!chosen) throw refusal(goal, method, views)
  if ((chosen.seconds ?? 0) > env.RUN_CPU_LIMIT_SECONDS) {
    throw invalidField(goalField(goal), `would take about ${Math.ceil((chosen.seconds ?? 0) / 3600)} hours of CPU time, more than a run may use: ask for less`)
  }
  return { method: chosen.method, arithmetic, forecastSeconds: chosen.seconds }
}

function refusal(goal: Goal, method: Method | 'auto', views: ForecastView[]) {
  const reasons = [...new Set(views.map((view) => view.reason).filter((reason) => reason !== null))]
  if (method !== 'auto') return invalidField('method', reasons[0] ?? 'this method does not exist')
  const closest = views.filter((view) => view.possible).map((view) => view.radius ?? '')
  if (closest.length > 0) return invalidField(goalField(goal), `no method gets so close here; the best radius is ${smallest(closest)}`)
  return invalidField('method', reasons.join(' ') || 'no method can do this')
}

function smallest(radii: string[]): string {
  const value = (text: string): Rational => parseRational(text) ?? { num: 1n, den: 1n }
  return radii.reduce((least, radius) => (compare(value(radius), value(least)) < 0 ? radius : least))
}
