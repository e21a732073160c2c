import { type Arithmetic, magnitudeUpper } from '../arithmetic/arithmetic.ts'
import { bitLength, factorial } from '../arithmetic/integers.ts'
import { type Rational, ONE, ZERO, rational } from '../arithmetic/rational.ts'

/** A complex number as two enclosures: a rectangle. */
export interface Complex<N> {
  re: N
  im: N
}

export function multiplyComplex<N>(a: Arithmetic<N>, x: Complex<N>, y: Complex<N>): Complex<N> {
  return {
    re: a.subtract(a.multiply(x.re, y.re), a.multiply(x.im, y.im)),
    im: a.add(a.multiply(x.re, y.im), a.multiply(x.im, y.re)),
  }
}

/**
 * exp(2 pi i j / order) for 0 <= j < order.
 * *Claim*: each rectangle contains its root of unity. *Valid for*: order >= 1. *Bound*: L-4. *Rounding*: Taylor's series at
 * 2 pi j / order minus a multiple of 2 pi, at most 4 in size; each root on its own, so that no error builds up along j.
 */
export function rootsOfUnity<N>(a: Arithmetic<N>, order: number): Complex<N>[] {
  return Array.from({ length: order }, (_, j) => {
    if ((4 * j) % order === 0) return quarterTurn(a, (4 * j) / order)
    const turn = 2 * j > order ? rational(2 * (j - order), order) : rational(2 * j, order)
    return expImaginary(a, a.scale(a.pi(), turn))
  })
}

function quarterTurn<N>(a: Arithmetic<N>, quarters: number): Complex<N> {
  const [one, zero] = [a.rational(ONE), a.rational(ZERO)]
  return [{ re: one, im: zero }, { re: zero, im: one }, { re: a.negate(one), im: zero }, { re: zero, im: a.negate(one) }][quarters]
}

/** e^(i x) for |x| <= 4 by its Taylor series; the rest is at most the first omitted term doubled (L-4). */
function expImaginary<N>(a: Arithmetic<N>, x: N): Complex<N> {
  const parts = [a.rational(ONE), x]
  let term = x
  let n = 1
  // 4^n / n! < 2^-precision and n >= 8, so that later terms at least halve.
  while (n < 8 || factorial(n) < 1n << BigInt(a.precision + 2 * n)) {
    n += 1
    term = a.scale(a.multiply(term, x), rational(1, n))
    parts[n % 2] = n % 4 < 2 ? a.add(parts[n % 2], term) : a.subtract(parts[n % 2], term)
  }
  const rest = a.scale(term, rational(2))
  return { re: a.addError(parts[0], rest), im: a.addError(parts[1], rest) }
}

/**
 * Principal logarithm of z in the right half plane.
 * *Claim*: contains log z. *Valid for*: certified Re z > 0; throws RangeError otherwise. *Bound*: L-4.
 */
export function logComplex<N>(a: Arithmetic<N>, z: Complex<N>): Complex<N> {
  if (a.lower(z.re).num <= 0n) throw new RangeError('a logarithm outside the right half plane')
  const norm = a.add(a.multiply(z.re, z.re), a.multiply(z.im, z.im))
  return { re: a.scale(a.log(norm), rational(1, 2)), im: arcTangent(a, a.divide(z.im, z.re)) }
}

/** atan x: halve the angle by x / (1 + sqrt(1 + x^2)) until |x| <= 1/8, then the alternating series (L-4). */
function arcTangent<N>(a: Arithmetic<N>, x: N): N {
  let [small, doublings] = [x, 0]
  while (sizeBits(magnitudeUpper(a, small)) > -3) {
    const root = a.exp(a.scale(a.log(a.add(a.rational(ONE), a.multiply(small, small))), rational(1, 2)))
    small = a.divide(small, a.add(a.rational(ONE), root))
    doublings += 1
  }
  const square = a.multiply(small, small)
  const terms = Math.ceil(a.precision / (-2 * sizeBits(magnitudeUpper(a, small)))) + 1 // heuristic: affects speed only
  let power = small
  let total = small
  for (let k = 1; k <= terms; k++) {
    power = a.multiply(power, square)
    total = a.add(total, a.scale(power, rational(k % 2 === 0 ? 1 : -1, 2 * k + 1)))
  }
  // The terms alternate and shrink, so the rest is below the next one, itself below the last power.
  return a.scale(a.addError(total, power), rational(1n << BigInt(doublings)))
}

/** The least e (at least -10,000) with q < 2^e, up to one too large. */
function sizeBits(q: Rational): number {
  return q.num === 0n ? -10_000 : Math.max(-10_000, bitLength(q.num) - bitLength(q.den) + 1)
}
