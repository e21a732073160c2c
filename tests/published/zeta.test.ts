import { describe, expect, it } from 'vitest'
import { createArithmetic } from '../../shared/engine/arithmetic/choose.ts'
import { lowerDecimal, upperDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { rational } from '../../shared/engine/arithmetic/rational.ts'
import { dirichletSeries } from '../../shared/engine/series/families.ts'
import { PrimeZeta } from '../../shared/engine/series/prime-zeta.ts'
import { ZetaPoint } from '../../shared/engine/series/zeta.ts'
import { createZetaContext } from '../../shared/engine/series/zeta-context.ts'
import { contains } from '../support/enclosures.ts'

/** Decimal enclosures of zeta(s) and of P_k(s), the sum of n^-s over integers with k prime factors, at a whole s >= 2. */
async function at(s: number) {
  const a = await createArithmetic('ball', 200)
  const context = createZetaContext(a, { terms: 85, split: 70 })
  const point = new PrimeZeta(new ZetaPoint(context, a.rational(rational(s - 1)), a.log(a.rational(rational(s - 1)))))
  const shown = (x: unknown) => ({ lo: lowerDecimal(a.lower(x), 45), hi: upperDecimal(a.upper(x), 45) })
  return {
    zeta: shown(a.scale(point.point.zetaTimesExcess(), rational(1, s - 1))),
    almostPrimes: (k: number) => shown(dirichletSeries({ kind: 'almost-primes', k, exclude: [] }, rational(s))!.evaluate(point)),
  }
}

describe('zeta (Abramowitz and Stegun, Table 23.3, 20 decimals)', () => {
  it.each([
    [2, '1.64493406684822643647'],
    [3, '1.20205690315959428540'],
    [4, '1.08232323371113819152'],
    [5, '1.03692775514336992633'],
    [10, '1.00099457512781808534'],
  ])('zeta(%i)', async (s, printed) => {
    expect(contains((await at(s)).zeta, printed)).toBe(true)
  })
})

describe('sums of n^-s over k-almost primes (R. J. Mathar, arXiv:0803.0900, tables; digits recomputed with Arb and PARI/GP)', () => {
  it.each([
    [2, 2, '0.140760434349023388222750925'],
    [3, 2, '0.038516192982694640912837'],
    [2, 3, '0.023806033472771959678695'],
  ])('P_%i(%i)', async (k, s, printed) => {
    expect(contains((await at(s)).almostPrimes(k), printed)).toBe(true)
  })
})
