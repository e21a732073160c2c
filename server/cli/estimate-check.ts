import type { Estimate, Quantity } from '../../shared/engine/estimates/estimate.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'
import { checkClassEstimates } from './estimate-check-classes.ts'
import { type CheckResult, Compensated, type Probe, look, probeOf, resultOf } from './estimate-check-probe.ts'

/** Fits a double: B and E in Rosser & Schoenfeld 1962, (2.10), (2.11), and li(2). */
const MERTENS_B = 0.2614972128476428
const MERTENS_E = -1.3325822757332209
const LI_2 = 1.045163780117493

/** li(b) - li(a) for neighbouring primes by Gauss-Legendre with five points. */
const NODES = [[0, 128 / 225], [0.5384693101056831, 0.47862867049936647], [0.906179845938664, 0.23692688505618908]]
function logIntegral(a: number, b: number): number {
  const [middle, half] = [(a + b) / 2, (b - a) / 2]
  return half * NODES.reduce((sum, [x, w]) => sum + (x === 0 ? w / Math.log(middle) : w / Math.log(middle + half * x) + w / Math.log(middle - half * x)), 0)
}

/**
 * Tries the library's estimates numerically, in doubles with compensated sums: at both sides of every jump of the quantity up to the
 * limit, and where the range begins.
 */
export function checkEstimates(limit: number, estimates: readonly Estimate[] = ESTIMATES): CheckResult[] {
  const ofClasses = ({ claim }: Estimate): boolean => claim.quantity === 'theta-class'
  const results = [...checkSums(limit, estimates.filter((one) => !ofClasses(one))), ...checkClassEstimates(limit, estimates.filter(ofClasses))]
  return estimates.map(({ id }) => results.find((result) => result.id === id)!)
}

function checkSums(limit: number, estimates: readonly Estimate[]): CheckResult[] {
  const probes = estimates.map(probeOf)
  const sums: Record<Exclude<Quantity, 'pi' | 'pi-li' | 'theta-class'>, Compensated> = {
    theta: new Compensated(), psi: new Compensated(), reciprocals: new Compensated(), 'log-ratios': new Compensated(),
  }
  let [count, li, liAt] = [0, LI_2, 2]
  const byQuantity = (wanted: (quantity: Quantity) => boolean) => probes.filter(({ quantity }) => wanted(quantity))
  const [ofPrimes, ofPowers] = [byQuantity((quantity) => quantity !== 'psi'), byQuantity((quantity) => quantity === 'psi')]

  const valueAt = (quantity: Quantity, x: number, log: number): number => {
    switch (quantity) {
      case 'theta-class':
        throw new Error('classes are looked at by themselves')
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
  return probes.map(resultOf)
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
