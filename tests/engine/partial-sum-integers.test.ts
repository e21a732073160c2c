import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { add, compare, parseRational, rational } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import type { ComputationRequest, Enclosure, Outcome } from '../../shared/engine/methods/computation.ts'
import { partialSum } from '../../shared/engine/methods/partial-sum.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'

const series = (set: SetOfIntegers, power: string, logPower: string): Definition => ({ type: 'series', set, weight: { power, logPower } })

async function run(definitions: Definition[], cutoff: string, more: Partial<ComputationRequest> = {}): Promise<Outcome[]> {
  return computeAll(await partialSum.prepare({ definitions, method: 'partial-sum', arithmetic: 'ball', goal: { cutoff }, ...more }))
}

function meets({ lo, hi }: Enclosure, digits: string): boolean {
  const value = parseDecimal(digits)!
  const above = add(value, rational(1n, 10n ** BigInt(digits.length - digits.indexOf('.') - 1)))
  return compare(parseDecimal(lo)!, above) <= 0 && compare(value, parseDecimal(hi)!) <= 0
}

describe('partial sums over integers', () => {
  it.each([
    // Arb 2.23 and PARI/GP 2.15.
    [{ kind: 'integers', exclude: [] }, '1', '2', '2.109742801236', '3e-8'],
    // zeta(2) - 1, zeta(3) - 1: Abramowitz & Stegun, Table 23.3.
    [{ kind: 'integers', exclude: [] }, '2', '0', '0.64493406684822643647', '2e-11'],
    [{ kind: 'integers', exclude: [] }, '3', '0', '0.20205690315959428540', '1e-16'],
    // Odd integers: 3 zeta(2)/4 - 1 = pi^2/8 - 1, from the same table.
    [{ kind: 'integers', exclude: [2] }, '2', '0', '0.23370055013616982735', '4e-11'],
    // zeta(2)/zeta(4) - 1 = 15/pi^2 - 1, from the same table.
    [{ kind: 'squarefree', exclude: [] }, '2', '0', '0.519817754635066', '4e-8'],
    // P_2(2), P_3(2): R. J. Mathar, arXiv:0803.0900.
    [{ kind: 'almost-primes', k: 2, exclude: [] }, '2', '0', '0.140760434349023388222750925', '1e-5'],
    [{ kind: 'almost-primes', k: 3, exclude: [] }, '2', '0', '0.038516192982694640912837', '1e-5'],
    [{ kind: 'almost-primes', k: 2, exclude: [] }, '3', '0', '0.023806033472771959678695', '1e-10'],
  ] as [SetOfIntegers, string, string, string, string][])('%o, power %s, log power %s: %s', async (set, power, logPower, value, radius) => {
    const [outcome] = await run([series(set, power, logPower)], '300000')
    expect(meets(outcome.enclosure, value)).toBe(true)
    for (const point of outcome.convergence) expect(meets(point, value)).toBe(true)
    expect(compare(parseRational(outcome.radius)!, parseRational(radius)!)).toBe(-1)
    expect(outcome.budget[0]).toMatchObject({ source: 'tail', bound: 'S-10' })
    expect(outcome.estimates).toEqual([])
  })

  it('serve several k and weights in one sweep, in both arithmetics, and are repeated from their parameters', async () => {
    const definitions = [2, 3, 40].map((k) => series({ kind: 'almost-primes', k, exclude: [3] }, '2', k === 2 ? '-1' : '0'))
    const together = await run(definitions, '20000')
    for (const [i, definition] of definitions.entries()) {
      const [alone] = await run([definition], '20000')
      expect(together[i].enclosure).toEqual(alone.enclosure)
    }
    expect(await run(definitions, '20000', { parameters: together[0].parameters })).toEqual(together)
    const mpfr = await run(definitions, '20000', { arithmetic: 'mpfr' })
    mpfr.forEach(({ enclosure }, i) => {
      expect(compare(parseDecimal(enclosure.lo)!, parseDecimal(together[i].enclosure.hi)!)).toBeLessThanOrEqual(0)
      expect(compare(parseDecimal(together[i].enclosure.lo)!, parseDecimal(enclosure.hi)!)).toBeLessThanOrEqual(0)
    })
  })

  it('refuse what they cannot, and name it', async () => {
    const integers = series({ kind: 'integers', exclude: [] }, '2', '0')
    await expect(run([integers], '5000000000')).rejects.toMatchObject({ field: 'cutoff' })
    await expect(run([integers, series({ kind: 'integers', exclude: [2] }, '2', '0')], '5000')).rejects.toMatchObject({ field: 'method' })
    await expect(run([series({ kind: 'integers', exclude: [] }, '2', '-60')], '5000')).rejects.toMatchObject({ field: 'cutoff' })
    expect(partialSum.forecast(integers, { digits: 8 }, 'ball', 1)).toMatchObject({ possible: true })
  })
})
