import { type Bound, type Estimate, type Point, type Quantity, type Term } from '../../shared/engine/estimates/estimate.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { parseRational } from '../../shared/engine/arithmetic/rational.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'

/**
 * Tries the library's estimates numerically, in doubles with compensated sums: both sides of every jump up to a limit. This
 * supports how a statement is remembered; it proves nothing, and no enclosure depends on it.
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

/** Fits a double: B and E in Rosser & Schoenfeld 1962, (2.10), (2.11), and li(2). */
const MERTENS_B = 0.2614972128476428
const MERTENS_E = -1.3325822757332209
const LI_2 = 1.045163780117493

const number = (text: string): number => {
  const value = parseRational(text)
  if (!value) throw new Error(`not a number: ${text}`)
  return Number(value.num) / Number(value.den)
}

const logOf = (point: Point): number => ('x' in point ? Math.log(number(point.x)) : number(point.log))

type Evaluate = (x: number, log: number) => number

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
class Compensated {
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

interface Probe extends CheckResult {
  quantity: Quantity
  from: number
  to: number
  lower: Evaluate | null
  upper: Evaluate | null
}

function probeOf({ id, claim }: Estimate): Probe {
  return {
    id, looked: 0, violations: 0, lastViolation: null, tightest: 0,
    quantity: claim.quantity,
    from: 'x' in claim.from ? number(claim.from.x) : Math.exp(logOf(claim.from)),
    to: claim.to === null ? Infinity : 'x' in claim.to ? number(claim.to.x) : Math.exp(logOf(claim.to)),
    lower: claim.lower ? boundFunction(claim.lower) : null,
    upper: claim.upper ? boundFunction(claim.upper) : null,
  }
}

function look(probe: Probe, value: number, x: number, log: number, side: '' | '-'): void {
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

/** li(b) - li(a) for neighbouring primes by Gauss-Legendre with five points. */
const NODES = [[0, 128 / 225], [0.5384693101056831, 0.47862867049936647], [0.906179845938664, 0.23692688505618908]]
function logIntegral(a: number, b: number): number {
  const [middle, half] = [(a + b) / 2, (b - a) / 2]
  return half * NODES.reduce((sum, [x, w]) => sum + (x === 0 ? w / Math.log(middle) : w / Math.log(middle + half * x) + w / Math.log(middle - half * x)), 0)
}

/** Looks at every estimate at both sides of every jump of its quantity up to the limit, and where its range begins. */
export function checkEstimates(limit: number, estimates: readonly Estimate[] = ESTIMATES): CheckResult[] {
  const probes = estimates.map(probeOf)
  const sums: Record<Exclude<Quantity, 'pi' | 'pi-li'>, Compensated> = {
    theta: new Compensated(), psi: new Compensated(), reciprocals: new Compensated(), 'log-ratios': new Compensated(),
  }
  let [count, li, liAt] = [0, LI_2, 2]
  const byQuantity = (wanted: (quantity: Quantity) => boolean) => probes.filter(({ quantity }) => wanted(quantity))
  const [ofPrimes, ofPowers] = [byQuantity((quantity) => quantity !== 'psi'), byQuantity((quantity) => quantity === 'psi')]

  const valueAt = (quantity: Quantity, x: number, log: number): number => {
    switch (quantity) {
      case 'theta':
      case 'psi':
        return sums[quantity].value - x
      case 'pi':
        return count
      case 'pi-li':
        return count - li
      case 'reciprocals':
        return sums.reciprocals.value - Math.log(log) - MERTENS_B
      case 'log-ratios':
        return sums['log-ratios'].value - log - MERTENS_E
    }
  }
  const sideOf = (group: readonly Probe[], x: number, log: number, side: '' | '-') => {
    for (const probe of group) {
      if (x < probe.from || x > probe.to || (side === '-' && x === probe.from)) continue
      look(probe, valueAt(probe.quantity, x, log), x, log, side)
    }
  }
  const starts = [...new Set(probes.map(({ from }) => from))].filter((from) => from >= 2 && from <= limit).sort((a, b) => a - b)
  const powers = primePowers(limit)
  let [nextStart, nextPower] = [0, 0]

  /** Everything before x that is no prime: ranges that begin there, prime powers for psi. */
  const advance = (x: number) => {
    for (;;) {
      const start = starts[nextStart] ?? Infinity
      const power = powers[nextPower]?.[0] ?? Infinity
      const at = Math.min(start, power)
      if (at >= x) return
      const log = Math.log(at)
      if (power === at) {
        sideOf(ofPowers, at, log, '-')
        sums.psi.add(powers[nextPower][1])
        sideOf(ofPowers, at, log, '')
        nextPower++
      }
      if (start === at) {
        if (at > liAt) [li, liAt] = [li + logIntegral(liAt, at), at]
        sideOf(probes.filter(({ from }) => from === at), at, log, '')
        nextStart++
      }
    }
  }

  forEachPrime(0, limit, (p) => {
    advance(p)
    const log = Math.log(p)
    if (p > liAt) [li, liAt] = [li + logIntegral(liAt, p), p]
    sideOf(ofPrimes, p, log, '-')
    sideOf(ofPowers, p, log, '-')
    count++
    sums.theta.add(log)
    sums.psi.add(log)
    sums.reciprocals.add(1 / p)
    sums['log-ratios'].add(log / p)
    sideOf(ofPrimes, p, log, '')
    sideOf(ofPowers, p, log, '')
  })
  advance(limit)
  return probes.map(({ id, looked, violations, lastViolation, tightest }) => ({ id, looked, violations, lastViolation, tightest }))
}

/** [p^a, log p] for a >= 2, ascending. */
function primePowers(limit: number): [number, number][] {
  return primesUpTo(Math.floor(Math.sqrt(limit)))
    .flatMap((p) => {
      const powers: [number, number][] = []
      for (let power = p * p; power <= limit; power *= p) powers.push([power, Math.log(p)])
      return powers
    })
    .sort((a, b) => a[0] - b[0])
}
