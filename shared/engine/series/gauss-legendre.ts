import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ceilDivide } from '../arithmetic/integers.ts'
import { type Rational, dyadic, rational } from '../arithmetic/rational.ts'
import { approximateLegendreRoot } from './legendre-roots.ts'

/** One of the two nodes +-x of the Gauss-Legendre rule with n nodes on [-1, 1], with all that is known of it. */
export interface GaussNode<N> {
  /** centre 2^-bits is exact, and the node x is within reach 2^-bits of it; 0 <= centre. */
  readonly centre: bigint
  readonly reach: bigint
  readonly bits: number
  /** Encloses the weight, that of x and that of -x. */
  readonly weight: N
  /** P_0, …, P_(n-1) at the node x, enclosed. */
  readonly legendre: readonly N[]
}

/** Bits that `wide` must have beyond those wanted of a rule with n nodes: errors grow at most like (1 + sqrt 2)^m in P_m (P-6). */
export function spareBits(n: number): number {
  return Math.ceil((n * 128) / 100) + 16
}

/**
 * *Claim*: P_0(x), …, P_n(x) for each x in the interval. *Valid for*: n >= 1. *Bound*: P-6, the recurrence
 * P_(m+1) = x P_m + m/(m+1) (x P_m - P_(m-1)). *Rounding*: that of the arithmetic.
 */
export function legendreValues<N>(a: Arithmetic<N>, x: N, n: number): N[] {
  const values = [a.rational(rational(1)), x]
  for (let m = 1; m < n; m++) {
    const product = a.multiply(x, values[m])
    values.push(a.add(product, a.scale(a.subtract(product, values[m - 1]), { num: BigInt(m), den: BigInt(m + 1) })))
  }
  return values
}

/**
 * The node of the given index, counted from the largest down, 0 <= index < ceil(n/2).
 * *Claim*: [centre - reach, centre + reach] 2^-bits contains a root of P_n, and `weight` its weight 2/((1 - x^2) P_n'(x)^2).
 * That the intervals of all indices are disjoint, so that no root is missed, is for the user to check: see `areDescending`.
 * *Valid for*: n >= 2, `wide` finer than `bits` by about `spareBits(n)`. *Bound*: P-6. *Rounding*: outward.
 */
export function gaussNode<N>(wide: Arithmetic<N>, n: number, index: number, bits: number): GaussNode<N> {
  const centre = approximateLegendreRoot(n, index, bits)
  const x = wide.rational(dyadic(centre, bits))
  const one = wide.rational(rational(1))
  const values = legendreValues(wide, x, n)
  const value = values[n]
  const complement = wide.subtract(one, wide.multiply(x, x))
  const slope = wide.divide(wide.scale(wide.subtract(values[n - 1], wide.multiply(x, value)), rational(n)), complement)

  const reach = certifiedReach(wide, n, value, slope, bits)
  if (centre + reach >= 1n << BigInt(bits)) throw new RangeError('a node of the rule was not found inside (-1, 1)')
  const distance = wide.rational(dyadic(reach, bits))

  // g = (1 - x^2) P_n'^2 moves by at most 3/2 (n (n+1))^2 a unit, P_m by at most m (m+1)/2.
  const slopes = n * (n + 1)
  const atCentre = wide.multiply(complement, wide.multiply(slope, slope))
  const atRoot = wide.addError(atCentre, wide.scale(distance, rational(3n * BigInt(slopes) ** 2n, 2n)))
  return {
    centre,
    reach,
    bits,
    weight: wide.divide(wide.rational(rational(2)), atRoot),
    legendre: values.slice(0, n).map((v, m) => wide.addError(v, wide.scale(distance, rational((m * (m + 1)) / 2)))),
  }
}

/**
 * The least r in units of 2^-bits with r >= 2 |P_n| / |P_n'|, once r |P_n''| <= |P_n'|/2 is known with
 * |P_n''| <= (n-1) n (n+1) (n+2)/8: then P_n changes its sign within r.
 */
function certifiedReach<N>(a: Arithmetic<N>, n: number, value: N, slope: N, bits: number): bigint {
  const [valueUpper, slopeLower] = [magnitude(a, value)[1], magnitude(a, slope)[0]]
  if (slopeLower <= 0n) throw new RangeError('the slope at a node is not known well enough')
  const reach = ceilDivide((valueUpper << BigInt(bits)) * 2n, slopeLower)
  const curvature = (BigInt(n - 1) * BigInt(n) * BigInt(n + 1) * BigInt(n + 2)) / 8n + 1n
  if (reach * curvature * 2n << BigInt(a.precision) > slopeLower << BigInt(bits)) {
    throw new RangeError('a node of the rule is not known well enough')
  }
  return reach
}

/** Integer bounds of |x| in units of 2^-precision. */
function magnitude<N>(a: Arithmetic<N>, x: N): [bigint, bigint] {
  const [lo, hi] = a.fixedBounds(x)
  if (lo >= 0n) return [lo, hi]
  if (hi <= 0n) return [-hi, -lo]
  return [0n, -lo > hi ? -lo : hi]
}

/** Whether intervals of nodes in falling order do not touch, so that each holds a root of its own. Bits must be the same. */
export function areDescending(nodes: readonly { centre: bigint; reach: bigint }[]): boolean {
  return nodes.every((node, i) => i === 0 || nodes[i - 1].centre - nodes[i - 1].reach > node.centre + node.reach)
}

/** The node +x of a rule on [0, 1] in exact form: (1 + centre)/2 and half the reach. */
export function onUnitInterval(node: { centre: bigint; reach: bigint; bits: number }, sign: 1 | -1): { lo: Rational; hi: Rational } {
  const one = 1n << BigInt(node.bits)
  const centre = one + (sign === 1 ? node.centre : -node.centre)
  return { lo: dyadic(centre - node.reach, node.bits + 1), hi: dyadic(centre + node.reach, node.bits + 1) }
}
