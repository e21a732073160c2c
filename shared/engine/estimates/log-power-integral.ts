import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, type Rational, ZERO, compare, magnitude, ceil, multiply, rational, subtract } from '../arithmetic/rational.ts'
import { negativePower } from '../sieve/weight.ts'

/** Relative accuracy of the integrals that have no closed form: 2^-ACCURACY. heuristic: affects width only */
const ACCURACY = 80
/** Terms of the power series on a panel: what is left out is below 4^-TERMS times 82 2^|beta|. */
const TERMS = ACCURACY / 2 + 6

/**
 * The integral of t^-sigma (log t)^-beta from e^from to e^to, `to` null standing for infinity.
 * *Claim*: inclusion. *Valid for*: from >= 1 and from <= to; sigma >= 1, and beta > 1 where sigma = 1 and `to` is null.
 * *Bound*: S-4. *Rounding*: by the arithmetic, `addError` for what the series and the cut leave out.
 */
export function logPowerIntegral<N>(arithmetic: Arithmetic<N>, sigma: Rational, beta: Rational, from: N, to: N | null): N {
  const a = subtract(sigma, ONE)
  if (a.num < 0n) throw new RangeError('the integrand grows')
  if (a.num === 0n) return integralOfPower(arithmetic, beta, from, to)
  let total = arithmetic.rational(ZERO)
  let v = from
  const start = arithmetic.lower(from)
  for (;;) {
    const low = arithmetic.lower(v)
    if (compare(multiply(a, subtract(low, start)), rational(ACCURACY)) > 0) {
      return arithmetic.add(total, restOfIntegral(arithmetic, a, beta, v))
    }
    const wide = compare(multiply(a, low), rational(8)) < 0
    const next = wide ? arithmetic.scale(v, rational(5, 4)) : arithmetic.add(v, arithmetic.rational(rational(2n * a.den, a.num)))
    const last = to !== null && compare(arithmetic.lower(to), arithmetic.upper(next)) <= 0
    total = arithmetic.add(total, panel(arithmetic, a, beta, v, last ? to : next))
    if (last) return total
    v = next
  }
}

/** The integral of v^-beta. */
function integralOfPower<N>(arithmetic: Arithmetic<N>, beta: Rational, from: N, to: N | null): N {
  const exponent = subtract(beta, ONE)
  if (exponent.num === 0n) {
    if (to === null) throw new RangeError('the integral diverges')
    return arithmetic.subtract(arithmetic.log(to), arithmetic.log(from))
  }
  if (to === null && exponent.num < 0n) throw new RangeError('the integral diverges')
  const head = negativePower(arithmetic, from, exponent)
  const difference = to === null ? head : arithmetic.subtract(head, negativePower(arithmetic, to, exponent))
  return arithmetic.scale(difference, rational(exponent.den, exponent.num))
}

/**
 * The integral of e^(-av) v^-beta over [from, to], of half-width r about v0 with r <= v0/8 and a r <= 1.1: the integrand solves
 * v f' = -(av + beta) f, whence its Taylor coefficients; those beyond TERMS are bounded on the circle of radius 4 r.
 */
function panel<N>(arithmetic: Arithmetic<N>, a: Rational, beta: Rational, from: N, to: N): N {
  const { add, multiply: times, scale } = arithmetic
  const r = scale(arithmetic.subtract(to, from), rational(1, 2))
  const v0 = scale(add(to, from), rational(1, 2))
  const ratio = arithmetic.divide(r, v0)
  const [narrow, short] = [compare(arithmetic.upper(ratio), rational(1, 8)), compare(multiply(a, arithmetic.upper(r)), rational(11, 10))]
  if (narrow > 0 || short > 0) throw new RangeError('a panel too wide for its error bound')
  const scaledRadius = scale(r, a)
  const growth = add(scale(v0, a), arithmetic.rational(beta))
  // terms[n] = f_n r^n / f(v0)
  let [previous, term] = [arithmetic.rational(ZERO), arithmetic.rational(ONE)]
  let sum = arithmetic.rational(ZERO)
  for (let n = 0; n <= TERMS; n++) {
    if (n % 2 === 0) sum = add(sum, scale(term, rational(1, n + 1)))
    const next = add(times(add(growth, arithmetic.rational(rational(n))), term), times(scaledRadius, previous))
    ;[previous, term] = [term, scale(times(ratio, next), rational(-1, n + 1))]
  }
  // |f(v0 + u)| <= f(v0) e^(4.4) 2^|beta| for |u| <= 4 r; the terms beyond TERMS add up to a third of the last bound times 4.
  const bound = rational(82n * 2n ** ceil(magnitude(beta)) * 4n, 3n * 4n ** BigInt(TERMS + 1))
  sum = arithmetic.addError(sum, arithmetic.rational(bound))
  const middle = arithmetic.timesExp(negativePower(arithmetic, v0, beta), scale(v0, { num: -a.num, den: a.den }))
  return times(times(scale(r, rational(2)), sum), middle)
}

/** [0, upper bound] of the integral of e^(-at) t^-beta from v on: with m = max(0, -beta), at most e^(-av) v^-beta / (a - m/v). */
function restOfIntegral<N>(arithmetic: Arithmetic<N>, a: Rational, beta: Rational, v: N): N {
  const m = beta.num < 0n ? { num: -beta.num, den: beta.den } : ZERO
  const rate = arithmetic.subtract(arithmetic.rational(a), arithmetic.divide(arithmetic.rational(m), v))
  if (compare(arithmetic.lower(rate), ZERO) <= 0) throw new RangeError('the integral is cut off too early')
  const top = arithmetic.divide(arithmetic.timesExp(negativePower(arithmetic, v, beta), arithmetic.scale(v, { num: -a.num, den: a.den })), rate)
  return arithmetic.between(ZERO, arithmetic.upper(top))
}
