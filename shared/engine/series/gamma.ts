import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { factorial } from '../arithmetic/integers.ts'
import { ONE, type Rational, add, divide, isInteger, magnitude, multiply, negate, rational, subtract } from '../arithmetic/rational.ts'
import { bernoulliNumbers } from './bernoulli.ts'

/**
 * *Claim*: contains 1/Gamma(b). *Valid for*: rational b > 0. *Bound*: Z-7. *Rounding*: that of the arithmetic; none for an integer b.
 * Gamma(b) = Gamma(z) / (b (b+1) … (z-1)) for z = b + shift, and Stirling's series at z, cut after `terms` terms: its rest is
 * smaller than the first term left out.
 */
export function reciprocalGamma<N>(a: Arithmetic<N>, b: Rational): N {
  if (b.num <= 0n) throw new RangeError('1/Gamma is asked for at a number that is not positive')
  if (isInteger(b) && b.num <= 1000n) return a.rational(rational(1n, factorial(Number(b.num) - 1)))
  const shift = Math.ceil(a.precision / 5) + 2
  let rising = ONE
  for (let i = 0; i < shift; i++) rising = multiply(rising, add(b, rational(i)))
  const z = add(b, rational(shift))
  const terms = Math.ceil(a.precision / 8) + 2
  const bernoulli = bernoulliNumbers(terms + 1)
  const logZ = a.log(a.rational(z))

  // (z - 1/2) log z - z + log(2 pi)/2 + sum B_2i / (2i (2i-1) z^(2i-1)).
  let log = a.add(a.scale(logZ, subtract(z, rational(1, 2))), a.rational(negate(z)))
  log = a.add(log, a.scale(a.log(a.scale(a.pi(), rational(2))), rational(1, 2)))
  let power = divide(ONE, z)
  const square = multiply(power, power)
  const term = (i: number): Rational => multiply(divide(bernoulli[i], rational(2 * i * (2 * i - 1))), power)
  for (let i = 1; i <= terms; i++) {
    log = a.add(log, a.rational(term(i)))
    power = multiply(power, square)
  }
  log = a.addError(log, a.rational(magnitude(term(terms + 1))))
  return a.timesExp(a.rational(rising), a.negate(log))
}
