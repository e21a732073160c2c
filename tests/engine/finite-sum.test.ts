import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { type Rational, ZERO, add, compare, parseRational, rational } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import type { ArithmeticName, Outcome } from '../../shared/engine/methods/computation.ts'
import { finite } from '../../shared/engine/methods/finite.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'

const list = (members: Iterable<number | bigint>, power = '1', logPower = '1'): Definition => ({
  type: 'series', set: { kind: 'finite', members: [...members].map(String) }, weight: { power, logPower },
})

async function run(definitions: Definition[], digits: number, arithmetic: ArithmeticName = 'ball'): Promise<Outcome[]> {
  return computeAll(await finite.prepare({ definitions, method: 'finite', arithmetic, goal: { digits } }))
}

function contains({ enclosure: { lo, hi } }: Outcome, value: Rational): boolean {
  return compare(parseDecimal(lo)!, value) <= 0 && compare(value, parseDecimal(hi)!) <= 0
}

describe('sums over finite lists', () => {
  it('contain the exact sum where it is rational', async () => {
    const members = [2, 3, 10, 12345, 10 ** 12]
    const exact = members.reduce((total, n) => add(total, rational(1n, BigInt(n) ** 2n)), ZERO)
    const [outcome] = await run([list(members, '2', '0')], 60)
    expect(contains(outcome, exact)).toBe(true)
    expect(compare(parseRational(outcome.radius)!, parseRational('1e-60')!)).toBe(-1)
  })

  // PARI/GP 2.15 at 60 digits: 1/(2*log(2))+1/(3*log(3)), and the same with log^(1/2), log^-3, log^40.
  it.each([
    ['1', '1', '1.0247605959867608348847090624129817355842'],
    ['1', '1/2', '0.91858273172655869712029405197612746912786'],
    ['1', '-3', '0.60850197937576718106103531527850811426'],
    ['1', '40', '1163996.20779675273727325224021587950854'],
  ])('power %s, log power %s', async (power, logPower, digits) => {
    const [outcome] = await run([list([2, 3], power, logPower)], 50)
    expect(outcome.enclosure.lo.startsWith(digits)).toBe(true)
    expect(outcome.digits.truncated).toBeGreaterThanOrEqual(50)
  })

  it('in both arithmetics meet, over lists that take several shards, and tell how they grew', async () => {
    const primes = primesUpTo(100_000)
    const [ball] = await run([list(primes)], 30)
    const [mpfr] = await run([list(primes)], 30, 'mpfr')
    expect(contains(ball, parseDecimal(mpfr.enclosure.lo)!) || contains(mpfr, parseDecimal(ball.enclosure.lo)!)).toBe(true)
    // 9592 primes: the sum to 10^5, by PARI/GP 2.15.
    expect(ball.enclosure.lo.startsWith('1.549781251811942747883696578')).toBe(true)
    expect(ball.convergence.map(({ at }) => at)).toEqual(['4096', '8192', '9592'])
  })

  it('several lists make several outcomes; another set or goal is refused', async () => {
    const outcomes = await run([list([2]), list([3])], 10)
    expect(outcomes.map(({ enclosure }) => enclosure.lo.slice(0, 8))).toEqual(['0.721347', '0.303413'])
    const primes: Definition = { type: 'series', set: { kind: 'primes', exclude: [] }, weight: { power: '1', logPower: '1' } }
    await expect(run([primes], 10)).rejects.toMatchObject({ field: 'method' })
    expect(finite.forecast(list([2]), { cutoff: '100' }, 'ball', 1)).toMatchObject({ possible: false })
    expect(finite.forecast(list([2]), { digits: 30 }, 'ball', 1)).toMatchObject({ possible: true })
  })
})
