import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { add, compare, parseRational, rational } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import type { ComputationRequest, Enclosure, Outcome } from '../../shared/engine/methods/computation.ts'
import { partialSum } from '../../shared/engine/methods/partial-sum.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { countSmooth, smoothUpTo } from '../../shared/engine/sets/enumerate-products.ts'

const series = (y: number, exclude: number[], power: string, logPower: string): Definition => ({
  type: 'series', set: { kind: 'smooth', y, exclude }, weight: { power, logPower },
})

async function run(definitions: Definition[], cutoff: string, more: Partial<ComputationRequest> = {}): Promise<Outcome[]> {
  return computeAll(await partialSum.prepare({ definitions, method: 'partial-sum', arithmetic: 'ball', goal: { cutoff }, ...more }))
}

/** Whether the enclosure holds a number that begins with these digits. */
function meets({ lo, hi }: Enclosure, digits: string): boolean {
  const value = parseDecimal(digits)!
  const above = add(value, rational(1n, 10n ** BigInt(digits.length - digits.indexOf('.') - 1)))
  return compare(parseDecimal(lo)!, above) <= 0 && compare(value, parseDecimal(hi)!) <= 0
}

describe('partial sums over smooth integers', () => {
  it.each<[y: number, exclude: number[], power: string, logPower: string, value: string, radius: string]>([
    // sum 2^-k/(k log 2) = 1, and sum 2^-k/(k log 2)^2 = Li_2(1/2)/log^2 2 = pi^2/(12 log^2 2) - 1/2, Euler's value of the dilogarithm.
    [2, [], '1', '1', '1.0000000000000', '1e-6'],
    [2, [], '1', '2', '1.21185737126', '1e-6'],
    // PARI/GP 2.15: intnum of t^(b-1) times the Euler product, and derivnum of the product where b < 0.
    [7, [], '1', '1', '2.041885639618352903097004758935', '2e-6'],
    [19, [3], '1', '1/2', '2.026086596409877656450654312706', '2e-3'],
    [23, [], '3/2', '2', '1.095991278006934476463573700129', '1e-6'],
    [5, [2], '2', '1', '0.134404664879295241456861170653', '1e-13'],
    [7, [], '1', '-2', '31.890852912790432465493638929', '5e-3'],
    [13, [5], '2', '-1', '0.689878134809151855452063849025', '1e-8'],
    // 1/((1-1/4)(1-1/9)) - 1 = 1/2, exactly.
    [3, [], '2', '0', '0.500000000000000000000000000000', '1e-30'],
  ])('y = %i without %o, power %s, log power %s', async (y, exclude, power, logPower, value, radius) => {
    const [outcome] = await run([series(y, exclude, power, logPower)], '1000000')
    expect(meets(outcome.enclosure, value)).toBe(true)
    for (const point of outcome.convergence) expect(meets(point, value)).toBe(true)
    expect(outcome.convergence.at(-1)!.at).toBe('1000000')
    expect(compare(parseRational(outcome.radius)!, parseRational(radius)!)).toBe(-1)
    expect(outcome.budget[0]).toMatchObject({ source: 'tail', bound: 'S-11' })
  })

  it('serve several weights in one sweep, in both arithmetics, and are repeated from their parameters', async () => {
    const definitions = [series(11, [3], '1', '1'), series(11, [3], '1', '-2'), series(11, [3], '3/2', '0')]
    const together = await run(definitions, '30000')
    expect(together[0].parameters.decay).toBe(together[1].parameters.decay)
    expect(await run(definitions, '30000', { parameters: together[0].parameters })).toEqual(together)
    const mpfr = await run(definitions, '30000', { arithmetic: 'mpfr' })
    mpfr.forEach(({ enclosure }, i) => {
      expect(compare(parseDecimal(enclosure.lo)!, parseDecimal(together[i].enclosure.hi)!)).toBeLessThanOrEqual(0)
      expect(compare(parseDecimal(together[i].enclosure.lo)!, parseDecimal(enclosure.hi)!)).toBeLessThanOrEqual(0)
    })
  })

  it('stay true, only wider, with any decay that serves', async () => {
    for (const decay of ['1/4', '3/4', '63/64']) {
      const [outcome] = await run([series(7, [], '1', '1')], '20000', { parameters: { cutoff: '20000', precision: 128, decay } })
      expect(meets(outcome.enclosure, '2.0418856396183529')).toBe(true)
    }
  })

  it('reach the width asked for, and say beforehand what they can', async () => {
    const definition = series(7, [], '1', '1')
    const [outcome] = await computeAll(await partialSum.prepare({ definitions: [definition], method: 'partial-sum', arithmetic: 'ball', goal: { digits: 8 } }))
    expect(compare(parseRational(outcome.radius)!, parseRational('0.5e-8')!)).toBe(-1)
    expect(partialSum.forecast(definition, { digits: 8 }, 'ball', 1)).toMatchObject({ possible: true })
    expect(partialSum.forecast(definition, { digits: 60 }, 'ball', 1)).toMatchObject({ possible: false })
    expect(partialSum.forecast(series(997, [], '1', '1'), { cutoff: '10000000' }, 'ball', 1)).toMatchObject({ possible: false })
    // Narrower than a double with 64 bits after the point can tell from 0.
    expect(partialSum.forecast(series(5, [], '2', '1'), { width: '1e-21' }, 'ball', 1)).toMatchObject({ possible: true })
  })

  it('say so at once, whatever the power and however many primes', () => {
    const began = performance.now()
    expect(partialSum.forecast(series(997, [2, 3, 5, 7, 11, 13], '60', '-60'), { digits: 1000 }, 'ball', 1)).toMatchObject({ possible: false })
    expect(performance.now() - began).toBeLessThan(2_000)
  })

  it('refuse what they cannot, and name it', async () => {
    await expect(run([series(997, [], '1', '1')], '1000000000')).rejects.toMatchObject({ field: 'cutoff' })
    await expect(run([series(7, [], '1', '-60')], '5000')).rejects.toMatchObject({ field: 'cutoff' })
    await expect(run([series(7, [], '1', '1'), series(5, [], '1', '1')], '5000')).rejects.toMatchObject({ field: 'method' })
    for (const decay of ['1', '-1/2', 'much', `1/${2n ** 41n}`]) {
      await expect(run([series(7, [], '1', '1')], '5000', { parameters: { cutoff: '5000', precision: 128, decay } })).rejects.toMatchObject({ field: 'decay' })
    }
    const small = run([series(7, [], '2', '-3')], '5000', { parameters: { cutoff: '5000', precision: 128, decay: '1/64' } })
    await expect(small).rejects.toMatchObject({ field: 'decay' })
  })
})

describe('counting smooth integers', () => {
  it('agrees with the list and with trial division', () => {
    for (const [y, exclude, upTo] of [[7, [], 100_000], [13, [2], 50_000], [2, [], 2 ** 40], [97, [3, 5], 30_000]] as [number, number[], number][]) {
      expect(countSmooth(y, exclude, upTo)).toBe(smoothUpTo(y, exclude, upTo).length)
    }
    // By trial division here: n <= 1000 with no prime factor above 7, 1 not counted.
    const trial = Array.from({ length: 999 }, (_, i) => i + 2).filter((n) => [2, 3, 5, 7].reduce((rest, p) => { while (rest % p === 0) rest /= p; return rest }, n) === 1)
    expect(countSmooth(7, [], 1000)).toBe(trial.length)
  })
})
