import { describe, expect, it } from 'vitest'
import { type Arithmetic, contains, overlaps, radius } from '../../shared/engine/arithmetic/arithmetic.ts'
import { type AnyNumber, createArithmetic } from '../../shared/engine/arithmetic/choose.ts'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { type Rational, ONE, add, compare, dyadic, multiply, parseRational, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { etaWeights } from '../../shared/engine/series/borwein.ts'
import { dirichletSeries } from '../../shared/engine/series/families.ts'
import { reciprocalGamma } from '../../shared/engine/series/gamma.ts'
import { PrimeZeta } from '../../shared/engine/series/prime-zeta.ts'
import { symmetricFunction } from '../../shared/engine/series/symmetric.ts'
import { ZetaPoint } from '../../shared/engine/series/zeta.ts'
import { createZetaContext } from '../../shared/engine/series/zeta-context.ts'
import type { SetOfIntegers } from '../../shared/engine/sets/definition.ts'

function pointAt<N>(a: Arithmetic<N>, excess: string, terms = 80, split = 60): PrimeZeta<N> {
  const x = a.rational(parseRational(excess)!)
  return new PrimeZeta(new ZetaPoint(createZetaContext(a, { terms, split }), x, a.log(x)))
}

/** The series of the set at s = 1 + excess, to its own pole's order taken off. */
function seriesAt<N>(a: Arithmetic<N>, set: SetOfIntegers, excess: string, settings?: [number, number]): N {
  const series = dirichletSeries(set, add(ONE, parseRational('1/2')!))!
  series.prepare?.(pointAt(a, excess).point.context as never)
  return series.evaluate(pointAt(a, excess, ...(settings ?? [80, 60])))
}

/** Whether a printed value, truncated to its last digit, is what the interval holds. */
function holdsDigits<N>(a: Arithmetic<N>, x: N, digits: string): boolean {
  const lo = parseDecimal(digits)!
  const unit = rational(1, 10n ** BigInt(digits.length - digits.indexOf('.') - 1))
  return compare(a.lower(x), lo) >= 0 && compare(a.upper(x), add(lo, unit)) < 0
}

describe('the weights of the eta sum', () => {
  it('are those of T_3: 98, -80, 32 over 99', () => {
    expect(etaWeights(3)).toEqual({ numerators: [98n, -80n, 32n], divisor: 99n, absoluteSum: 210n })
  })

  it('divide T_n(3) - T_n(1-2x) by 1 + x for every n', () => {
    for (const n of [1, 2, 5, 20, 77]) {
      const { numerators, divisor } = etaWeights(n)
      // T_n by its recurrence at 3, and at 1 - 2x for x = 2.
      const chebyshev = (y: bigint): bigint => {
        let [a, b] = [1n, y]
        for (let i = 1; i < n; i++) [a, b] = [b, 2n * y * b - a]
        return b
      }
      expect(divisor).toBe(chebyshev(3n))
      expect(numerators.reduceRight((total, c) => total * 2n + c, 0n) * 3n).toBe(divisor - chebyshev(-3n))
    }
  })
})

describe.each(['ball', 'mpfr'] as const)('zeta values by the %s arithmetic', (name) => {
  it('meet zeta(2) = pi^2/6, zeta(4) = pi^4/90, zeta(12) = 691 pi^12/638512875 (Euler)', async () => {
    const a = await createArithmetic(name, 200)
    const { point } = pointAt(a, '1')
    const power = (n: number): AnyNumber => (n === 1 ? a.pi() : a.multiply(a.pi(), power(n - 1)))
    expect(overlaps(a, point.zetaTimesExcess(), a.scale(power(2), rational(1, 6)))).toBe(true)
    expect(overlaps(a, point.zeta(2), a.scale(power(4), rational(1, 90)))).toBe(true)
    expect(overlaps(a, point.zeta(6), a.scale(power(12), rational(691, 638512875)))).toBe(true)
    expect(compare(radius(a, point.zeta(6)), dyadic(1n, 180))).toBe(-1)
  })

  it('go through the pole without loss: (s-1) zeta(s) = 1 + gamma (s-1) + … at s - 1 = 2^-150', async () => {
    const a = await createArithmetic(name, 200)
    const x = dyadic(1n, 150)
    const { point } = pointAt(a, `1/${2n ** 150n}`)
    const value = point.zetaTimesExcess()
    // Euler's constant to 40 digits; Abramowitz & Stegun, Table 1.1. The next term is -gamma_1 x^2, below 2^-300.
    const gamma = parseDecimal('0.5772156649015328606065120900824024310421')!
    const expected = add(ONE, multiply(gamma, x))
    expect(contains(a, a.addError(value, a.rational(dyadic(1n, 190))), expected)).toBe(true)
    expect(compare(radius(a, value), dyadic(1n, 185))).toBe(-1)
  })
})

describe('1/Gamma', () => {
  it('is 1/sqrt(pi) at 1/2 and obeys the recurrence and the duplication formula', async () => {
    const a = await createArithmetic('ball', 180)
    const at = (q: Rational) => reciprocalGamma(a, q)
    const half = at(rational(1, 2))
    expect(overlaps(a, a.multiply(a.multiply(half, half), a.pi()), a.rational(ONE))).toBe(true)
    for (const [num, den] of [[1, 3], [7, 5], [29, 2], [1, 1000]]) {
      const b = rational(num, den)
      expect(overlaps(a, at(b), a.scale(at(add(b, ONE)), b)), `${num}/${den}`).toBe(true)
      // Gamma(b) Gamma(b + 1/2) = 2^(1-2b) sqrt(pi) Gamma(2b).
      const left = a.multiply(at(b), at(add(b, rational(1, 2))))
      const power = a.exp(a.scale(a.log2(), subtract(multiply(rational(2), b), ONE)))
      const right = a.multiply(a.multiply(power, half), at(multiply(rational(2), b)))
      expect(overlaps(a, left, right), `${num}/${den}`).toBe(true)
    }
    expect(compare(a.lower(at(rational(5))), rational(1, 24)) <= 0 && compare(a.upper(at(rational(5))), rational(1, 24)) >= 0).toBe(true)
    expect(() => at(rational(0))).toThrow(RangeError)
  })
})

describe('symmetric functions', () => {
  it('of a few exact numbers are what multiplying out gives', async () => {
    const a = await createArithmetic('ball', 150)
    const numbers = [rational(1, 2), rational(1, 3), rational(1, 5), rational(2, 7)]
    const sum = (items: Rational[]) => items.reduce(add, rational(0))
    const powerSum = (j: number) => a.rational(sum(numbers.map((q) => Array.from({ length: j }, () => q).reduce(multiply))))
    const choose = (k: number, repeated: boolean, from = 0): Rational =>
      k === 0 ? ONE : sum(numbers.slice(from).map((q, i) => multiply(q, choose(k - 1, repeated, from + i + (repeated ? 0 : 1)))))
    for (let k = 0; k <= 6; k++) {
      expect(contains(a, symmetricFunction(a, 'complete', powerSum, [], k), choose(k, true))).toBe(true)
      expect(contains(a, symmetricFunction(a, 'elementary', powerSum, [], k), choose(k, false))).toBe(true)
    }
  })
})

describe('Dirichlet series of sets', () => {
  const exclude: number[] = []
  const sets: SetOfIntegers[] = [
    { kind: 'primes', exclude },
    { kind: 'primes', exclude: [2, 61] },
    { kind: 'almost-primes', k: 3, exclude: [3] },
    { kind: 'squarefree-almost-primes', k: 3, exclude },
    { kind: 'distinct-prime-factors', k: 1, exclude },
    { kind: 'distinct-prime-factors', k: 3, exclude: [2, 67] },
    { kind: 'integers', exclude: [2, 3] },
    { kind: 'squarefree', exclude: [5] },
    { kind: 'smooth', y: 13, exclude: [3] },
  ]

  it.each(sets)('%o is enclosed alike by either arithmetic, with other splits and numbers of terms', async (set) => {
    const [ball, mpfr, fine] = [await createArithmetic('ball', 140), await createArithmetic('mpfr', 140), await createArithmetic('ball', 260)]
    for (const excess of ['1/1000000', '1/7', '2', '90']) {
      const values = [
        [ball, seriesAt(ball, set, excess)],
        [ball, seriesAt(ball, set, excess, [61, 7])],
        [mpfr, seriesAt(mpfr, set, excess, [70, 43])],
        [fine, seriesAt(fine, set, excess, [110, 100])],
      ] as const
      for (const [a, x] of values) {
        for (const [b, y] of values) expect(compare(a.lower(x), b.upper(y)) <= 0, `s = 1 + ${excess}`).toBe(true)
      }
    }
  })

  it('sum the first terms of a rapidly converging series: s = 60', async () => {
    const a = await createArithmetic('ball', 300)
    // Members below 100 of three sets; what follows is below 2 * 100^-59.
    const members: [SetOfIntegers, number[]][] = [
      [{ kind: 'almost-primes', k: 3, exclude: [] }, [8, 12, 18, 20, 27, 28, 30, 42, 44, 45, 50, 52, 63, 66, 68, 70, 75, 76, 78, 92, 98, 99]],
      [{ kind: 'distinct-prime-factors', k: 3, exclude: [] }, [30, 42, 60, 66, 70, 78, 84, 90]],
      [{ kind: 'squarefree-almost-primes', k: 2, exclude: [2] }, [15, 21, 33, 35, 39, 51, 55, 57, 65, 69, 77, 85, 87, 91, 93, 95]],
    ]
    for (const [set, list] of members) {
      const partial = list.reduce((total, n) => add(total, rational(1, BigInt(n) ** 60n)), rational(0))
      const value = seriesAt(a, set, '59', [125, 60])
      expect(contains(a, a.addError(value, a.rational(rational(2, 100n ** 59n))), partial)).toBe(true)
    }
  })

  it('P(2), P(3), P(4) have the digits of Froberg, BIT 8 (1968) 187-202 (checked with PARI/GP)', async () => {
    const a = await createArithmetic('ball', 220)
    const at = pointAt(a, '1', 95, 80)
    expect(holdsDigits(a, at.value(1, []), '0.45224742004106549850654336483224793417323134')).toBe(true)
    expect(holdsDigits(a, at.value(2, []), '0.07699313976424684494261929593315787016204105')).toBe(true)
    expect(holdsDigits(a, pointAt(a, '2', 95, 80).value(1, []), '0.17476263929944353642311331466570670097541212')).toBe(true)
  })
})
