import type { Arithmetic, Vector, Weights } from './arithmetic.ts'
import { bitLength } from './integers.ts'
import { DOWN, type Interval, type MpfrStore, type Pointer, UP } from './mpfr-store.ts'

interface MpfrVector extends Vector<Interval> {
  readonly items: readonly Interval[]
}

/** Weights as floats that hold them exactly, with their signs; `ones` where all are 1. */
interface ExactWeights {
  readonly floats: readonly Pointer[]
  readonly signs: readonly number[]
  readonly ones: boolean
}

/** Operations on many numbers in [0, 1], for the MPFR arithmetic: end points are not negative, so that products need no cases. */
export function mpfrVectors(
  store: MpfrStore,
): Pick<Arithmetic<Interval>, 'vector' | 'multiplyVectors' | 'item' | 'dot' | 'eulerProduct'> {
  const { g } = store
  const known = new WeakMap<Weights, ExactWeights>()
  const factor = store.float()

  const exactWeights = (weights: Weights): ExactWeights => {
    let found = known.get(weights)
    if (!found) {
      const floats = weights.numerators.map((n) => {
        const pointer = store.float(Math.max(2, bitLength(n)))
        g.mpfr_set_z(pointer, store.big(n), DOWN)
        return pointer
      })
      const signs = weights.numerators.map((n) => (n < 0n ? -1 : n > 0n ? 1 : 0))
      found = { floats, signs, ones: weights.numerators.every((n) => n === 1n) }
      known.set(weights, found)
    }
    return found
  }

  return {
    vector: (items) => {
      for (const item of items) {
        store.check(item)
        if (g.mpfr_sgn(item.lo) < 0 || g.mpfr_cmp_ui(item.lo, 1) > 0) throw new RangeError('a vector holds numbers in [0, 1]')
      }
      const vector: MpfrVector = { length: items.length, items }
      return vector
    },
    multiplyVectors: (a, b) => {
      const [x, y] = [(a as MpfrVector).items, (b as MpfrVector).items]
      const length = Math.min(x.length, y.length)
      const items: Interval[] = []
      for (let i = 0; i < length; i++) {
        store.check(x[i])
        store.check(y[i])
        const product = store.interval()
        g.mpfr_mul(product.lo, x[i].lo, y[i].lo, DOWN)
        g.mpfr_mul(product.hi, x[i].hi, y[i].hi, UP)
        items.push(product)
      }
      const vector: MpfrVector = { length, items }
      return vector
    },
    item: (v, index) => (v as MpfrVector).items[index],
    dot: (weights, v) => {
      const { items } = v as MpfrVector
      const { floats, signs, ones } = exactWeights(weights)
      const total = store.interval()
      g.mpfr_set_zero(total.lo, 1)
      g.mpfr_set_zero(total.hi, 1)
      for (let i = Math.min(items.length, floats.length) - 1; i >= 0; i--) {
        if (signs[i] === 0) continue
        store.check(items[i])
        const { lo, hi } = items[i]
        if (ones) {
          g.mpfr_add(total.lo, total.lo, lo, DOWN)
          g.mpfr_add(total.hi, total.hi, hi, UP)
          continue
        }
        g.mpfr_fma(total.lo, floats[i], signs[i] > 0 ? lo : hi, total.lo, DOWN)
        g.mpfr_fma(total.hi, floats[i], signs[i] > 0 ? hi : lo, total.hi, UP)
      }
      if (weights.divisor === 1n) return total
      const divisor = store.big(weights.divisor)
      g.mpfr_div_z(total.lo, total.lo, divisor, DOWN)
      g.mpfr_div_z(total.hi, total.hi, divisor, UP)
      return total
    },
    eulerProduct: (v, count) => {
      const { items } = v as MpfrVector
      const product = store.interval()
      g.mpfr_set_si(product.lo, 1, DOWN)
      g.mpfr_set_si(product.hi, 1, UP)
      for (let i = 0; i < count; i++) {
        store.check(items[i])
        g.mpfr_ui_sub(factor, 1, items[i].hi, DOWN)
        // An upper end above 1 is rounding only: the factor itself is not negative.
        if (g.mpfr_sgn(factor) < 0) g.mpfr_set_zero(factor, 1)
        g.mpfr_mul(product.lo, product.lo, factor, DOWN)
        g.mpfr_ui_sub(factor, 1, items[i].lo, UP)
        g.mpfr_mul(product.hi, product.hi, factor, UP)
      }
      return product
    },
  }
}
