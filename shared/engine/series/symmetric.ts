import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { rational } from '../arithmetic/rational.ts'

/**
 * Newton's identities: symmetric functions of the numbers x_p from their power sums p_j = sum of x_p^j, j >= 1.
 *   complete:    k h_k = sum_{j=1..k} p_j h_{k-j}                 (products of k of the numbers, repetition allowed)
 *   elementary:  k e_k = sum_{j=1..k} (-1)^(j-1) p_j e_{k-j}      (products of k different ones)
 */
export type SymmetricKind = 'complete' | 'elementary'

/**
 * Extends `known` = [f_0, f_1, …] (possibly empty) up to index k and returns f_k.
 * *Claim*: contains f_k. *Valid for*: k >= 0, absolutely convergent power sums. *Bound*: Z-4. *Rounding*: that of the arithmetic.
 */
export function symmetricFunction<N>(
  arithmetic: Arithmetic<N>,
  kind: SymmetricKind,
  powerSum: (j: number) => N,
  known: N[],
  k: number,
): N {
  if (known.length === 0) known.push(arithmetic.rational(rational(1)))
  while (known.length <= k) {
    const n = known.length
    let total = arithmetic.rational(rational(0))
    for (let j = 1; j <= n; j++) {
      const term = arithmetic.multiply(powerSum(j), known[n - j])
      total = kind === 'complete' || j % 2 === 1 ? arithmetic.add(total, term) : arithmetic.subtract(total, term)
    }
    known.push(arithmetic.scale(total, rational(1, n)))
  }
  return known[k]
}
