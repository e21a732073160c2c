import { parseRational } from '../../shared/engine/arithmetic/rational.ts'
import type { Bound, Estimate, Point, Quantity, Term } from '../../shared/engine/estimates/estimate.ts'

/**
 * What the numerical checks of the library share: bounds in doubles, compensated sums, and what is noted of each estimate. Such a
 * check supports how a statement is remembered; it proves nothing, and no enclosure depends on it.
 */
export interface CheckResult {
  id: string
  /** Values looked at; 0 where the range begins beyond the limit. */
  looked: number
  violations: number
  /** Where the last violation is: "x" or "x-", the limit from the left. */
  lastViolation: string | null
  /** The largest quotient of the quantity and its bound: 1 is a bound that is attained. For one-sided bounds of a quantity that
   *  is not small, the quotient of the two. */
  tightest: number
}

const number = (text: string): number => {
  const value = parseRational(text)
  if (!value) throw new Error(`not a number: ${text}`)
  return Number(value.num) / Number(value.den)
}

const logOf = (point: Point): number => ('x' in point ? Math.log(number(point.x)) : number(point.log))

export type Evaluate = (x: number, log: number) => number

function termFunction({ coefficient, power, logPower, overPi }: Term): Evaluate {
  const c = number(coefficient) / (overPi ? Math.PI : 1)
  const [a, k] = [number(power), number(logPower)]
  const ofX: (x: number) => number = a === 1 ? (x) => x : a === 0.5 ? Math.sqrt : a === 0 ? () => 1 : (x) => x ** a
  return k === 0 ? (x) => c * ofX(x) : (x, log) => c * ofX(x) * log ** k
}

function boundFunction(bound: Bound): Evaluate {
  if (bound.form === 'decay') {
    const [c, k, base, rate, r] = [bound.coefficient, bound.logPower, bound.base, bound.rate, bound.r].map(number)
    return (x, log) => c * x * (log / base) ** k * Math.exp(-rate * Math.sqrt(log / r))
  }
  const terms = bound.terms.map(termFunction)
  const sum: Evaluate = (x, log) => terms.reduce((total, one) => total + one(x, log), 0)
  return bound.form === 'sum' ? sum : (x, log) => x / sum(x, log)
}

/** A sum that remembers what rounding lost. */
export class Compensated {
  private sum = 0
  private lost = 0
  add(value: number): void {
    const total = this.sum + value
    this.lost += Math.abs(this.sum) >= Math.abs(value) ? this.sum - total + value : value - total + this.sum
    this.sum = total
  }
  get value(): number {
    return this.sum + this.lost
  }
}

export interface Probe extends CheckResult {
  quantity: Quantity
  from: number
  to: number
  lower: Evaluate | null
  upper: Evaluate | null
}

export function probeOf({ id, claim }: Estimate): Probe {
  return {
    id, looked: 0, violations: 0, lastViolation: null, tightest: 0,
    quantity: claim.quantity,
    from: 'x' in claim.from ? number(claim.from.x) : Math.exp(logOf(claim.from)),
    to: claim.to === null ? Infinity : 'x' in claim.to ? number(claim.to.x) : Math.exp(logOf(claim.to)),
    lower: claim.lower ? boundFunction(claim.lower) : null,
    upper: claim.upper ? boundFunction(claim.upper) : null,
  }
}

export function look(probe: Probe, value: number, x: number, log: number, side: '' | '-'): void {
  probe.looked++
  const [lower, upper] = [probe.lower?.(x, log) ?? -Infinity, probe.upper?.(x, log) ?? Infinity]
  if (value < lower || value > upper) {
    probe.violations++
    probe.lastViolation = `${x}${side}`
  }
  const above = upper > 0 ? value / upper : upper / value
  const below = lower < 0 ? value / lower : lower / value
  const tight = Math.max(Number.isFinite(upper) ? above : 0, Number.isFinite(lower) ? below : 0)
  if (tight > probe.tightest) probe.tightest = tight
}

export function resultOf({ id, looked, violations, lastViolation, tightest }: Probe): CheckResult {
  return { id, looked, violations, lastViolation, tightest }
}
