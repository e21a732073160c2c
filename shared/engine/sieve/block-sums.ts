import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, ZERO, rational } from '../arithmetic/rational.ts'
import type { MomentBlock, MomentSet } from './moments.ts'
import { type WeightExpansion, weightAt } from './weight.ts'

/**
 * Encloses, for each of several weights, the sum of the weight over a batch of integers, in units of 2^-precision.
 * *Claim*: inclusion. *Valid for*: blocks with log(centre) >= 9 and reach/centre <= 3/4; moments of order at most the
 * expansions'. *Bound*: S-3. *Rounding*: the ends outward.
 */
export function sumBatch<N>(arithmetic: Arithmetic<N>, expansions: readonly WeightExpansion[], batch: MomentSet): [bigint, bigint][] {
  return arithmetic.frame(() => {
    const totals = expansions.map(() => arithmetic.rational(ZERO))
    for (const n of batch.singles) {
      const logN = arithmetic.log(arithmetic.rational(rational(n)))
      expansions.forEach(({ weight }, i) => {
        totals[i] = arithmetic.add(totals[i], weightAt(arithmetic, weight, n, logN))
      })
    }
    for (const block of batch.blocks) {
      const logCentre = arithmetic.log(arithmetic.rational(rational(block.centre)))
      const inverseLog = arithmetic.divide(arithmetic.rational(ONE), logCentre)
      expansions.forEach((expansion, i) => {
        totals[i] = arithmetic.add(totals[i], blockSum(arithmetic, expansion, block, logCentre, inverseLog))
      })
    }
    return totals.map((total) => arithmetic.fixedBounds(total))
  })
}

/** The sum over one block: w(c) sum_i y^i nu_i, the nu_i being exact rationals made of the moments, and the remainder (S-3). */
function blockSum<N>(arithmetic: Arithmetic<N>, expansion: WeightExpansion, block: MomentBlock, logCentre: N, inverseLog: N): N {
  const { moments, reach, step } = block
  const { numerators, denominator, remainderFactor } = expansion
  const order = moments.length - 1
  const centre = BigInt(block.centre)
  // scaled[j] = step^j moments[j] centre^(order - j)
  const scaled = new Array<bigint>(order + 1)
  let power = 1n
  for (let j = order; j >= 0; j--, power *= centre) scaled[j] = BigInt(step) ** BigInt(j) * moments[j] * power
  const den = denominator * (power / centre)
  let total = arithmetic.rational(ZERO)
  for (let i = order; i >= 0; i--) {
    let num = 0n
    for (let j = i; j <= order; j++) num += numerators[j][i] * scaled[j]
    total = arithmetic.multiply(total, inverseLog)
    // Not in lowest terms, which no operation relies on: the division by the greatest common divisor would cost more.
    if (num !== 0n) total = arithmetic.add(total, arithmetic.rational({ num, den }))
  }
  const remainder = {
    num: moments[0] * (4n * BigInt(reach)) ** BigInt(order + 1) * remainderFactor.num,
    den: (3n * centre) ** BigInt(order + 1) * remainderFactor.den,
  }
  return arithmetic.multiply(
    arithmetic.addError(total, arithmetic.rational(remainder)),
    weightAt(arithmetic, expansion.weight, block.centre, logCentre),
  )
}
