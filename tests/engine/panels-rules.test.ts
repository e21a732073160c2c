import { describe, expect, it } from 'vitest'
import { contains } from '../../shared/engine/arithmetic/arithmetic.ts'
import { type Ball, createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { type Rational, add, divide, dyadic, multiply, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { ellipseParameter, leftEnd, powerUpper } from '../../shared/engine/methods/panels-bounds.ts'
import { type GaussNode, areDescending, gaussNode, spareBits } from '../../shared/engine/series/gauss-legendre.ts'
import { createProductRule, legendreMoments } from '../../shared/engine/series/legendre-moments.ts'

const BITS = 160

/** The nodes >= 0 of the n-point rule, in a ball arithmetic fine enough for them. */
function rule(n: number) {
  const wide = createBallArithmetic(BITS + spareBits(n))
  return { wide, nodes: Array.from({ length: Math.ceil(n / 2) }, (_, index) => gaussNode(wide, n, index, BITS)) }
}

/** The node +x or -x as a ball. */
function place(wide: ReturnType<typeof rule>['wide'], node: GaussNode<Ball>, sign: 1 | -1): Ball {
  const centre = sign === 1 ? node.centre : -node.centre
  return wide.between(dyadic(centre - node.reach, BITS), dyadic(centre + node.reach, BITS))
}

function power(a: ReturnType<typeof rule>['wide'], x: Ball, exponent: number): Ball {
  let value = a.rational(rational(1))
  for (let i = 0; i < exponent; i++) value = a.multiply(value, x)
  return value
}

describe('Gauss-Legendre', () => {
  // Gauss 1814: the rule is exact for polynomials of degree 2n - 1; the integrals are exact rationals.
  it.each([2, 3, 4, 7, 12, 25, 40])('%i nodes integrate x^l, l < 2n, exactly', (n) => {
    const { wide, nodes } = rule(n)
    for (let l = 0; l < 2 * n; l++) {
      let total = wide.rational(rational(0))
      nodes.forEach((node, index) => {
        for (const sign of 2 * index + 1 === n ? ([1] as const) : ([1, -1] as const)) {
          total = wide.add(total, wide.multiply(node.weight, power(wide, place(wide, node, sign), l)))
        }
      })
      expect(contains(wide, total, l % 2 === 0 ? rational(2, l + 1) : rational(0))).toBe(true)
      expect(total.rad < 1n << BigInt(wide.precision - BITS + 40)).toBe(true)
    }
  })

  it('does not integrate x^2n: its error is the known one', () => {
    // Abramowitz & Stegun 25.4.30 with f = x^2n: 2^(2n+1) (n!)^4 / ((2n+1) ((2n)!)^2) (from memory), n = 3: 8/175.
    const { wide, nodes } = rule(3)
    const total = [0, 1].flatMap((index) => (index === 1 ? ([1] as const) : ([1, -1] as const)).map((sign) => ({ node: nodes[index], sign })))
      .reduce((sum, { node, sign }) => wide.add(sum, wide.multiply(node.weight, power(wide, place(wide, node, sign), 6))), wide.rational(rational(0)))
    expect(contains(wide, total, subtract(rational(2, 7), rational(8, 175)))).toBe(true)
  })

  it('has the nodes and weights of Abramowitz & Stegun, Table 25.4, n = 10 (from memory)', () => {
    const { wide, nodes } = rule(10)
    const printed = [[0.973906528517172, 0.066671344308688], [0.865063366688985, 0.149451349150581], [0.679409568299024, 0.219086362515982],
      [0.433395394129247, 0.269266719309996], [0.148874338981631, 0.295524224714753]]
    nodes.forEach((node, index) => {
      expect(Number(node.centre >> BigInt(BITS - 50)) / 2 ** 50).toBeCloseTo(printed[index][0], 14)
      expect(Number(node.weight.mid >> BigInt(wide.precision - 50)) / 2 ** 50).toBeCloseTo(printed[index][1], 14)
    })
    expect(areDescending(nodes)).toBe(true)
  })

  it('refuses what it cannot prove', () => {
    const coarse = createBallArithmetic(60)
    expect(() => gaussNode(coarse, 60, 3, 60)).toThrow(RangeError)
    const { nodes } = rule(6)
    expect(areDescending([nodes[0], nodes[0]])).toBe(false)
    expect(areDescending([nodes[1], nodes[0]])).toBe(false)
  })

  it('encloses the Legendre polynomials at the node', () => {
    const { wide, nodes } = rule(9)
    for (const node of nodes) {
      const square = wide.multiply(place(wide, node, 1), place(wide, node, 1))
      // P_2 = (3x^2 - 1)/2.
      const second = wide.scale(wide.subtract(wide.scale(square, rational(3)), wide.rational(rational(1))), rational(1, 2))
      const gap = wide.subtract(second, node.legendre[2])
      expect(contains(wide, gap, rational(0))).toBe(true)
      expect(node.legendre).toHaveLength(9)
    }
  })
})

describe('the product rule', () => {
  const exponents: Rational[] = [rational(1), rational(1, 2), rational(5, 2), rational(7, 3), rational(3)]
  it.each(exponents)('integrates x^(beta-1) log(1/x)^i/i! x^l exactly for l < n: 1/(beta + l)^(i+1), beta = $num/$den', (beta) => {
    const [n, logs] = [11, 4]
    const { wide, nodes } = rule(n)
    const a = createBallArithmetic(120)
    const product = createProductRule(a, wide, legendreMoments(wide, n, beta, logs))
    const narrow = (x: Ball): Ball => a.between(wide.lower(x), wide.upper(x))
    const totals = Array.from({ length: n }, () => Array.from({ length: logs + 1 }, () => a.rational(rational(0))))
    nodes.forEach((node, index) => {
      const { plus, minus } = product.atPair(node.legendre.map(narrow))
      for (const [sign, factors] of 2 * index + 1 === n ? ([[1, plus]] as const) : ([[1, plus], [-1, minus]] as const)) {
        const x = narrow(wide.scale(wide.add(wide.rational(rational(1)), place(wide, node, sign)), rational(1, 2)))
        factors.forEach((factor, i) => {
          const weight = a.multiply(a.scale(narrow(node.weight), rational(1, 2)), factor)
          for (let l = 0; l < n; l++) totals[l][i] = a.add(totals[l][i], a.multiply(weight, power(a, x, l)))
        })
      }
    })
    for (let l = 0; l < n; l++) {
      for (let i = 0; i <= logs; i++) {
        const exact = Array.from({ length: i + 1 }).reduce<Rational>((value) => divide(value, add(beta, rational(l))), rational(1))
        expect(contains(a, totals[l][i], exact)).toBe(true)
        expect(totals[l][i].rad < 1n << 20n).toBe(true)
      }
    }
  })

  it('has moments that are the integrals of the polynomials', () => {
    const a = createBallArithmetic(100)
    const moments = legendreMoments(a, 4, rational(3, 2), 1)
    // P*_1 = 2x - 1, P*_2 = 6x^2 - 6x + 1 against x^(1/2): the exact integrals.
    const integral = (l: number): Rational => divide(rational(1), add(rational(3, 2), rational(l)))
    expect(contains(a, moments[0][0], integral(0))).toBe(true)
    expect(contains(a, moments[1][0], subtract(multiply(rational(2), integral(1)), integral(0)))).toBe(true)
    const second = add(subtract(multiply(rational(6), integral(2)), multiply(rational(6), integral(1))), integral(0))
    expect(contains(a, moments[2][0], second)).toBe(true)
    const square = (x: Rational): Rational => multiply(x, x)
    expect(contains(a, moments[1][1], subtract(multiply(rational(2), square(integral(1))), square(integral(0))))).toBe(true)
  })
})

describe('exact helpers of the bounds', () => {
  it('rounds the parameter of an ellipse down', () => {
    // a = 5/4 and 5/3 have rational parameters: 2 and 3.
    for (const [axis, rho] of [[rational(5, 4), 2], [rational(5, 3), 3]] as const) {
      const found = ellipseParameter(axis)
      expect(found.num <= BigInt(rho) * found.den).toBe(true)
      expect((BigInt(rho) * found.den - found.num) << 60n < found.den).toBe(true)
    }
  })

  it('bounds powers on both sides of 1', () => {
    expect(powerUpper(rational(1, 2), rational(1, 4), rational(9))).toEqual(rational(9))
    expect(powerUpper(rational(-1, 2), rational(1, 4), rational(9))).toEqual(rational(4))
    expect(powerUpper(rational(-3, 2), rational(2), rational(9))).toEqual(rational(1))
    expect(powerUpper(rational(2), rational(1, 8), rational(1, 2))).toEqual(rational(1))
  })

  it('finds the left end of an ellipse', () => {
    expect(leftEnd({ from: rational(1), to: rational(4), axis: rational(5, 3) })).toEqual(rational(0))
  })
})
