import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { type Rational, add, compare, parseRational, rational } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import type { ComputationRequest, Enclosure, Outcome } from '../../shared/engine/methods/computation.ts'
import { partialSum } from '../../shared/engine/methods/partial-sum.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'

const series = (set: SetOfIntegers, power = '1', logPower = '1'): Definition => ({ type: 'series', set, weight: { power, logPower } })
const almost = (k: number, exclude: number[] = []): SetOfIntegers => ({ kind: 'almost-primes', k, exclude })
const squarefree = (k: number): SetOfIntegers => ({ kind: 'squarefree-almost-primes', k, exclude: [] })
const distinct = (k: number): SetOfIntegers => ({ kind: 'distinct-prime-factors', k, exclude: [] })

async function run(definitions: Definition[], cutoff: string, more: Partial<ComputationRequest> = {}): Promise<Outcome[]> {
  return computeAll(await partialSum.prepare({ definitions, method: 'partial-sum', arithmetic: 'ball', goal: { cutoff }, ...more }))
}

function meets({ lo, hi }: Enclosure, digits: string): boolean {
  const value = parseDecimal(digits)!
  const above: Rational = add(value, rational(1n, 10n ** BigInt(digits.length - digits.indexOf('.') - 1)))
  return compare(parseDecimal(lo)!, above) <= 0 && compare(value, parseDecimal(hi)!) <= 0
}

describe('sums over products of primes from the primes up to a cut-off', () => {
  // Arb 2.23 and PARI/GP 2.15; k = 6 also J. Number Theory 211 (2020) 513-529, Fig. 2: 0.98875345….
  it('contain the known values, with every cut-off on the way', async () => {
    const table: [SetOfIntegers, string][] = [
      [almost(2), '1.144816573405917991524450173893'], [almost(3), '1.030835101793217571955688899796'],
      [almost(4), '0.997342148595252359777593599548'], [almost(6), '0.988753453014509606323117537451'],
      [almost(2, [2]), '0.619685094441076291526849838347'], [almost(3, [2]), '0.546010010883498718419889654689'],
      [squarefree(2), '0.890925479476318332137262621995'], [squarefree(3), '0.713123800509890255412029279069'],
      // R. J. Mathar, arXiv:0811.4739: the sum over the prime powers.
      [distinct(1), '2.00666645'],
    ]
    const outcomes = await run(table.map(([set]) => series(set)), '100000')
    outcomes.forEach(({ enclosure, convergence, radius, budget }, i) => {
      expect(meets(enclosure, table[i][1])).toBe(true)
      for (const point of convergence) expect(meets(point, table[i][1])).toBe(true)
      expect(compare(parseRational(radius)!, parseRational('5e-4')!)).toBe(-1)
      expect(budget.map(({ bound }) => bound)).toEqual(['S-9', 'T-2', 'T-3', 'T-4', 'A-7'])
    })
    expect(outcomes[0].convergence.map(({ at }) => at)).toEqual(['10000', '100000'])
    expect(outcomes[0].estimates.map(({ id }) => id)).toContain('theta-buthe-2018-b')
  })

  it('meet exact identities: squarefree k = 2 is all k = 2 less half of the sum of 1/(p^2 log p)', async () => {
    const [all, free] = await run([series(almost(2)), series(squarefree(2))], '20000')
    // Arb 2.23 and PARI/GP 2.15: 0.507782187859199318774375103794.
    const half = parseDecimal('0.253891093929599659387187551897')!
    expect(compare(parseDecimal(all.enclosure.lo)!, add(parseDecimal(free.enclosure.hi)!, half))).toBe(-1)
    expect(compare(add(parseDecimal(free.enclosure.lo)!, half), parseDecimal(all.enclosure.hi)!)).toBe(-1)
  })

  it('serve other weights, and are repeated from their parameters', async () => {
    const definitions = [series(almost(2), '3/2', '1/2')]
    const [outcome] = await run(definitions, '5000')
    const [again] = await run(definitions, '5000', { parameters: outcome.parameters })
    expect(again).toEqual(outcome)
    const [finer] = await run(definitions, '50000')
    expect(compare(parseDecimal(outcome.enclosure.lo)!, parseDecimal(finer.enclosure.lo)!)).toBeLessThanOrEqual(0)
    expect(compare(parseDecimal(finer.enclosure.hi)!, parseDecimal(outcome.enclosure.hi)!)).toBeLessThanOrEqual(0)
  })

  it('meet in both arithmetics', async () => {
    const [ball] = await run([series(almost(3))], '3000')
    const [mpfr] = await run([series(almost(3))], '3000', { arithmetic: 'mpfr' })
    expect(compare(parseDecimal(ball.enclosure.lo)!, parseDecimal(mpfr.enclosure.hi)!)).toBe(-1)
    expect(compare(parseDecimal(mpfr.enclosure.lo)!, parseDecimal(ball.enclosure.hi)!)).toBe(-1)
  })

  it.each([
    [{ step: '0' }, 'step'], [{ gap: '2' }, 'gap'], [{ first: -3 }, 'first'], [{ last: 1e9 }, 'last'],
    [{ first: -2 }, 'first'],
  ])('refuse unsound parameters: %o', async (fault, field) => {
    const [outcome] = await run([series(almost(2))], '3000')
    await expect(run([series(almost(2))], '3000', { parameters: { ...outcome.parameters, ...fault } })).rejects.toMatchObject({ field })
  })
})
