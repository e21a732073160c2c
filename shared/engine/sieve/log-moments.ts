import { type Arithmetic, type Vector, type Weights, magnitudeUpper, makeWeights } from '../arithmetic/arithmetic.ts'
import { bitLength, factorial } from '../arithmetic/integers.ts'
import { ONE, type Rational, ZERO, compare, floor, multiply, rational } from '../arithmetic/rational.ts'
import type { MomentBlock, MomentSet } from './moments.ts'
import { HIGHEST_ORDER } from './prime-moments.ts'
import { expandWeight } from './weight.ts'

/**
 * Primes gathered by their logarithms: bin i holds those with log p a little above lambda = i/32 - 1/128, by the sums of
 * (log p - lambda)^a / a!, a = 0 … LOG_ORDER, which are positive. From these sum p^-s follows for any s that is not large (S-8).
 */
const BINS_PER_UNIT = 32
export const LOG_ORDER = 12
/** 0 <= log p - lambda <= this in every bin: its width, the shift, half a block, and room for the rounding of log p. */
const BIN_REACH = rational(3, 64)
/** Primes below this stay single. */
export const LOG_BINS_FROM = 1_024

/** For each bin the ends of its sums, in units of 2^-precision. */
export type LogBins = Map<number, [bigint, bigint][]>

const lambdaOf = (bin: number): Rational => rational(4 * bin - 1, 4 * BINS_PER_UNIT)

/** [d^j] log(1 + d)^b / b!: numerators[j]/divisor for each b. */
const COLUMNS = Array.from({ length: HIGHEST_ORDER + 1 }, (_, b) => {
  // The expansion of (log t)^b about log c = 1/y is sum C(b, i) y^(i - b) log(1 + d)^i: its column i = b is what is wanted.
  const { numerators, denominator } = expandWeight({ power: ZERO, logPower: rational(-b) }, HIGHEST_ORDER)
  return { numerators: numerators.map((row) => row[b] ?? 0n), divisor: denominator * factorial(b) }
})
/** (7/5)^b / b! */
const DIVIDED_LOG_FOUR = COLUMNS.map((_, b) => rational(7n ** BigInt(b), 5n ** BigInt(b) * factorial(b)))

/**
 * Adds a batch of primes to the bins; those below LOG_BINS_FROM are left out.
 * *Claim*: inclusion. *Valid for*: blocks as primeMoments makes them. *Bound*: S-8. *Rounding*: the ends outward.
 */
export function addToBins<N>(arithmetic: Arithmetic<N>, batch: MomentSet, bins: LogBins): void {
  const addAt = (n: number, local: (offset: N) => N[]) => {
    const { bin, ends } = arithmetic.frame(() => {
      const logN = arithmetic.log(arithmetic.rational(rational(n)))
      const bin = Number(floor(multiply(arithmetic.lower(logN), rational(BINS_PER_UNIT))))
      const parts = local(arithmetic.subtract(logN, arithmetic.rational(lambdaOf(bin))))
      return { bin, ends: parts.map((part) => arithmetic.fixedBounds(part)) }
    })
    mergeBin(bins, bin, ends)
  }
  for (const p of batch.singles[0]) {
    if (p > LOG_BINS_FROM) addAt(p, (offset) => dividedPowers(arithmetic, offset, LOG_ORDER))
  }
  for (const block of batch.blocks) addAt(block.centre, (offset) => blockLogSums(arithmetic, block, offset))
}

/** Adds sums to those of a bin. */
export function mergeBin(bins: LogBins, bin: number, ends: readonly [bigint, bigint][]): void {
  const known = bins.get(bin)
  if (!known) return void bins.set(bin, ends.map(([lo, hi]) => [lo, hi]))
  known.forEach((sum, a) => {
    sum[0] += ends[a][0]
    sum[1] += ends[a][1]
  })
}

/** 1, x, x^2/2!, …, x^highest/highest!. */
function dividedPowers<N>(arithmetic: Arithmetic<N>, x: N, highest: number): N[] {
  const powers = [arithmetic.rational(ONE)]
  for (let k = 1; k <= highest; k++) {
    const product = arithmetic.multiply(powers[k - 1], x)
    powers.push(k === 1 ? product : arithmetic.scale(product, rational(1, k)))
  }
  return powers
}

/**
 * The sums of (offset + m)^a / a! over a block, m = log(p/centre), by the binomial theorem: from nu_b, the sum of m^b / b!,
 * which the moments give for b <= order, and for the higher b from |m| <= reach/centre * 101/100.
 */
function blockLogSums<N>(arithmetic: Arithmetic<N>, block: MomentBlock, offset: N): N[] {
  const order = block.classes[0].length - 1
  const count = { num: block.classes[0][0], den: 1n }
  const ratio = ratioOf(arithmetic, block)
  const local = localLogSums(arithmetic, block, ratio)
  const offsets = dividedPowers(arithmetic, offset, LOG_ORDER)
  const small = arithmetic.scale(ratio, rational(101, 100))
  const whole = arithmetic.add(arithmetic.rational(magnitudeUpper(arithmetic, offset)), small)
  const tops = dividedPowers(arithmetic, whole, LOG_ORDER - order - 1)
  const left = arithmetic.scale(dividedPowers(arithmetic, small, order + 1)[order + 1], count)
  return offsets.map((_, a) => {
    let sum = arithmetic.multiply(offsets[a], local[0])
    for (let b = 1; b <= Math.min(a, order); b++) sum = arithmetic.add(sum, arithmetic.multiply(offsets[a - b], local[b]))
    return a <= order ? sum : arithmetic.addError(sum, arithmetic.multiply(tops[a - order - 1], left))
  })
}

/** unit/centre, unit being the least 2^i steps that reach. */
function ratioOf<N>(arithmetic: Arithmetic<N>, { centre, reach, step }: MomentBlock): N {
  return arithmetic.rational({ num: BigInt(step) << BigInt(scaleOf(reach, step)), den: BigInt(centre) })
}

const scaleOf = (reach: number, step: number): number => bitLength(BigInt(Math.ceil(reach / step) - 1))

/** nu_0, …, nu_order (S-8). */
function localLogSums<N>(arithmetic: Arithmetic<N>, { centre, reach, step, classes: [moments] }: MomentBlock, ratio: N): N[] {
  const order = moments.length - 1
  const scale = scaleOf(reach, step)
  let power = arithmetic.rational(ONE)
  // scaled[j] = sum of ((p - centre)/centre)^j.
  const scaled = moments.map((moment, j) => {
    if (j > 0) power = arithmetic.multiply(power, ratio)
    return arithmetic.scale(power, { num: moment, den: 1n << BigInt(scale * j) })
  })
  // The terms j > order add to the sum of m^b at most (4 reach/3 centre)^(order+1) (log 4)^b for each prime, log 4 < 7/5.
  const exponent = BigInt(order + 1)
  const remainder = arithmetic.rational({ num: moments[0] * BigInt(4 * reach) ** exponent, den: BigInt(3 * centre) ** exponent })
  return scaled.map((count, b) => {
    if (b === 0) return count
    const { numerators, divisor } = COLUMNS[b]
    let sum = arithmetic.scale(scaled[b], { num: numerators[b], den: divisor })
    for (let j = b + 1; j <= order; j++) sum = arithmetic.add(sum, arithmetic.scale(scaled[j], { num: numerators[j], den: divisor }))
    return arithmetic.addError(sum, arithmetic.scale(remainder, DIVIDED_LOG_FOUR[b]))
  })
}

/** Largest exponent at which the bins are used. */
export const LARGEST_EXPONENT = 8

/** All bins as numbers, for many exponents. */
export class BinTable<N> {
  /** e^-lambda for every bin. */
  readonly inverses: Vector<N>
  private readonly arithmetic: Arithmetic<N>
  private readonly indices: readonly number[]
  /** sums[a] holds e^-lambda times the a-th sum of every bin: below 1, as they are to the sum of 1/p. */
  private readonly sums: readonly Vector<N>[]
  private readonly total: Weights

  constructor(arithmetic: Arithmetic<N>, bins: LogBins) {
    this.arithmetic = arithmetic
    this.indices = [...bins.keys()].sort((a, b) => a - b)
    const inverses = this.decays(arithmetic.rational(ONE))
    this.inverses = arithmetic.vector(inverses)
    const den = 1n << BigInt(arithmetic.precision)
    this.sums = Array.from({ length: LOG_ORDER + 1 }, (_, a) =>
      arithmetic.vector(
        this.indices.map((index, i) => {
          const [lo, hi] = bins.get(index)![a]
          const share = arithmetic.multiply(arithmetic.between({ num: lo, den }, { num: hi, den }), inverses[i])
          return arithmetic.between(positive(arithmetic.lower(share)), arithmetic.upper(share))
        }),
      ),
    )
    this.total = makeWeights(this.indices.map(() => 1n), 1n)
  }

  /** e^(-y lambda) for every bin, y >= 0. */
  factors(y: N): Vector<N> {
    return this.arithmetic.vector(this.decays(y))
  }

  /**
   * The sum of p^-sigma over the primes in the bins, `factors` being those for sigma - 1.
   * *Claim*: contains it. *Valid for*: 1 <= sigma <= LARGEST_EXPONENT. *Bound*: S-8.
   */
  powerSum(sigma: N, factors: Vector<N>): N {
    const { arithmetic, sums, total } = this
    if (compare(arithmetic.upper(sigma), rational(LARGEST_EXPONENT)) > 0) throw new RangeError('exponent too large for the bins')
    const parts = sums.map((vector) => arithmetic.dot(total, arithmetic.multiplyVectors(factors, vector)))
    const minus = arithmetic.negate(sigma)
    let sum = parts[LOG_ORDER]
    for (let a = LOG_ORDER - 1; a >= 0; a--) sum = arithmetic.add(arithmetic.multiply(sum, minus), parts[a])
    // |sum over a > LOG_ORDER of (sigma r)^a / a!| <= 3/2 (sigma r)^(LOG_ORDER+1)/(LOG_ORDER+1)!, as sigma r <= 3/8.
    const reach = arithmetic.scale(sigma, BIN_REACH)
    const left = arithmetic.scale(dividedPowers(arithmetic, reach, LOG_ORDER + 1)[LOG_ORDER + 1], rational(3, 2))
    return arithmetic.addError(sum, arithmetic.multiply(left, parts[0]))
  }

  private decays(y: N): N[] {
    const { arithmetic, indices } = this
    const minus = arithmetic.negate(y)
    const stride = arithmetic.exp(arithmetic.scale(minus, rational(1, BINS_PER_UNIT)))
    const decays: N[] = []
    indices.forEach((index, i) => {
      const follows = i > 0 && index === indices[i - 1] + 1
      decays.push(follows ? arithmetic.multiply(decays[i - 1], stride) : arithmetic.exp(arithmetic.scale(minus, lambdaOf(index))))
    })
    return decays
  }
}

const positive = (a: Rational): Rational => (a.num > 0n ? a : ZERO)
