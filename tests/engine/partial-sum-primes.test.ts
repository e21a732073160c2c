import { describe, expect, it } from 'vitest'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { parseDecimal, upperDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { type Rational, add, compare, dyadic, parseRational, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import { primeTail } from '../../shared/engine/estimates/prime-tail.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import type { ComputationRequest, Outcome } from '../../shared/engine/methods/computation.ts'
import type { Goal } from '../../shared/engine/methods/goal.ts'
import { partialSum } from '../../shared/engine/methods/partial-sum.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { sumBatch } from '../../shared/engine/sieve/block-sums.ts'
import { forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'
import { HIGHEST_ORDER, primeMoments } from '../../shared/engine/sieve/prime-moments.ts'
import { type RationalWeight, expandWeight } from '../../shared/engine/sieve/weight.ts'

const exact = (text: string): Rational => parseRational(text)!
const weight = (power: string, logPower: string): RationalWeight => ({ power: exact(power), logPower: exact(logPower) })
const series = (set: SetOfIntegers, power = '1', logPower = '1'): Definition => ({ type: 'series', set, weight: { power, logPower } })
const PRIMES: SetOfIntegers = { kind: 'primes', exclude: [] }

async function run(definitions: Definition[], goal: Goal, more: Partial<ComputationRequest> = {}): Promise<Outcome[]> {
  return computeAll(await partialSum.prepare({ definitions, method: 'partial-sum', arithmetic: 'ball', goal, ...more }))
}

/** Whether the enclosure has a number in common with those that begin with these digits. */
function meets({ lo, hi }: { lo: string; hi: string }, digits: string): boolean {
  const value = parseDecimal(digits)!
  const unit = rational(1n, 10n ** BigInt(digits.length - digits.indexOf('.') - 1))
  return compare(parseDecimal(lo)!, { ...subtract(value, rational(-unit.num, unit.den)) }) <= 0 && compare(value, parseDecimal(hi)!) <= 0
}

/** Sums up to x by moments, exact ends. */
function sumUpTo(x: number, w: RationalWeight, precision = 128): { lo: Rational; hi: Rational } {
  const arithmetic = createBallArithmetic(precision)
  const total = [0n, 0n]
  primeMoments(0, x, (batch) => {
    const [[[lo, hi]]] = sumBatch(arithmetic, [expandWeight(w, HIGHEST_ORDER)], batch)
    total[0] += lo
    total[1] += hi
  })
  return { lo: dyadic(total[0], precision), hi: dyadic(total[1], precision) }
}

describe('sums over the primes by moments', () => {
  it('the sum of 1/(p log p) to 10^8 has the known digits', () => {
    // PARI/GP 2.15, forprime at 38 digits: 1.582329708799069643829791…
    const { lo, hi } = sumUpTo(1e8, weight('1', '1'))
    expect(meets({ lo: upperDecimal(lo, 30), hi: upperDecimal(hi, 30) }, '1.582329708799069643829791')).toBe(true)
    expect(compare(subtract(hi, lo), exact('5e-21'))).toBe(-1)
  })

  it('theta(10^8) has the known digits', () => {
    // Arb 2.23: 99987730.018022.
    const { lo, hi } = sumUpTo(1e8, weight('0', '-1'))
    expect(meets({ lo: upperDecimal(lo, 20), hi: upperDecimal(hi, 20) }, '99987730.018022')).toBe(true)
    expect(compare(subtract(hi, lo), exact('1e-11'))).toBe(-1)
  })

  it.each([['1', '1'], ['1', '1/2'], ['1', '3'], ['3/2', '-1'], ['2', '0'], ['5', '7/3'], ['0', '-1']])(
    'blocks contain what single terms give: power %s, log power %s',
    (power, logPower) => {
      const arithmetic = createBallArithmetic(128)
      const finer = createBallArithmetic(256)
      const expansion = expandWeight(weight(power, logPower), HIGHEST_ORDER)
      for (const [lo, hi] of [[0, 40_000], [8_000_000, 8_020_000], [500_000_000, 500_030_000]]) {
        const singles: number[] = []
        forEachPrime(lo, hi, (p) => singles.push(p))
        const [[terms]] = sumBatch(finer, [expansion], { blocks: [], singles: [singles] })
        const blocks = [0n, 0n]
        primeMoments(lo, hi, (batch) => {
          const [[[low, high]]] = sumBatch(arithmetic, [expansion], batch)
          blocks[0] += low
          blocks[1] += high
        })
        expect(blocks[0] << 128n <= terms[0] && terms[1] <= blocks[1] << 128n).toBe(true)
      }
    },
  )
})

describe('partial sums over the primes with their tail', () => {
  // Arb 2.23 and PARI/GP 2.15; the first also H. Cohen, High precision computation of Hardy-Littlewood constants (1998): 1.6366….
  it.each([
    [PRIMES, '1', '1', '1.636616323351260868569658003921863671'],
    [PRIMES, '1', '2', '1.52097043995'],
    [PRIMES, '2', '1', '0.507782187859199318774375103794'],
    [{ kind: 'primes', exclude: [2] } as SetOfIntegers, '1', '1', '0.915268802906779164889695663420'],
    // P(2), P(3): Merrifield 1881.
    [PRIMES, '2', '0', '0.45224742004106549850654336483224793417323134'],
    [PRIMES, '3', '0', '0.17476263929944353642311331466570670097541212'],
  ])('%o, power %s, log power %s', async (set, power, logPower, value) => {
    const [outcome] = await run([series(set, power, logPower)], { cutoff: '1000000' })
    expect(meets(outcome.enclosure, value)).toBe(true)
    for (const point of outcome.convergence) expect(meets(point, value)).toBe(true)
    expect(outcome.convergence.map(({ at }) => at)).toEqual(['10000', '30000', '100000', '300000', '1000000'])
  })

  it('reaches the digits asked for and says which estimates it rests on', async () => {
    const [outcome] = await run([series(PRIMES)], { digits: 4 })
    expect(compare(exact(outcome.radius), exact('1e-4'))).toBe(-1)
    expect(outcome.estimates.map(({ id }) => id)).toContain('theta-buthe-2018-b')
    expect(outcome.estimates.every(({ conditional }) => !conditional)).toBe(true)
    expect(outcome.budget[0]).toMatchObject({ source: 'tail', bound: 'S-5' })
  })

  it('the tail alone contains the truth at every cut-off', () => {
    const arithmetic = createBallArithmetic(128)
    const truth = exact('1.636616323351260868569658003921863671181597')
    const estimates = ESTIMATES.filter(({ conditional }) => !conditional)
    for (const x of [2_000, 9_999, 10_007, 100_000, 999_983, 1_000_000]) {
      const sum = sumUpTo(x, weight('1', '1'))
      const tail = primeTail(arithmetic, weight('1', '1'), x, sumUpTo(x, weight('0', '-1')), estimates)
      expect(compare(tail.sum.lo, subtract(truth, sum.lo))).toBe(-1)
      expect(compare(subtract(truth, sum.hi), tail.sum.hi)).toBe(-1)
    }
  })

  it('is repeated from its parameters, and does with other estimates', async () => {
    const [outcome] = await run([series(PRIMES)], { cutoff: '30000' })
    const [again] = await run([series(PRIMES)], { cutoff: '30000' }, { parameters: outcome.parameters })
    expect(again).toEqual(outcome)
    const [other] = await run([series(PRIMES)], { cutoff: '30000' }, {
      parameters: { ...outcome.parameters, estimates: 'theta-dusart-2018-k2-2,theta-johnston-2022' },
    })
    expect(other.estimates.map(({ id }) => id).sort()).toEqual(['theta-dusart-2018-k2-2', 'theta-johnston-2022'])
    expect(meets(other.enclosure, '1.6366163233512608')).toBe(true)
  })

  it('runs several constants in one sweep', async () => {
    const odd: SetOfIntegers = { kind: 'primes', exclude: [2, 3, 5] }
    const both = await run([series(PRIMES), series(odd, '1', '2')], { cutoff: '50000' })
    const [alone] = await run([series(odd, '1', '2')], { cutoff: '50000' })
    expect(both[1].enclosure).toEqual(alone.enclosure)
  })

  // PARI/GP 2.15: its intnum over t of P(s0+t;q,a), made of its lfun at every character mod q.
  it.each<[residue: number, modulus: number, power: string, logPower: string, value: string, radius: number]>([
    [1, 4, '1', '1', '0.3221104046414303445458', 5e-5],
    [1, 3, '1', '1', '0.2661086355567139974178', 5e-5],
    [2, 5, '1', '2', '1.096617911728876578962', 4e-6],
    [5, 8, '3/2', '1/2', '0.09567825375596397601678', 3e-7],
  ])('%i mod %i, power %s, log power %s: the tail by the class\'s own estimates', async (residue, modulus, power, logPower, value, radius) => {
    const [outcome] = await run([series({ kind: 'residue-class', modulus, residue, exclude: [] }, power, logPower)], { cutoff: '300000' })
    expect(meets(outcome.enclosure, value)).toBe(true)
    for (const point of outcome.convergence) expect(meets(point, value)).toBe(true)
    expect(Number(outcome.radius)).toBeLessThan(radius)
    expect(outcome.estimates.map(({ id }) => id)).toEqual(['theta-class-ramare-rumely-1996-thm-2', 'theta-class-bennett-2018-thm-1.2'])
  })

  it('the primes of all classes add up, exclusions and the primes that divide the modulus apart', async () => {
    const parts = await Promise.all([1, 5, 7, 11].map((residue) => run([series({ kind: 'residue-class', modulus: 12, residue, exclude: [] })], { cutoff: '100000' })))
    const [whole] = await run([series({ kind: 'primes', exclude: [2, 3] })], { cutoff: '100000' })
    const ends = (side: 'lo' | 'hi') => parts.reduce((total, [{ enclosure }]) => add(total, parseDecimal(enclosure[side])!), rational(0))
    expect(compare(ends('lo'), parseDecimal(whole.enclosure.hi)!)).toBe(-1)
    expect(compare(parseDecimal(whole.enclosure.lo)!, ends('hi'))).toBe(-1)
    const [all] = await run([series({ kind: 'residue-class', modulus: 4, residue: 1, exclude: [] })], { cutoff: '20000' })
    const [without] = await run([series({ kind: 'residue-class', modulus: 4, residue: 1, exclude: [13, 17] })], { cutoff: '20000' })
    const left = 1 / (13 * Math.log(13)) + 1 / (17 * Math.log(17))
    expect(Number(all.enclosure.lo) - Number(without.enclosure.lo)).toBeCloseTo(left, 6)
  })

  it('of a class that no estimate of its own reaches is only known to be part of the whole tail', async () => {
    const [outcome] = await run([series({ kind: 'residue-class', modulus: 97, residue: 3, exclude: [] }, '2', '1')], { cutoff: '100000' })
    let sum = 0
    for (const p of primesUpTo(100_000)) if (p % 97 === 3) sum += 1 / (p * p * Math.log(p))
    expect(Number(outcome.enclosure.lo)).toBeCloseTo(sum, 6)
    expect(Number(outcome.enclosure.hi)).toBeGreaterThan(sum)
    expect(outcome.estimates.some(({ id }) => id.startsWith('theta-class'))).toBe(false)
  })

  it('of a class is repeated from a certificate that names only estimates of theta over all primes', async () => {
    const definition = series({ kind: 'residue-class', modulus: 4, residue: 1, exclude: [] })
    const [outcome] = await run([definition], { cutoff: '20000' })
    const [wide] = await run([definition], { cutoff: '20000' }, { parameters: { ...outcome.parameters, estimates: 'theta-dusart-2018-k2-2' } })
    expect(wide.estimates.map(({ id }) => id)).toEqual(['theta-dusart-2018-k2-2'])
    expect(compare(parseDecimal(wide.enclosure.lo)!, parseDecimal(outcome.enclosure.lo)!)).toBe(-1)
    expect(compare(parseDecimal(outcome.enclosure.hi)!, parseDecimal(wide.enclosure.hi)!)).toBe(-1)
  })
})

describe('refusals of partial sums', () => {
  const request = (goal: Goal, parameters?: ComputationRequest['parameters']): ComputationRequest => ({
    definitions: [series(PRIMES)], method: 'partial-sum', arithmetic: 'ball', goal, parameters,
  })

  it.each([
    [{ digits: 40 }, undefined, 'digits'],
    [{ cutoff: '10' }, undefined, 'cutoff'],
    [{ cutoff: '1e30' }, undefined, 'cutoff'],
    [{ cutoff: 'many' }, undefined, 'cutoff'],
    [{ cutoff: '10000' }, { cutoff: '10000', precision: 128.5, estimates: '' }, 'precision'],
    [{ cutoff: '10000' }, { cutoff: '10000', precision: 128, estimates: 'no-such-estimate' }, 'estimates'],
  ])('%o with parameters %o names the field %s', async (goal, parameters, field) => {
    await expect(partialSum.prepare(request(goal as Goal, parameters))).rejects.toMatchObject({ name: 'EngineRefusal', field })
  })

  it('names the cut-off where the estimates allowed do not cover what lies beyond', async () => {
    const computation = partialSum.prepare(request({ cutoff: '10000' }, { cutoff: '10000', precision: 128, estimates: 'theta-buthe-2018-b' }))
    await expect(computation.then(computeAll)).rejects.toMatchObject({ field: 'cutoff' })
  })
})
