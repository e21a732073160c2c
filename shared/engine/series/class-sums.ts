import { type Arithmetic, type Vector, type Weights, magnitudeUpper, makeWeights } from '../arithmetic/arithmetic.ts'
import { bitLength, factorial } from '../arithmetic/integers.ts'
import { leastPrimeDivisors } from '../arithmetic/primes.ts'
import { type Rational, ONE, divide, multiply, rational } from '../arithmetic/rational.ts'
import { bernoulliNumbers } from './bernoulli.ts'
import { units } from './characters.ts'

/**
 * For one s: sums over the residue classes, sum of n^-ms over n = a mod q, for every unit a and one m after the other, from 1
 * on. For m = 1 the common pole is taken out: the sum less 1/(q (s-1)), continued to s = 1. Sums over a against a
 * non-principal character do not feel it.
 */
export interface ClassSums<N> {
  /** Goes on from m to m + 1. */
  advance(): void
  /** The sums for the present m, in the order of `units(q)`. */
  sums(): N[]
}

/**
 * *Claim*: every value contains its sum. *Valid for*: q >= 3, s >= 1. *Bound*: L-1 (Euler-Maclaurin, error below the first
 * omitted term), L-2 (the regular part near s = 1). *Rounding*: powers are shared between the m, one product each.
 */
export function createClassSums<N>(a: Arithmetic<N>, q: number): (s: N, sMinusOne: N) => ClassSums<N> {
  // Terms of a class before the Euler-Maclaurin tail, and the length of that: B and K with (K/(e pi B))^2K about 2^-precision.
  const blocks = Math.max(6, Math.ceil(a.precision / 7)) // heuristic: affects width only
  const corrections = Math.max(4, Math.ceil(a.precision / 5.4)) // heuristic: affects width only
  const coprime = units(q)
  const largest = q * (blocks + 1)
  const least = leastPrimeDivisors(largest)
  const logs: N[] = []
  for (let n = 2; n <= largest; n++) logs[n] = least[n] === n ? a.log(a.rational(rational(n))) : a.add(logs[least[n]], logs[n / least[n]])
  const tails = tailCoefficients(q, corrections)
  const ones: Weights = makeWeights(new Array<bigint>(blocks).fill(1n), 1n)
  const edges = coprime.map((c) => c + q * blocks)

  return (s, sMinusOne) => {
    const powers: N[] = [a.rational(ONE), a.rational(ONE)]
    for (let n = 2; n <= largest; n++) powers[n] = least[n] === n ? a.exp(a.negate(a.multiply(s, logs[n]))) : a.multiply(powers[least[n]], powers[n / least[n]])
    // One vector a class: its first terms, and last the power at the edge where the tail begins.
    const first = coprime.map((c) => a.vector(Array.from({ length: blocks + 1 }, (_, j) => powers[c + j * q])))
    let current: Vector<N>[] = first
    let m = 1
    return {
      advance() {
        m += 1
        current = current.map((v, i) => a.multiplyVectors(v, first[i]))
      },
      sums() {
        const ms = m === 1 ? s : a.scale(s, rational(m))
        const factors = risingFactors(a, ms, tails)
        return coprime.map((_, i) => {
          const edge = a.item(current[i], blocks)
          const integral = m === 1
            ? a.scale(regularIntegral(a, sMinusOne, logs[edges[i]]), rational(1, q))
            : a.divide(a.scale(edge, rational(edges[i], q)), a.subtract(ms, a.rational(ONE)))
          const tail = a.multiply(edge, edgeSeries(a, factors, edges[i]))
          return a.add(a.dot(ones, current[i]), a.add(integral, tail))
        })
      },
    }
  }
}

/** B_2k q^(2k-1) / (2k)! for k = 1 … count. */
function tailCoefficients(q: number, count: number): Rational[] {
  return bernoulliNumbers(count).slice(1).map((b, i) => multiply(b, rational(BigInt(q) ** BigInt(2 * i + 1), factorial(2 * i + 2))))
}

/**
 * The coefficients of the tail, B_2k q^(2k-1)/(2k)! times s (s+1) … (s+2k-2), each as its ratio to the one before, so that
 * Horner's rule in `edgeSeries` meets no large number.
 */
function risingFactors<N>(a: Arithmetic<N>, s: N, tails: readonly Rational[]): N[] {
  return tails.map((c, i) => {
    if (i === 0) return a.scale(s, c)
    const rise = a.multiply(a.add(s, a.rational(rational(2 * i - 1))), a.add(s, a.rational(rational(2 * i))))
    return a.scale(rise, divide(c, tails[i - 1]))
  })
}

/**
 * 1/2 + sum over k < K of T_k x^(1-2k), with the last coefficient T_K used as the bound of the error: the terms T_k x^(1-2k) are
 * the products of the first k ratios over x^2, so the sum is r_1/x (1 + r_2/x^2 (1 + r_3/x^2 (…))) (L-1).
 */
function edgeSeries<N>(a: Arithmetic<N>, ratios: readonly N[], edge: number): N {
  const [inverse, inverseSquare] = [rational(1, edge), rational(1, edge * edge)]
  const one = a.rational(ONE)
  const last = a.scale(ratios[ratios.length - 1], inverseSquare)
  let value = a.addError(one, last)
  for (let k = ratios.length - 2; k >= 0; k--) {
    value = a.scale(a.multiply(ratios[k], value), k === 0 ? inverse : inverseSquare)
    value = a.add(k === 0 ? a.rational(rational(1, 2)) : one, value)
  }
  return value
}

/** (x^-t - 1)/t with t and log x given; -log x at t = 0 (L-2). */
function regularIntegral<N>(a: Arithmetic<N>, t: N, logX: N): N {
  const y = a.multiply(t, logX)
  const upper = magnitudeUpper(a, y)
  if (upper.num * 2n < upper.den) {
    return a.negate(a.multiply(logX, exponentialSeries(a, y, seriesLength(a.precision + 2, upper))))
  }
  return a.divide(a.subtract(a.exp(a.negate(y)), a.rational(ONE)), t)
}

/** The number of terms of E(-y) that brings its rest below 2^-bits, |y| being below `upper` < 1/2. heuristic: affects speed only */
function seriesLength(bits: number, upper: Rational): number {
  const each = Math.max(1, bitLength(upper.den) - bitLength(upper.num) - 1) // heuristic: affects speed only
  let [length, gained] = [1, each]
  while (gained < bits) {
    length += 1
    gained += each + bitLength(BigInt(length)) - 1
  }
  return length
}

/** E(-y) = sum of (-y)^j/(j+1)! for |y| < 1/2; what follows the j < length is below twice |y|^length/(length+1)!. */
function exponentialSeries<N>(a: Arithmetic<N>, y: N, length: number): N {
  let power = a.rational(ONE)
  let total = power
  for (let j = 1; j <= length; j++) {
    power = a.scale(a.multiply(power, y), rational(-1, j + 1))
    if (j < length) total = a.add(total, power)
  }
  return a.addError(total, a.scale(power, rational(2)))
}
