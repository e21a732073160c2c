import { type Rational, rational } from '../arithmetic/rational.ts'

/**
 * The Bernoulli numbers B_2, B_4, …, B_2m, exactly, as B_2k = (-1)^(k-1) 2k T_k / (4^k (4^k - 1)) from the tangent numbers T_k,
 * which are the positive integers of tan x = sum T_k x^(2k-1)/(2k-1)!. The tangent numbers come in place by additions and
 * products with small integers alone (Brent and Harvey, arXiv:1108.0286, Algorithm TangentNumbers).
 */
export function evenBernoulliNumbers(m: number): Rational[] {
  const tangent = new Array<bigint>(m + 1).fill(0n)
  tangent[1] = 1n
  for (let k = 2; k <= m; k++) tangent[k] = BigInt(k - 1) * tangent[k - 1]
  for (let k = 2; k <= m; k++) {
    for (let j = k; j <= m; j++) tangent[j] = BigInt(j - k) * tangent[j - 1] + BigInt(j - k + 2) * tangent[j]
  }
  return Array.from({ length: m }, (_, i) => {
    const k = i + 1
    const four = 1n << BigInt(2 * k)
    return rational((k % 2 === 1 ? 1n : -1n) * BigInt(2 * k) * tangent[k], four * (four - 1n))
  })
}
