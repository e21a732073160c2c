import { describe, expect, it } from 'vitest'
import { type Arithmetic, certainlyLess, contains, magnitudeUpper, makeWeights, overlaps, radius } from '../../shared/engine/arithmetic/arithmetic.ts'
import { createArithmetic } from '../../shared/engine/arithmetic/choose.ts'
import { type Rational, add, compare, divide, dyadic, magnitude, multiply, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { Random } from '../support/random.ts'

const random = new Random()
const seed = `seed ${random.seed}`

/** An interval and an exact member of it, with a radius from nothing to much. */
function sample<N>(a: Arithmetic<N>): { x: N; member: Rational } {
  const middle = rational(random.signed(a.precision + 40), 1n << BigInt(a.precision - random.whole(0, 20)))
  const spread = random.whole(0, 2) === 0 ? rational(0) : rational(random.big(30), 1n << BigInt(random.whole(20, a.precision)))
  const share = rational(random.whole(-100, 100), 100)
  return { x: a.between(subtract(middle, spread), add(middle, spread)), member: add(middle, multiply(spread, share)) }
}

for (const name of ['ball', 'mpfr'] as const) {
  describe(`the ${name} arithmetic`, () => {
    it.each([64, 130, 333])('contains the exact results of field operations at %i bits', async (precision) => {
      const a = await createArithmetic(name, precision)
      for (let i = 0; i < 800; i++) {
        a.frame(() => {
          const [one, two] = [sample(a), sample(a)]
          const q = random.fraction(60)
          const error = a.between(rational(-1, 3), rational(1, 7))
          expect(contains(a, a.add(one.x, two.x), add(one.member, two.member)), seed).toBe(true)
          expect(contains(a, a.subtract(one.x, two.x), subtract(one.member, two.member)), seed).toBe(true)
          expect(contains(a, a.multiply(one.x, two.x), multiply(one.member, two.member)), seed).toBe(true)
          expect(contains(a, a.negate(one.x), multiply(one.member, rational(-1))), seed).toBe(true)
          expect(contains(a, a.scale(one.x, q), multiply(one.member, q)), seed).toBe(true)
          expect(contains(a, a.addError(one.x, error), add(one.member, rational(1, 3))), seed).toBe(true)
          expect(contains(a, a.addError(one.x, error), subtract(one.member, rational(1, 3))), seed).toBe(true)
          const [lo, hi] = a.fixedBounds(one.x)
          expect(compare(dyadic(lo, precision), one.member) <= 0 && compare(one.member, dyadic(hi, precision)) <= 0, seed).toBe(true)
          if (!contains(a, two.x, rational(0))) {
            expect(contains(a, a.divide(one.x, two.x), divide(one.member, two.member)), seed).toBe(true)
          } else {
            expect(() => a.divide(one.x, two.x), seed).toThrow(RangeError)
          }
        })
      }
    })

    it('contains products, weighted sums and Euler products of vectors', async () => {
      const a = await createArithmetic(name, 128)
      for (let i = 0; i < 200; i++) {
        a.frame(() => {
          const items = Array.from({ length: 12 }, () => rational(random.big(60), 1n << 60n))
          const v = a.vector(items.map((q) => a.rational(q)))
          const cube = a.multiplyVectors(a.multiplyVectors(v, v), v)
          items.forEach((q, index) => expect(contains(a, a.item(cube, index), multiply(q, multiply(q, q))), seed).toBe(true))
          const weights = makeWeights(items.map(() => random.signed(100)), random.big(90) + 1n)
          const exact = items.reduce((total, q, index) => add(total, multiply(q, rational(weights.numerators[index], weights.divisor))), rational(0))
          expect(contains(a, a.dot(weights, v), exact), seed).toBe(true)
          const product = items.slice(0, 7).reduce((total, q) => multiply(total, subtract(rational(1), q)), rational(1))
          expect(contains(a, a.eulerProduct(v, 7), product), seed).toBe(true)
          expect(compare(radius(a, a.eulerProduct(v, 7)), dyadic(100n, 128)) < 0, seed).toBe(true)
        })
      }
      expect(() => a.vector([a.rational(rational(-1, 2))])).toThrow(RangeError)
    })

    it('keeps its radii as small as the operations allow', async () => {
      const a = await createArithmetic(name, 200)
      const unit = dyadic(1n, 200)
      const [x, y] = [a.rational(rational(2, 3)), a.rational(rational(5, 7))]
      for (const result of [a.multiply(x, y), a.divide(x, y), a.exp(x), a.log(x), a.pi(), a.timesExp(x, y), a.scale(x, rational(1, 3))]) {
        expect(compare(radius(a, result), multiply(unit, rational(16))) <= 0).toBe(true)
      }
    })

    it('answers order and meeting only where they are certain', async () => {
      const a = await createArithmetic(name, 64)
      const [low, wide, high] = [a.rational(rational(1)), a.between(rational(1, 2), rational(3)), a.rational(rational(4))]
      expect([certainlyLess(a, low, high), certainlyLess(a, low, wide), certainlyLess(a, wide, low)]).toEqual([true, false, false])
      expect([overlaps(a, low, wide), overlaps(a, low, high)]).toEqual([true, false])
      expect(compare(magnitudeUpper(a, a.between(rational(-5), rational(2))), rational(5))).toBe(0)
    })

    it('refuses logarithms and exponentials where they have no enclosure', async () => {
      const a = await createArithmetic(name, 64)
      expect(() => a.log(a.rational(rational(0)))).toThrow(RangeError)
      expect(() => a.log(a.between(rational(-1, 10), rational(1)))).toThrow(RangeError)
    })
  })
}

describe('numbers of the mpfr arithmetic', () => {
  it('throw when used after their frame, unless they were kept', async () => {
    const a = await createArithmetic('mpfr', 64)
    let lost: unknown
    let kept: unknown
    a.frame(() => {
      lost = a.rational(rational(1, 3))
      kept = a.keep(() => a.rational(rational(1, 3)))
    })
    expect(() => a.add(lost, lost)).toThrow('after its frame')
    expect(contains(a, a.scale(kept, rational(3)), rational(1))).toBe(true)
  })

  it('of a frame inside another end with it, and leave those around it as they were', async () => {
    const a = await createArithmetic('mpfr', 64)
    const third = rational(1, 3)
    a.frame(() => {
      const outer = a.rational(third)
      let lost: unknown
      a.frame(() => {
        const inner = a.rational(rational(2, 3))
        expect(contains(a, a.add(outer, inner), rational(1))).toBe(true)
        lost = inner
      })
      expect(() => a.add(outer, lost)).toThrow('after its frame')
      expect(() => a.frame(() => { throw new Error('midway') })).toThrow('midway')
      a.keep(() => a.frame(() => Array.from({ length: 8 }, () => a.rational(rational(5)))).length)
      expect(contains(a, outer, third) && !contains(a, outer, rational(5))).toBe(true)
    })
  })

  it('take integers of any size', async () => {
    const a = await createArithmetic('mpfr', 64)
    for (const bits of [31n, 32n, 64n, 4_000n, 20_000n]) {
      for (const n of [1n << bits, -(1n << bits), (1n << bits) - 1n, 3n ** bits]) {
        const q = { num: n, den: 5n }
        expect(contains(a, a.rational(q), q)).toBe(true)
        expect(contains(a, a.scale(a.rational({ num: 1n, den: n < 0n ? -n : n }), { num: n, den: 1n << bits }), rational(n < 0n ? -1n : 1n, 1n << bits))).toBe(true)
      }
    }
  })
})

describe('two precisions', () => {
  it('meet, the finer one inside four radii of the coarser', async () => {
    const [coarse, fine] = [await createArithmetic('ball', 80), await createArithmetic('ball', 400)]
    for (let i = 0; i < 1000; i++) {
      const q = random.fraction(40)
      const exponent = rational(random.signed(60), 1n << 55n)
      for (const evaluate of [(a: typeof coarse) => a.exp(a.rational(exponent)), (a: typeof coarse) => a.log(a.rational(add(magnitude(q), rational(1, 1000))))]) {
        const [x, y] = [evaluate(coarse), evaluate(fine)]
        expect(compare(coarse.lower(x), fine.upper(y)) <= 0 && compare(fine.lower(y), coarse.upper(x)) <= 0, `${seed} at ${q.num}/${q.den}`).toBe(true)
      }
    }
  })
})
