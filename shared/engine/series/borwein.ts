import { type Weights, makeWeights } from '../arithmetic/arithmetic.ts'

/**
 * Integers c_k and T with eta(s) = (1/T) sum_{k < terms} c_k (k+1)^-s + e, |e| <= 1/T, where eta(s) = (1 - 2^(1-s)) zeta(s).
 * T = T_n(3) for the Chebyshev polynomial T_n, so that 1/T is about 5.83^-n.
 *
 * *Claim*: the bound of e. *Valid for*: real s > 0, terms >= 1. *Bound*: Z-1. *Rounding*: none, all is exact.
 */
export function etaWeights(terms: number): Weights {
  // q_i = |coefficient of x^i in T_n(1 - 2x)|, by the ratio of consecutive ones; T_n(3) is their sum.
  const n = BigInt(terms)
  const q = [1n]
  for (let i = 1n; i <= n; i++) q.push((q[Number(i) - 1] * 2n * (n + i - 1n) * (n - i + 1n)) / (i * (2n * i - 1n)))
  const total = q.reduce((a, b) => a + b, 0n)
  const numerators: bigint[] = []
  let rest = total
  for (let k = 0; k < terms; k++) {
    rest -= q[k]
    numerators.push(k % 2 === 0 ? rest : -rest)
  }
  return makeWeights(numerators, total)
}
