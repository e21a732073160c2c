import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { isqrt } from '../arithmetic/integers.ts'
import { primeDivisors } from '../arithmetic/primes.ts'
import { ONE, type Rational, add, compare, multiply, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { SetOfIntegers } from '../sets/definition.ts'
import { units } from './characters.ts'
import type { SeriesPoint } from './dirichlet.ts'
import type { EdgeSeries } from './edge.ts'
import { leastAtOne } from './log-l.ts'
import { logZetaUpper } from './majorants.ts'
import { residueClassSeries } from './residue-class.ts'

/** The disc about s = 1 is no larger than this (P-9). */
const LARGEST_ROOM = rational(1, 8)
/** Above what the principal character and the m >= 2 bring, and the arguments of the other L(s, chi) (P-9). */
const LOG_OF_REGULAR_ZETA = rational(33, 10)
const EACH_DIVISOR = rational(3)
const ARGUMENTS_AND_REST = rational(605, 100)

/**
 * The primes of a residue class near s = 1: P(1+t; q, a) = log(1/x)/phi(q) + R(t), x = t/eps, R analytic in a disc about t = 0 in which
 * no L(s, chi), chi not principal, vanishes. The evaluation takes log zeta out of the principal character alone, as in P-2.
 */
export function classEdge({ modulus, residue, exclude }: Extract<SetOfIntegers, { kind: 'residue-class' }>): EdgeSeries {
  const series = residueClassSeries(modulus, residue, exclude, ONE)
  const share = rational(1, units(modulus).length)
  return {
    pole: 0,
    logs: 1,
    parts: <N>(at: SeriesPoint<N>): N[] => [at.point.context.arithmetic.rational(share), series.evaluate(at)],
    room: (a) => zeroFreeDisc(a, modulus).room,
    partBounds(eps, reach, a) {
      const { room, size } = zeroFreeDisc(a, modulus)
      if (compare(add(eps, reach), room) > 0) {
        throw new EngineRefusal('unsound_parameter', 'edgeReach', 'The parameters edge and edgeReach must stay where no L-function of the modulus vanishes.')
      }
      const principal = [LOG_OF_REGULAR_ZETA, logZetaUpper(eps), multiply(EACH_DIVISOR, rational(primeDivisors(modulus).length))].reduce(add)
      const excluded = exclude.map((p) => rational(1n, isqrt(BigInt(p))))
      return [share, [multiply(principal, share), size, ARGUMENTS_AND_REST, ...excluded].reduce(add)]
    },
  }
}

/**
 * *Claim*: L(s, chi) does not vanish for |s - 1| <= room, chi not principal, and |log|L(1, chi)|| <= size. *Valid for*: q >= 3. *Bound*: P-9.
 */
function zeroFreeDisc<N>(a: Arithmetic<N>, q: number): { room: Rational; size: Rational } {
  const least = leastAtOne(a, q)
  if (least.num <= 0n) throw new RangeError('an L-function was not told apart from 0 at s = 1')
  const slope = a.frame(() => {
    let total = a.add(a.rational(rational(64, 49)), a.scale(a.log(a.rational(rational(q))), rational(9, 14)))
    for (let n = 2; n <= q; n++) total = a.add(total, a.scale(a.log(a.rational(rational(n))), rational(1, n)))
    return a.upper(a.timesExp(total, a.scale(a.log(a.rational(rational(q))), rational(1, 8))))
  })
  // least/(2 slope), rounded down to a short fraction.
  const room = rational((least.num * slope.den * 4096n) / (least.den * slope.num * 2n), 4096)
  const inverse = rational(least.den, least.num)
  const most = Array.from({ length: q }, (_, i) => rational(1, i + 1)).reduce(add, rational(1, 2))
  return { room: compare(room, LARGEST_ROOM) < 0 ? room : LARGEST_ROOM, size: compare(inverse, most) > 0 ? inverse : most }
}
