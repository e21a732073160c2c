import { type Arithmetic, certainlyLess } from '../arithmetic/arithmetic.ts'
import { steadyExp, steadyLog } from '../arithmetic/steady.ts'
import { type Rational, compare, floorScaled, parseRational } from '../arithmetic/rational.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import type { Bound, Claim, Estimate, Point, Term } from './estimate.ts'

/** One estimate of what theta differs from its main term by, a sum of terms, used for log t in [from, to]; `to` null: for ever. */
export interface Piece<N> {
  estimate: Estimate
  terms: readonly Term[]
  from: Mark<N>
  to: Mark<N> | null
}

export interface Envelope<N> {
  lower: Piece<N>[]
  upper: Piece<N>[]
}

/** A point of the half-line with its logarithm. */
export interface Mark<N> {
  key: string
  label: string
  log: N
}

/** Indices into the ordered marks: valid from marks[first] to marks[last], `last` null for ever. */
interface Candidate {
  estimate: Estimate
  terms: readonly Term[]
  first: number
  last: number | null
}

const labelOf = (point: Point): string => {
  if ('log' in point) return `e^${point.log}`
  const [, head, rest] = /^(\d)(\d*?)0{9,}$/.exec(point.x) ?? []
  if (head === undefined) return point.x
  const mantissa = rest === '' ? head : `${head}.${rest}`
  return `${mantissa === '1' ? '' : `${mantissa} * `}10^${point.x.length - 1}`
}

function markOf<N>(arithmetic: Arithmetic<N>, point: Point): Mark<N> {
  const value = arithmetic.rational(parseRational('x' in point ? point.x : point.log)!)
  return {
    key: 'x' in point ? `x = ${point.x}` : `log x = ${point.log}`,
    label: labelOf(point),
    log: 'x' in point ? arithmetic.log(value) : value,
  }
}

/** Whether it speaks of theta, or for a modulus above 1 of theta over each class prime to it. */
function speaksOf({ quantity, moduli }: Claim, modulus: number): boolean {
  if (modulus === 1) return quantity === 'theta'
  return quantity === 'theta-class' && moduli !== undefined && moduli[0] <= modulus && modulus <= moduli[1]
}

/**
 * Lower and upper bounds of theta(t) - t, or with a modulus q > 1 of theta(t;q,a) - t/phi(q), for all t >= cutoff, each from as few
 * estimates as serve; null where none is valid somewhere. `weight` only helps to choose.
 * *Claim*: each piece's estimate is stated for all of the piece, and the pieces of each side cover the half-line.
 * *Valid for*: cutoff >= 2. *Bound*: S-5.
 */
export function thetaEnvelope<N>(
  arithmetic: Arithmetic<N>,
  cutoff: number,
  estimates: readonly Estimate[],
  weight: RationalWeight,
  modulus = 1,
): Envelope<N> | null {
  const start = markOf(arithmetic, { x: String(cutoff) })
  const before = (a: Mark<N>, b: Mark<N>): boolean => a.key === b.key || certainlyLess(arithmetic, a.log, b.log)
  const ranges = estimates
    .filter(({ claim }) => speaksOf(claim, modulus))
    .map((estimate) => ({ estimate, from: markOf(arithmetic, estimate.claim.from), to: estimate.claim.to && markOf(arithmetic, estimate.claim.to) }))
    .filter(({ to }) => to === null || before(start, to))

  const beyond = new Map<string, Mark<N>>()
  for (const { from, to } of ranges) {
    for (const mark of [from, to]) if (mark && mark.key !== start.key && before(start, mark)) beyond.set(mark.key, mark)
  }
  const marks = [start, ...[...beyond.values()].sort((a, b) => compare(arithmetic.lower(a.log), arithmetic.lower(b.log)))]
  if (marks.some((mark, i) => i > 0 && !before(marks[i - 1], mark))) throw new Error('two ends of ranges cannot be told apart')
  const index = (mark: Mark<N>): number => (before(mark, start) ? 0 : marks.findIndex(({ key }) => key === mark.key))

  const chosen = (side: 'lower' | 'upper'): Piece<N>[] | null => {
    const candidates = ranges.flatMap(({ estimate, from, to }): Candidate[] => {
      const terms = integrable(estimate.claim[side])
      // A range whose start is not certainly at or before the cut-off, nor a mark beyond it, has index -1.
      const first = index(from)
      return terms && first >= 0 ? [{ estimate, terms, first, last: to && index(to) }] : []
    })
    const logs = marks.map(({ log }) => approximate(arithmetic.lower(log)))
    return chain(candidates, logs, side === 'lower' ? -1 : 1, weight)?.map(({ candidate, first, last }) => ({
      estimate: candidate.estimate,
      terms: candidate.terms,
      from: marks[first],
      to: last === null ? null : marks[last],
    })) ?? null
  }
  const [lower, upper] = [chosen('lower'), chosen('upper')]
  return lower && upper && { lower, upper }
}

/** The same, for a class by estimates of theta over all primes where none of its own covers what lies beyond. */
export function envelopeBeyond<N>(arithmetic: Arithmetic<N>, cutoff: number, estimates: readonly Estimate[], weight: RationalWeight, modulus: number): Envelope<N> | null {
  const ofClass = modulus > 1 ? thetaEnvelope(arithmetic, cutoff, estimates, weight, modulus) : null
  return ofClass ?? thetaEnvelope(arithmetic, cutoff, estimates, weight)
}

/**
 * The estimates out of those given that the envelopes beyond the cut-offs use, so few that with these alone they are made of
 * them all again: what a certificate records. For a class where none of its own covers what lies beyond, those over all primes.
 */
export function estimatesUsed<N>(
  arithmetic: Arithmetic<N>,
  cutoffs: readonly number[],
  estimates: readonly Estimate[],
  weights: readonly RationalWeight[],
  modulus = 1,
): Estimate[] {
  let allowed = [...estimates]
  for (;;) {
    const used = new Set<Estimate>()
    const envelopes = weights.flatMap((weight) => cutoffs.map((cutoff) => envelopeBeyond(arithmetic, cutoff, allowed, weight, modulus)))
    for (const envelope of envelopes) {
      for (const { estimate } of [...(envelope?.lower ?? []), ...(envelope?.upper ?? [])]) used.add(estimate)
    }
    if (used.size === allowed.length) return allowed
    allowed = allowed.filter((estimate) => used.has(estimate))
  }
}

function integrable(bound: Bound | undefined): readonly Term[] | undefined {
  return bound?.form === 'sum' ? bound.terms : undefined
}

interface Link {
  candidate: Candidate
  first: number
  last: number | null
}

/** Another estimate is taken up only where it narrows the whole by more than this share. heuristic: affects width only */
const WORTHWHILE = 0.01

/**
 * Covers all marks with candidates, each inside its range. Which is chosen rests on doubles and affects the width only; that
 * each is used inside its range rests on the indices.
 */
function chain(candidates: readonly Candidate[], logs: readonly number[], sign: number, weight: RationalWeight): Link[] | null {
  const links: Link[] = []
  let total = 0
  for (let i = 0; i < logs.length; i++) {
    const valid = candidates.filter(({ first, last }) => first <= i && (last === null || last > i))
    const ends = valid.map(({ last }) => (last === null ? Infinity : logs[last]))
    const end = Math.min(logs[i] + 200, ...ends)
    const scores = valid.map(({ terms }) => sign * approximateIntegral(terms, logs[i], end, weight))
    const best = scores.indexOf(Math.min(...scores))
    if (best < 0) return null
    const current = links.at(-1)
    const stays = current && (current.last === null || current.last > i)
    const gain = stays ? scores[valid.indexOf(current.candidate)] - scores[best] : Infinity
    if (gain > WORTHWHILE * Math.abs(total)) {
      if (stays) current.last = i
      links.push({ candidate: valid[best], first: i, last: valid[best].last })
    }
    const used = valid.indexOf(links[links.length - 1].candidate)
    total += i + 1 < logs.length ? sign * approximateIntegral(valid[used].terms, logs[i], logs[i + 1], weight) : 0
  }
  return links
}

/** c t^a (log t)^k in doubles. */
type RoughTerm = readonly [c: number, a: number, k: number]

const roughTerms = new WeakMap<readonly Term[], readonly RoughTerm[]>()

function rough(terms: readonly Term[]): readonly RoughTerm[] {
  let found = roughTerms.get(terms)
  if (!found) {
    found = terms.map(({ coefficient, power, logPower, overPi }) => {
      const [c, a, k] = [coefficient, power, logPower].map((text) => approximate(parseRational(text)!))
      return [overPi ? c / 3.14 : c, a, k]
    })
    roughTerms.set(terms, found)
  }
  return found
}

/** About the integral of a bound against -h' (see primeTail) over log t in [from, to]. */
function approximateIntegral(terms: readonly Term[], from: number, to: number, { power, logPower }: RationalWeight): number {
  const [s, b] = [approximate(power), approximate(logPower)]
  const steps = 24
  const width = (to - from) / steps
  let total = 0
  for (const [c, a, k] of rough(terms)) {
    for (let i = 0; i < steps; i++) {
      const v = from + (i + 0.5) * width
      total += c * width * steadyExp((k - b - 1) * steadyLog(v) + (a - s) * v + (s - 1) * from) // heuristic: affects width only
    }
  }
  return total
}

function approximate(a: Rational): number {
  return Number(floorScaled(a, 80)) / 2 ** 80 // heuristic: affects speed only, and width
}
