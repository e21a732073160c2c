import { ONE, type Rational, rational } from '../arithmetic/rational.ts'

/**
 * [B_0, B_2, B_4, …, B_2n], exactly, as B_2k = (-1)^(k-1) 2k T_k / (4^k (4^k - 1)) from the tangent numbers T_k,
 * which are the positive integers of tan x = sum T_k x^(2k-1)/(2k-1)!. The tangent numbers come in place by additions and
 * products with small integers alone (Brent and Harvey, arXiv:1108.0286, Algorithm TangentNumbers).
 */
export function bernoulliNumbers(n: number): Rational[] {
  const tangent = new Array<bigint>(n + 1).fill(0n)
  tangent[1] = 1n
  for (let k = 2; k <= n; k++) tangent[k] = BigInt(k - 1) * tangent[k - 1]
  for (let k = 2; k <= n; k++) {
    for (let j = k; j <= n; j++) tangent[j] = BigInt(j - k) * tangent[j - 1] + BigInt(j - k + 2) * tangent[j]
  }
  const even = [ONE]
  for (let k = 1; k <= n; k++) {
    const four = 1n << BigInt(2 * k)
    even.push(rational((k % 2 === 1 ? 1n : -1n) * BigInt(2 * k) * tangent[k], four * (four - 1n)))
  }
  return even
}
