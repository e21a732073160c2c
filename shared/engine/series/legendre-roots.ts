import { piFixed } from '../arithmetic/constants.ts'
import { floorShift } from '../arithmetic/integers.ts'

/**
 * Candidates for the roots of the Legendre polynomials. Nothing here is proven and nothing needs to be: the rule that uses a
 * candidate proves that a root is near it (P-6). All is in integers, so that every machine finds the same candidate.
 */

const START_BITS = 64
const GUARD_BITS = 40

/**
 * An integer x with x 2^-bits near the root of P_n with the given index, counted from the largest root down; for the middle
 * root of an odd n exactly 0.
 */
export function approximateLegendreRoot(n: number, index: number, bits: number): bigint {
  if (2 * index + 1 === n) return 0n
  let [x, width] = [startingPoint(n, index), START_BITS]
  // The start has about 10 bits or more beyond those that tell the roots apart; each step of Newton doubles what is right.
  for (let step = 0; step < 3; step++) x = newtonStep(n, x, width)
  while (width < bits + GUARD_BITS) {
    const next = Math.min(2 * width - GUARD_BITS / 2, bits + GUARD_BITS)
    x = newtonStep(n, x << BigInt(next - width), next)
    width = next
  }
  return floorShift(x, width - bits)
}

/** Tricomi's asymptotic formula (1 - (n-1)/(8 n^3)) cos((4 index + 3) pi / (4n + 2)). */
function startingPoint(n: number, index: number): bigint {
  const angle = (piFixed(START_BITS) * BigInt(4 * index + 3)) / BigInt(4 * n + 2)
  const cube = BigInt(n) ** 3n * 8n
  return (cosine(angle) * (cube - BigInt(n - 1))) / cube
}

/** cos by its Taylor series for arguments below 2. */
function cosine(angle: bigint): bigint {
  const square = (angle * angle) >> BigInt(START_BITS)
  let term = 1n << BigInt(START_BITS)
  let total = term
  for (let i = 1n; term !== 0n; i += 2n) {
    term = -((term * square) >> BigInt(START_BITS)) / (i * (i + 1n))
    total += term
  }
  return total
}

/** x - P_n(x)/P_n'(x) with P_n' = n (P_(n-1) - x P_n)/(1 - x^2). */
function newtonStep(n: number, x: bigint, width: number): bigint {
  const w = BigInt(width)
  const one = 1n << w
  let [previous, current] = [one, x]
  for (let m = 1; m < n; m++) {
    const product = (x * current) >> w
    const next = product + (BigInt(m) * (product - previous)) / BigInt(m + 1)
    previous = current
    current = next
  }
  const slope = BigInt(n) * (previous - ((x * current) >> w))
  return x - (current * (one - ((x * x) >> w))) / slope
}
