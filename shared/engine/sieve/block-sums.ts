import { type Arithmetic, type Vector, type Weights, makeWeights } from '../arithmetic/arithmetic.ts'
import { bitLength } from '../arithmetic/integers.ts'
import { ONE, ZERO, rational } from '../arithmetic/rational.ts'
import type { MomentBlock, MomentSet } from './moments.ts'
import { type WeightExpansion, weightAt } from './weight.ts'

/**
 * Encloses, for each of several weights and each class, the sum of the weight over a batch of integers, in units of
 * 2^-precision: result[weight][class].
 * *Claim*: inclusion. *Valid for*: blocks with log(centre) >= 9 and reach/centre <= 3/4; moments of order at most the
 * expansions'. *Bound*: S-3. *Rounding*: the ends outward.
 */
export function sumBatch<N>(arithmetic: Arithmetic<N>, expansions: readonly WeightExpansion[], batch: MomentSet): [bigint, bigint][][] {
  return arithmetic.frame(() => {
    const { add } = arithmetic
    const totals = expansions.map(() => batch.singles.map(() => arithmetic.rational(ZERO)))
    batch.singles.forEach((singles, c) => {
      for (const n of singles) {
        const logN = arithmetic.log(arithmetic.rational(rational(n)))
        expansions.forEach(({ weight }, i) => (totals[i][c] = add(totals[i][c], weightAt(arithmetic, weight, n, logN))))
      }
    })
    const rows = expansions.map(rowsOf)
    for (const block of batch.blocks) {
      const logCentre = arithmetic.log(arithmetic.rational(rational(block.centre)))
      const powers = powersOfInverse(arithmetic, logCentre, orderOf(block))
      expansions.forEach((expansion, i) => {
        const local = taylor(arithmetic, expansion, rows[i], block, logCentre, powers)
        block.classes.forEach((moments, c) => {
          if (moments.length > 0) totals[i][c] = add(totals[i][c], classSum(arithmetic, local, moments))
        })
      })
    }
    return totals.map((classes) => classes.map((total) => arithmetic.fixedBounds(total)))
  })
}

const orderOf = ({ classes }: MomentBlock): number => classes.reduce((order, moments) => Math.max(order, moments.length - 1), 0)

/** The numerators of each Taylor coefficient as weights for the powers of y = 1/log c. */
const rowsOf = ({ numerators, denominator }: WeightExpansion): Weights[] => numerators.map((row) => makeWeights(row, denominator))

/** 1, y, y^2, … with y = 1/logCentre < 1. */
function powersOfInverse<N>(arithmetic: Arithmetic<N>, logCentre: N, order: number): Vector<N> {
  const inverse = arithmetic.divide(arithmetic.rational(ONE), logCentre)
  const powers = [arithmetic.rational(ONE), inverse]
  while (powers.length <= order) powers.push(arithmetic.multiply(powers[powers.length - 1], inverse))
  return arithmetic.vector(powers)
}

/** The weight about a centre: w(c + u) = sum of coefficients[j] (u/unit)^j, up to `remainder` for each integer. */
interface LocalTaylor<N> {
  coefficients: N[]
  /** unit/step is 2^scale, so that the moments are brought to size exactly. */
  scale: number
  remainder: N
}

function taylor<N>(
  arithmetic: Arithmetic<N>,
  expansion: WeightExpansion,
  rows: readonly Weights[],
  block: MomentBlock,
  logCentre: N,
  powers: Vector<N>,
): LocalTaylor<N> {
  const { centre, reach, step } = block
  // unit >= reach
  const scale = bitLength(BigInt(Math.ceil(reach / step) - 1))
  const ratio = arithmetic.rational({ num: BigInt(step) << BigInt(scale), den: BigInt(centre) })
  const atCentre = weightAt(arithmetic, expansion.weight, centre, logCentre)
  const order = orderOf(block)
  let value = atCentre
  const coefficients = Array.from({ length: order + 1 }, (_, j) => {
    const coefficient = arithmetic.multiply(value, arithmetic.dot(rows[j], powers))
    value = arithmetic.multiply(value, ratio)
    return coefficient
  })
  // w(c) (4 reach/3 c)^(order+1) remainderFactor for each integer.
  const { remainderFactor } = expansion
  const exponent = BigInt(order + 1)
  const remainder = arithmetic.scale(atCentre, {
    num: BigInt(4 * reach) ** exponent * remainderFactor.num,
    den: BigInt(3 * centre) ** exponent * remainderFactor.den,
  })
  return { coefficients, scale, remainder }
}

/** The sum over the integers of one class: sum of coefficients[j] moments[j] 2^(-scale j), and the remainders (S-3). */
function classSum<N>(arithmetic: Arithmetic<N>, { coefficients, scale, remainder }: LocalTaylor<N>, moments: readonly bigint[]): N {
  const terms = moments.map((moment, j) => arithmetic.scale(coefficients[j], { num: moment, den: 1n << BigInt(scale * j) }))
  const sum = terms.reduce((total, term) => arithmetic.add(total, term))
  return arithmetic.addError(sum, arithmetic.scale(remainder, { num: moments[0], den: 1n }))
}
