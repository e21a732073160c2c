import type { Arithmetic, Vector, Weights } from './arithmetic.ts'
import { log2Fixed, piFixed } from './constants.ts'
import { expFixed } from './exponential.ts'
import { abs, ceilDivide, ceilShift, floorDivide, floorShift, max } from './integers.ts'
import { logFixed } from './logarithm.ts'
import { type Rational, ceilScaled, dyadic, floorScaled } from './rational.ts'

/** The interval [(mid - rad) 2^-p, (mid + rad) 2^-p], p being the precision of the arithmetic that made it; rad >= 0. */
export interface Ball {
  readonly mid: bigint
  readonly rad: bigint
}

/** Midpoints in [0, 1] with one radius for all: bulk accounting for the inner loops. */
interface BallVector extends Vector<Ball> {
  readonly mids: readonly bigint[]
  readonly rad: bigint
}

/**
 * Ball arithmetic on BigInt in fixed point: midpoint and radius are integers in units of 2^-precision.
 * *Claim*: inclusion, for every operation. *Valid for*: 8 <= precision < 2^19. *Bound*.
 * *Rounding*: midpoints are rounded down by less than one unit and one unit is added to the radius; radii are rounded up.
 */
export function createBallArithmetic(precision: number): Arithmetic<Ball> {
  const p = BigInt(precision)
  const one = 1n << p

  const between = (lo: Rational, hi: Rational): Ball => {
    const [low, high] = [floorScaled(lo, precision), ceilScaled(hi, precision)]
    const mid = (low + high) >> 1n
    return { mid, rad: max(mid - low, high - mid) }
  }

  /** e^x for the whole ball, as a ball in units of 2^(exponent - precision). A-5 and e^r - 1 <= 2r for r <= 1. */
  const expScaled = (x: Ball): { ball: Ball; exponent: number } => {
    if (x.rad > one) throw new RangeError('exp of an interval wider than 2')
    const { mantissa, exponent } = expFixed(x.mid, precision)
    return { ball: { mid: mantissa, rad: x.rad === 0n ? 1n : (((mantissa + 1n) * 2n * x.rad) >> p) + 2n }, exponent }
  }

  return {
    name: 'ball',
    precision,

    rational: (q) => between(q, q),
    between,

    negate: (x) => ({ mid: -x.mid, rad: x.rad }),
    add: (x, y) => ({ mid: x.mid + y.mid, rad: x.rad + y.rad }),
    subtract: (x, y) => ({ mid: x.mid - y.mid, rad: x.rad + y.rad }),
    multiply: (x, y) => ({
      mid: (x.mid * y.mid) >> p,
      // One unit for the midpoint, one for the shift of the radius.
      rad: ((abs(x.mid) * y.rad + abs(y.mid) * x.rad + x.rad * y.rad) >> p) + 2n,
    }),
    divide: (x, y) => {
      const low = abs(y.mid) - y.rad
      if (low <= 0n) throw new RangeError('division by an interval that contains 0')
      const top = y.mid < 0n ? -x.mid : x.mid
      const mid = floorDivide(top << p, abs(y.mid))
      // |x'/y' - x/y| <= (rad x + |x/y| rad y) / |y'| for x' in x, y' in y; |x/y| <= (|mid| + 1) units.
      const spread = (x.rad << p) + (abs(mid) + 1n) * y.rad
      return { mid, rad: ceilDivide(spread, low) + 1n }
    },
    scale: (x, q) => ({ mid: floorDivide(x.mid * q.num, q.den), rad: ceilDivide(x.rad * abs(q.num), q.den) + 1n }),
    addError: (x, error) => ({ mid: x.mid, rad: x.rad + abs(error.mid) + error.rad }),

    exp: (x) => {
      const { ball, exponent } = expScaled(x)
      return { mid: floorShift(ball.mid, -exponent), rad: ceilShift(ball.rad, -exponent) + 1n }
    },
    timesExp: (y, x) => {
      const { ball, exponent } = expScaled(x)
      const shift = precision - exponent
      return {
        mid: floorShift(y.mid * ball.mid, shift),
        rad: ceilShift(abs(y.mid) * ball.rad + y.rad * (ball.mid + ball.rad), shift) + 1n,
      }
    },
    log: (x) => {
      const low = x.mid - x.rad
      if (low <= 0n) throw new RangeError('logarithm of an interval that reaches 0')
      // |log x' - log x| <= |x' - x| / min, and one unit for the rounding.
      return { mid: logFixed(x.mid, precision), rad: x.rad === 0n ? 1n : ceilDivide(x.rad << p, low) + 1n }
    },
    pi: () => ({ mid: piFixed(precision), rad: 1n }),
    log2: () => ({ mid: log2Fixed(precision), rad: 1n }),

    vector: (items) => {
      const vector: BallVector = {
        length: items.length,
        mids: items.map((item) => item.mid),
        rad: items.reduce((largest, item) => max(largest, item.rad), 0n),
      }
      if (vector.mids.some((mid) => mid < 0n || mid > one)) throw new RangeError('a vector holds numbers in [0, 1]')
      return vector
    },
    multiplyVectors: (a, b) => {
      const [x, y] = [a as BallVector, b as BallVector]
      const length = Math.min(x.length, y.length)
      const mids = new Array<bigint>(length)
      for (let i = 0; i < length; i++) mids[i] = (x.mids[i] * y.mids[i]) >> p
      // |ab - a'b'| <= |a - a'| |b| + |a'| |b - b'| <= rad a + rad b, as b and a' are in [0, 1]; one unit for the shift (A-3).
      const product: BallVector = { length, mids, rad: x.rad + y.rad + 1n }
      return product
    },
    item: (v, index) => ({ mid: (v as BallVector).mids[index], rad: (v as BallVector).rad }),
    dot: (weights: Weights, v) => {
      const { mids, rad } = v as BallVector
      const { numerators, divisor } = weights
      const length = Math.min(mids.length, numerators.length)
      let total = 0n
      for (let i = 0; i < length; i++) total += numerators[i] * mids[i]
      return { mid: floorDivide(total, divisor), rad: ceilDivide(weights.absoluteSum * rad, divisor) + 1n }
    },
    eulerProduct: (v, count) => {
      const { mids, rad } = v as BallVector
      let mid = one
      for (let i = 0; i < count; i++) mid = (mid * (one - mids[i])) >> p
      // Each factor is in [0, 1] and known up to rad, each shift costs less than one unit.
      return { mid, rad: BigInt(count) * (rad + 1n) }
    },

    lower: (x) => dyadic(x.mid - x.rad, precision),
    upper: (x) => dyadic(x.mid + x.rad, precision),
    fixedBounds: (x) => [x.mid - x.rad, x.mid + x.rad],
    frame: (work) => work(),
    keep: (work) => work(),
  }
}
