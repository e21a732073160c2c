/** A deliberate fault: one change of one file, and the tests of which some must turn red. */
export interface Fault {
  name: string
  file: string
  /** Must stand in the file exactly once. */
  find: string
  replace: string
  tests: string[]
}

const arithmetic = 'shared/engine/arithmetic'
const series = 'shared/engine/series'
const methods = 'shared/engine/methods'

export const FAULTS: Fault[] = [
  {
    name: 'a product of balls forgets its rounding',
    file: `${arithmetic}/ball.ts`,
    find: 'x.rad * y.rad) >> p) + 2n',
    replace: 'x.rad * y.rad) >> p)',
    tests: ['tests/engine/arithmetic.test.ts'],
  },
  {
    name: 'a quotient of balls forgets the radius of the divisor',
    file: `${arithmetic}/ball.ts`,
    find: '(x.rad << p) + (abs(mid) + 1n) * y.rad',
    replace: '(x.rad << p)',
    tests: ['tests/engine/arithmetic.test.ts'],
  },
  {
    name: 'an upper end is rounded inward',
    file: `${arithmetic}/decimal.ts`,
    find: 'return decimalText(ceilDivide(a.num * 10n ** BigInt(places), a.den), places)',
    replace: 'return decimalText(floorDivide(a.num * 10n ** BigInt(places), a.den), places)',
    tests: ['tests/engine/exact.test.ts'],
  },
  {
    name: 'a lower end is rounded inward',
    file: `${arithmetic}/decimal.ts`,
    find: 'return decimalText(floorDivide(a.num * 10n ** BigInt(places), a.den), places)',
    replace: 'return decimalText(ceilDivide(a.num * 10n ** BigInt(places), a.den), places)',
    tests: ['tests/engine/exact.test.ts'],
  },
  {
    name: 'the exponential has no guard bits',
    file: `${arithmetic}/exponential.ts`,
    find: 'const GUARD = 24',
    replace: 'const GUARD = 0',
    tests: ['tests/engine/elementary.test.ts'],
  },
  {
    name: 'the series of the logarithm stops half-way',
    file: `${arithmetic}/logarithm.ts`,
    find: 'let n = inverseOdd.length - 1',
    replace: 'let n = (inverseOdd.length - 1) >> 1',
    tests: ['tests/engine/elementary.test.ts'],
  },
  {
    name: 'MPFR rounds a lower sum up',
    file: `${arithmetic}/mpfr.ts`,
    find: 'g.mpfr_add(lo, x.lo, y.lo, DOWN)',
    replace: 'g.mpfr_add(lo, x.lo, y.lo, UP)',
    tests: ['tests/engine/arithmetic.test.ts'],
  },
  {
    name: 'the eta sum starts with the wrong sign',
    file: `${series}/borwein.ts`,
    find: 'numerators.push(k % 2 === 0 ? rest : -rest)',
    replace: 'numerators.push(k % 2 === 1 ? rest : -rest)',
    tests: ['tests/engine/zeta.test.ts'],
  },
  {
    name: 'the error of the eta sum is dropped',
    file: `${series}/zeta.ts`,
    find: 'arithmetic.addError(arithmetic.dot(etaSigns, this.etaTerms), etaError)',
    replace: '(void etaError, arithmetic.dot(etaSigns, this.etaTerms))',
    tests: ['tests/engine/zeta.test.ts', 'tests/engine/trapezoid.test.ts', 'tests/engine/expansion.test.ts'],
  },
  {
    name: "Newton's identities divide by the wrong number",
    file: `${series}/symmetric.ts`,
    find: 'known.push(arithmetic.scale(total, rational(1, n)))',
    replace: 'known.push(arithmetic.scale(total, rational(1, n + 1)))',
    tests: ['tests/engine/zeta.test.ts'],
  },
  {
    name: 'squarefree products take the signs of the others',
    file: `${series}/symmetric.ts`,
    find: "kind === 'complete' || j % 2 === 1",
    replace: "kind === 'complete' || j % 2 === 0",
    tests: ['tests/engine/zeta.test.ts'],
  },
  {
    name: 'the prime zeta function stops one step early',
    file: `${series}/prime-zeta.ts`,
    find: 'm * j <= this.order; m++',
    replace: 'm * j < this.order; m++',
    tests: ['tests/engine/zeta.test.ts', 'tests/published/zeta.test.ts', 'tests/engine/trapezoid.test.ts'],
  },
  {
    name: 'the discretisation error of the trapezoid is dropped',
    file: `${methods}/trapezoid-outcome.ts`,
    find: 'const kappa = kappas[level]',
    replace: 'const kappa = rational(0n * kappas[level].num)',
    tests: ['tests/engine/trapezoid.test.ts'],
  },
  {
    name: 'the nodes left out by the trapezoid are forgotten',
    file: `${methods}/trapezoid-outcome.ts`,
    find: 'const most = add(hi, multiply(add(below, above), rational(2 ** level)))',
    replace: 'const most = (void below, void above, hi)',
    tests: ['tests/engine/trapezoid.test.ts'],
  },
  {
    name: 'the trapezoid leaves out its last node',
    file: `${methods}/trapezoid-sweep.ts`,
    find: 'for (let j = from; j <= to; j++)',
    replace: 'for (let j = from; j < to; j++)',
    tests: ['tests/engine/trapezoid.test.ts'],
  },
  {
    name: 'the quadrature error of the panels is dropped',
    file: `${methods}/panels-computation.ts`,
    find: 'const error = prefix.edge + prefix.panels',
    replace: 'const error = 0n * (prefix.edge + prefix.panels)',
    tests: ['tests/engine/panels.test.ts'],
  },
  {
    name: 'what lies beyond the last panel is forgotten',
    file: `${methods}/panels-computation.ts`,
    find: 'const hi = max(0n, prefix.hi + error + (prefix.tail ?? 0n))',
    replace: 'const hi = max(0n, prefix.hi + error)',
    tests: ['tests/engine/panels.test.ts'],
  },
  {
    name: 'theta is off by a sign in the tail over the primes',
    file: 'shared/engine/estimates/prime-tail.ts',
    find: 'const known = arithmetic.subtract(main, atX)',
    replace: 'const known = arithmetic.add(main, atX)',
    tests: ['tests/engine/partial-sum-primes.test.ts'],
  },
  {
    name: 'the integral of the estimate is dropped from the tail',
    file: 'shared/engine/estimates/prime-tail.ts',
    find: 'hi: arithmetic.upper(plus(known, high)),',
    replace: 'hi: arithmetic.upper(known),',
    tests: ['tests/engine/partial-sum-primes.test.ts'],
  },
  {
    name: 'the Taylor remainder of a block is dropped',
    file: 'shared/engine/sieve/block-sums.ts',
    find: 'return arithmetic.addError(sum, arithmetic.scale(remainder, { num: moments[0], den: 1n }))',
    replace: 'return (void remainder, sum)',
    tests: ['tests/engine/sieve-moments.test.ts', 'tests/engine/partial-sum-primes.test.ts'],
  },
  {
    name: 'the sieve forgets a residue',
    file: 'shared/engine/sieve/prime-sieve.ts',
    find: 'if (byte < 0) byte += p',
    replace: 'if (byte < 0) byte += p + p',
    tests: ['tests/engine/sieve-primes.test.ts'],
  },
  {
    name: 'the tail of an expansion in 1/p is dropped',
    file: `${methods}/expansion.ts`,
    find: 'rough = a.addError(rough, a.rational(tail))',
    replace: 'rough = a.addError(rough, a.rational(ZERO))',
    tests: ['tests/engine/expansion.test.ts'],
  },
  {
    name: 'the expansion of a logarithm has the sign of its denominator',
    file: `${series}/prime-expansion.ts`,
    find: 'divide(subtract(t(j), s(j)), rational(j))',
    replace: 'divide(subtract(s(j), t(j)), rational(j))',
    tests: ['tests/published/over-primes.test.ts'],
  },
  {
    name: 'Euler-Maclaurin over a residue class forgets half of its edge',
    file: `${series}/class-sums.ts`,
    find: 'a.add(k === 0 ? a.rational(rational(1, 2)) : one, value)',
    replace: 'a.add(k === 0 ? a.rational(rational(0)) : one, value)',
    tests: ['tests/engine/residue-class.test.ts'],
  },
  {
    name: 'the Moebius function is left out of a residue class',
    file: `${series}/residue-class.ts`,
    find: 'rational(mu, m * classes.length)',
    replace: 'rational(mu * mu, m * classes.length)',
    tests: ['tests/engine/residue-class.test.ts'],
  },
  {
    name: 'a frame that ends gives away the numbers of the frame around it',
    file: `${arithmetic}/mpfr-store.ts`,
    find: 'this.next = start',
    replace: 'this.next = 0',
    tests: ['tests/engine/arithmetic.test.ts'],
  },
  {
    name: 'a lifted common divisor is not tried by division',
    file: `${arithmetic}/polynomial.ts`,
    find: 'if (quotientOf(x, found) && quotientOf(y, found)) return found',
    replace: 'return found',
    tests: ['tests/engine/rational-function.test.ts'],
  },
  {
    name: 'the tail over a residue class takes all primes for its own',
    file: 'shared/engine/estimates/prime-tail.ts',
    find: 'scale(logPowerIntegral(arithmetic, s, slope, logX, null), share)',
    replace: 'logPowerIntegral(arithmetic, s, slope, logX, null)',
    tests: ['tests/engine/partial-sum-primes.test.ts'],
  },
  {
    name: 'the empty product counts in the tail over smooth integers',
    file: 'shared/engine/estimates/smooth-tail.ts',
    find: 'minus(minus(product, one), known[1])',
    replace: 'minus(product, known[1])',
    tests: ['tests/engine/partial-sum-smooth.test.ts'],
  },
  {
    name: 'the edge over a residue class may leave the disc without zeros',
    file: `${series}/class-edge.ts`,
    find: 'compare(add(eps, reach), room) > 0',
    replace: 'compare(reach, room) > 0',
    tests: ['tests/engine/panels.test.ts'],
  },
  {
    name: 'the principal character has the share of them all at the edge',
    file: `${series}/class-edge.ts`,
    find: 'at.point.context.arithmetic.rational(share)',
    replace: 'at.point.context.arithmetic.rational(ONE)',
    tests: ['tests/engine/panels.test.ts'],
  },
  {
    name: 'the error of interpolation is dropped',
    file: `${methods}/derivatives.ts`,
    find: 'describeEnclosure(subtract(lo, error), add(hi, error), items)',
    replace: 'describeEnclosure(lo, hi, items)',
    tests: ['tests/engine/derivatives.test.ts'],
  },
  {
    name: 'the weights of central differences have the wrong sign at odd places',
    file: `${series}/central-differences.ts`,
    find: '(2 * half - index) % 2 === 0 ? 1n : -1n',
    replace: '1n',
    tests: ['tests/engine/derivatives.test.ts'],
  },
]
