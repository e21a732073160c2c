import type { mpfr_rnd_t } from 'gmp-wasm'
import type { Arithmetic } from './arithmetic.ts'
import { bitLength } from './integers.ts'
import { DOWN, type Interval, MpfrStore, type Pointer, UP } from './mpfr-store.ts'
import { mpfrVectors } from './mpfr-vectors.ts'
import type { Rational } from './rational.ts'

/** What the library takes as a machine integer. */
const SMALL = 1n << 31n

/** n with 2^n = den, null where there is none. */
function powerOfTwo(den: bigint): number | null {
  return (den & (den - 1n)) === 0n ? bitLength(den) - 1 : null
}

/**
 * Intervals with end points by MPFR, whose results are correctly rounded: every operation is done once rounded down and once
 * rounded up. It shares no number code with the ball arithmetic.
 * *Claim*: inclusion, for every operation. *Valid for*: 8 <= precision < 2^19. *Bound*: A-8. *Rounding*: outward.
 */
export async function createMpfrArithmetic(precision: number): Promise<Arithmetic<Interval>> {
  const store = await MpfrStore.open(precision)
  const { g } = store
  const scratch = [store.float(), store.float()]

  /** A new interval from one function for each end point; the arguments are checked for being alive. */
  const make = (args: readonly Interval[], set: (lo: Pointer, hi: Pointer) => void): Interval => {
    for (const arg of args) store.check(arg)
    const result = store.interval()
    set(result.lo, result.hi)
    return result
  }

  const setRational = (to: Pointer, { num, den }: Rational, direction: mpfr_rnd_t): void => {
    if (-SMALL < num && num < SMALL) g.mpfr_set_si(to, Number(num), direction)
    else g.mpfr_set_z(to, store.big(num), direction)
    if (den === 1n) return
    if (den < SMALL) g.mpfr_div_ui(to, to, Number(den), direction)
    else {
      const twos = powerOfTwo(den)
      if (twos === null) g.mpfr_div_z(to, to, store.big(den), direction)
      else g.mpfr_div_2ui(to, to, twos, direction)
    }
  }

  const between = (lo: Rational, hi: Rational): Interval =>
    make([], (low, high) => {
      setRational(low, lo, DOWN)
      setRational(high, hi, UP)
    })

  /** -1 or 1 where all members have that sign or are 0, else 0. */
  const signOf = (x: Interval): number => (g.mpfr_sgn(x.lo) >= 0 ? 1 : g.mpfr_sgn(x.hi) <= 0 ? -1 : 0)

  const multiply = (x: Interval, y: Interval): Interval =>
    make([x, y], (lo, hi) => {
      const [sx, sy] = [signOf(x), signOf(y)]
      if (sx === 0 && sy === 0) {
        g.mpfr_mul(scratch[0], x.lo, y.hi, DOWN)
        g.mpfr_mul(lo, x.hi, y.lo, DOWN)
        g.mpfr_min(lo, lo, scratch[0], DOWN)
        g.mpfr_mul(scratch[0], x.lo, y.lo, UP)
        g.mpfr_mul(hi, x.hi, y.hi, UP)
        g.mpfr_max(hi, hi, scratch[0], UP)
        return
      }
      // The extremes are taken at end points that the signs alone decide.
      g.mpfr_mul(lo, sy > 0 || (sy === 0 && sx < 0) ? x.lo : x.hi, sx > 0 || (sx === 0 && sy < 0) ? y.lo : y.hi, DOWN)
      g.mpfr_mul(hi, sy > 0 || (sy === 0 && sx > 0) ? x.hi : x.lo, sx > 0 || (sx === 0 && sy > 0) ? y.hi : y.lo, UP)
    })

  const arithmetic: Arithmetic<Interval> = {
    name: 'mpfr',
    precision,
    rational: (q) => between(q, q),
    between,

    negate: (x) => make([x], (lo, hi) => (g.mpfr_neg(lo, x.hi, DOWN), g.mpfr_neg(hi, x.lo, UP))),
    add: (x, y) => make([x, y], (lo, hi) => (g.mpfr_add(lo, x.lo, y.lo, DOWN), g.mpfr_add(hi, x.hi, y.hi, UP))),
    subtract: (x, y) => make([x, y], (lo, hi) => (g.mpfr_sub(lo, x.lo, y.hi, DOWN), g.mpfr_sub(hi, x.hi, y.lo, UP))),
    multiply,
    divide: (x, y) => {
      store.check(y)
      if (g.mpfr_sgn(y.lo) * g.mpfr_sgn(y.hi) <= 0) throw new RangeError('division by an interval that contains 0')
      const inverse = make([y], (lo, hi) => (g.mpfr_ui_div(lo, 1, y.hi, DOWN), g.mpfr_ui_div(hi, 1, y.lo, UP)))
      return multiply(x, inverse)
    },
    scale: (x, { num, den }) =>
      make([x], (lo, hi) => {
        const [low, high] = num < 0n ? [x.hi, x.lo] : [x.lo, x.hi]
        if (-SMALL < num && num < SMALL) {
          g.mpfr_mul_si(lo, low, Number(num), DOWN)
          g.mpfr_mul_si(hi, high, Number(num), UP)
        } else {
          const big = store.big(num)
          g.mpfr_mul_z(lo, low, big, DOWN)
          g.mpfr_mul_z(hi, high, big, UP)
        }
        if (den === 1n) return
        if (den < SMALL) {
          g.mpfr_div_ui(lo, lo, Number(den), DOWN)
          g.mpfr_div_ui(hi, hi, Number(den), UP)
          return
        }
        const twos = powerOfTwo(den)
        if (twos !== null) {
          g.mpfr_div_2ui(lo, lo, twos, DOWN)
          g.mpfr_div_2ui(hi, hi, twos, UP)
          return
        }
        const big = store.big(den)
        g.mpfr_div_z(lo, lo, big, DOWN)
        g.mpfr_div_z(hi, hi, big, UP)
      }),
    addError: (x, error) =>
      make([x, error], (lo, hi) => {
        g.mpfr_abs(scratch[0], error.lo, UP)
        g.mpfr_abs(scratch[1], error.hi, UP)
        g.mpfr_max(scratch[0], scratch[0], scratch[1], UP)
        g.mpfr_sub(lo, x.lo, scratch[0], DOWN)
        g.mpfr_add(hi, x.hi, scratch[0], UP)
      }),

    exp: (x) => make([x], (lo, hi) => (g.mpfr_exp(lo, x.lo, DOWN), g.mpfr_exp(hi, x.hi, UP))),
    timesExp: (y, x) => multiply(y, arithmetic.exp(x)),
    log: (x) => {
      store.check(x)
      if (g.mpfr_sgn(x.lo) <= 0) throw new RangeError('logarithm of an interval that reaches 0')
      return make([x], (lo, hi) => (g.mpfr_log(lo, x.lo, DOWN), g.mpfr_log(hi, x.hi, UP)))
    },
    pi: () => make([], (lo, hi) => (g.mpfr_const_pi(lo, DOWN), g.mpfr_const_pi(hi, UP))),
    log2: () => make([], (lo, hi) => (g.mpfr_const_log2(lo, DOWN), g.mpfr_const_log2(hi, UP))),

    ...mpfrVectors(store),

    lower: (x) => (store.check(x), store.exact(x.lo)),
    upper: (x) => (store.check(x), store.exact(x.hi)),
    fixedBounds: (x) => {
      store.check(x)
      return [store.scaledInteger(x.lo, scratch[0], DOWN), store.scaledInteger(x.hi, scratch[0], UP)]
    },
    frame: (work) => store.frame(work),
    keep: (work) => store.keep(work),
  }
  return arithmetic
}
