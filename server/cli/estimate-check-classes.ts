import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import { units } from '../../shared/engine/series/characters.ts'
import { forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'
import { LIMITS } from '../../shared/limits.ts'
import { type CheckResult, Compensated, type Evaluate, type Probe, look, probeOf, resultOf } from './estimate-check-probe.ts'

/** Sums of log p over the classes of one modulus, and the estimates that speak of it. */
interface Modulus {
  q: number
  share: number
  thetas: (Compensated | null)[]
  probes: Probe[]
}

/**
 * Looks at every estimate of theta(x;q,a) at both sides of every jump up to the limit, for every modulus of its range that a
 * definition can have. Between two primes of a class theta(x;q,a) - x/phi(q) falls, so that its extremes are there.
 */
export function checkClassEstimates(limit: number, estimates: readonly Estimate[]): CheckResult[] {
  const probes = estimates.map((estimate) => ({ probe: withMemory(probeOf(estimate)), moduli: estimate.claim.moduli ?? [1, 0] }))
  const moduli: Modulus[] = []
  for (let q = 3; q <= LIMITS.modulus; q++) {
    // A class mod 2m, m odd, is one mod m but for the prime 2.
    const own = probes.filter(({ moduli: [least, most] }) => q % 4 !== 2 && least <= q && q <= most).map(({ probe }) => probe)
    const classes = units(q)
    const thetas = Array.from({ length: q }, (_, a) => (classes.includes(a) ? new Compensated() : null))
    if (own.length > 0) moduli.push({ q, share: 1 / classes.length, thetas, probes: own })
  }
  forEachPrime(0, limit, (p) => {
    const log = Math.log(p)
    for (const { q, share, thetas, probes: own } of moduli) {
      const theta = thetas[p % q]
      if (!theta) continue
      const before = theta.value - p * share
      theta.add(log)
      for (const probe of own) {
        if (p < probe.from || p > probe.to) continue
        if (p > probe.from) look(probe, before, p, log, '-')
        look(probe, before + log, p, log, '')
      }
    }
  })
  return probes.map(({ probe }) => resultOf(probe))
}

/** The bounds are the same for all moduli, so that each is evaluated once a prime. */
function withMemory(probe: Probe): Probe {
  return { ...probe, lower: probe.lower && remembered(probe.lower), upper: probe.upper && remembered(probe.upper) }
}

function remembered(evaluate: Evaluate): Evaluate {
  let [at, value] = [NaN, NaN]
  return (x, log) => {
    if (x !== at) [at, value] = [x, evaluate(x, log)]
    return value
  }
}
