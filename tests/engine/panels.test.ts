import { describe, expect, it } from 'vitest'
import { contains as ballContains } from '../../shared/engine/arithmetic/arithmetic.ts'
import { type Ball, createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { ONE, compare, divide, multiply, parseRational, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll } from '../../shared/engine/engine.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import type { ComputationRequest, Enclosure, Outcome, ShardResult } from '../../shared/engine/methods/computation.ts'
import { panels } from '../../shared/engine/methods/panels.ts'
import { trapezoid } from '../../shared/engine/methods/trapezoid.ts'
import { dirichletSeries } from '../../shared/engine/series/families.ts'
import { edgeSeries } from '../../shared/engine/series/edge.ts'
import { leastAtOne } from '../../shared/engine/series/log-l.ts'
import { PrimeZeta } from '../../shared/engine/series/prime-zeta.ts'
import { residueClassSeries } from '../../shared/engine/series/residue-class.ts'
import { ZetaPoint } from '../../shared/engine/series/zeta.ts'
import { createZetaContext } from '../../shared/engine/series/zeta-context.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { contains, sharesDigits } from '../support/enclosures.ts'

const none: number[] = []

function series(set: SetOfIntegers, power = '1', logPower = '1'): Definition {
  return canonicalDefinition({ type: 'series', set, weight: { power, logPower } })
}

function request(definitions: Definition[], digits: number, more: Partial<ComputationRequest> = {}): ComputationRequest {
  return { definitions, method: 'panels', arithmetic: 'ball', goal: { digits }, ...more }
}

async function run(definitions: Definition[], digits: number, more: Partial<ComputationRequest> = {}): Promise<Outcome[]> {
  return computeAll(await panels.prepare(request(definitions, digits, more)))
}

async function byTrapezoid(definition: Definition, digits: number): Promise<Outcome> {
  const [outcome] = await computeAll(await trapezoid.prepare({ ...request([definition], digits), method: 'transform' }))
  return outcome
}

function meet(a: Enclosure, b: Enclosure): boolean {
  const [aLo, aHi, bLo, bHi] = [a.lo, a.hi, b.lo, b.hi].map((text) => parseDecimal(text)!)
  return compare(aLo, bHi) <= 0 && compare(bLo, aHi) <= 0
}

const cases: [string, Definition][] = [
  ['primes', series({ kind: 'primes', exclude: none })],
  ['primes, b = 1/3', series({ kind: 'primes', exclude: none }, '1', '1/3')],
  ['odd 3-almost primes', series({ kind: 'almost-primes', k: 3, exclude: [2] })],
  ['2-almost primes without 3 and 1009', series({ kind: 'almost-primes', k: 2, exclude: [3, 1009] })],
  ['squarefree, k = 4, b = 1/2', series({ kind: 'squarefree-almost-primes', k: 4, exclude: none }, '1', '1/2')],
  ['prime powers', series({ kind: 'distinct-prime-factors', k: 1, exclude: none })],
  ['3 distinct prime factors, b = 3', series({ kind: 'distinct-prime-factors', k: 3, exclude: none }, '1', '3')],
  ['2 distinct odd prime factors without 71', series({ kind: 'distinct-prime-factors', k: 2, exclude: [2, 71] })],
  ['integers, b = 5/2', series({ kind: 'integers', exclude: none }, '1', '5/2')],
  ['squarefree integers coprime to 6, b = 2', series({ kind: 'squarefree', exclude: [2, 3] }, '1', '2')],
  ['11-smooth', series({ kind: 'smooth', y: 11, exclude: none })],
  ['11-smooth, s = 3/2', series({ kind: 'smooth', y: 11, exclude: none }, '3/2', '1')],
  ['primes, s = 2, b = 1/3', series({ kind: 'primes', exclude: none }, '2', '1/3')],
  ['3-almost primes, s = 101/100', series({ kind: 'almost-primes', k: 3, exclude: none }, '101/100', '1')],
  ['integers, s = 4/3', series({ kind: 'integers', exclude: none }, '4/3', '1')],
  ['primes in a class', series({ kind: 'residue-class', modulus: 12, residue: 5, exclude: [17] })],
  ['primes in a class, s = 5/4', series({ kind: 'residue-class', modulus: 5, residue: 2, exclude: none }, '5/4', '1')],
]

describe('panels and trapezoid, two theorems', () => {
  it.each(cases)('%s: the enclosures meet and are as narrow as asked', async (_name, definition) => {
    const [[coarse], [fine], other] = [await run([definition], 9), await run([definition], 26), await byTrapezoid(definition, 22)]
    for (const [outcome, digits] of [[coarse, 9], [fine, 26]] as const) {
      expect(meet(outcome.enclosure, other.enclosure)).toBe(true)
      expect(compare(parseRational(outcome.radius)!, rational(1, 10n ** BigInt(digits)))).toBe(-1)
      expect(outcome.digits.truncated).toBeGreaterThanOrEqual(digits)
    }
    expect(meet(coarse.enclosure, fine.enclosure)).toBe(true)
  })

  it.each([cases[0], cases[3], cases[7], cases[8], cases[13]])('%s: with MPFR too', async (_name, definition) => {
    const [[ball], [mpfr]] = [await run([definition], 20), await run([definition], 12, { arithmetic: 'mpfr' })]
    expect(meet(ball.enclosure, mpfr.enclosure)).toBe(true)
    expect(mpfr.digits.truncated).toBeGreaterThanOrEqual(12)
  })
})

describe('identities', () => {
  const value = async (definition: Definition): Promise<Outcome> => (await run([definition], 30))[0]

  it('the prime powers', async () => {
    // Sum of 1/(q log q) over the prime powers q: 2.00666645… (R. J. Mathar, arXiv:0811.4739, abstract).
    const [outcome] = await run([series({ kind: 'distinct-prime-factors', k: 1, exclude: none })], 20)
    expect(sharesDigits(outcome.enclosure, '2.0066664')).toBe(true)
  })

  it('squarefree k = 2 is k = 2 less half of the sum over p of 1/(p^2 log p)', async () => {
    const [all, squarefree, squares] = await Promise.all([
      value(series({ kind: 'almost-primes', k: 2, exclude: none })),
      value(series({ kind: 'squarefree-almost-primes', k: 2, exclude: none })),
      value(series({ kind: 'primes', exclude: none }, '2', '1')),
    ])
    const [a, b, c] = [all, squarefree, squares].map(({ enclosure }) => parseDecimal(enclosure.lo)!)
    const gap = subtract(subtract(a, b), multiply(c, rational(1, 2)))
    expect(compare(multiply(gap, gap), rational(1, 10n ** 60n))).toBe(-1)
  })
})

describe('published values', () => {
  it('k = 1 … 6 as in the literature', async () => {
    const table = await run([
      series({ kind: 'primes', exclude: none }),
      ...[2, 3, 4, 5, 6, 7].map((k) => series({ kind: 'almost-primes', k, exclude: none })),
    ], 40)
    // k = 1: Cohen 1998, as printed in Forum Math. Pi 11 (2023) e18, p. 2; k = 6, 7: J. Number Theory 211 (2020), Fig. 2 and 3.
    expect(contains(table[0].enclosure, '1.6366')).toBe(true)
    expect(sharesDigits(table[5].enclosure, '0.98875345')).toBe(true)
    expect(sharesDigits(table[6].enclosure, '0.99102059')).toBe(true)
    // Further digits with Arb 2.23 and PARI/GP 2.15.
    const computed = ['1.63661632335126086856965800392186367118159', '1.14481657340591799152445017389334107913130',
      '1.03083510179321757195568889979610039092593', '0.997342148595252359777593599548', '0.988882192130075534905150182886',
      '0.988753453014509606323117537451']
    computed.forEach((digits, i) => expect(contains(table[i].enclosure, digits)).toBe(true))
  })

  it('odd and squarefree', async () => {
    const odd = await run([series({ kind: 'primes', exclude: [2] }), ...[2, 3].map((k) => series({ kind: 'almost-primes', k, exclude: [2] }))], 28)
    const squarefree = await run([2, 3].map((k) => series({ kind: 'squarefree-almost-primes', k, exclude: none })), 28)
    // Arb 2.23 and PARI/GP 2.15.
    ;['0.915268802906779164889695663420', '0.619685094441076291526849838347', '0.546010010883498718419889654689']
      .forEach((digits, i) => expect(contains(odd[i].enclosure, digits)).toBe(true))
    ;['0.890925479476318332137262621995', '0.713123800509890255412029279069']
      .forEach((digits, i) => expect(contains(squarefree[i].enclosure, digits)).toBe(true))
  })

  it('a hundred digits of k = 1', async () => {
    const [outcome] = await run([series({ kind: 'primes', exclude: none })], 100)
    // Arb 2.23 and PARI/GP 2.15.
    const printed = '1.636616323351260868569658003921863671181597076131293058600304919781339974467946986547004038525584798989'
    expect(contains(outcome.enclosure, printed)).toBe(true)
    expect(outcome.digits.truncated).toBeGreaterThanOrEqual(100)
  })
})

describe('a run', () => {
  const definition = series({ kind: 'almost-primes', k: 2, exclude: none })

  it('is repeated by its parameters to the last bit, whatever is computed beside it', async () => {
    const [first] = await run([definition], 15)
    const [again] = await run([definition], 15, { parameters: first.parameters })
    const [, beside] = await run([series({ kind: 'squarefree-almost-primes', k: 3, exclude: [2] }), definition], 15, { parameters: first.parameters })
    expect(again).toEqual(first)
    expect(beside.enclosure).toEqual(first.enclosure)
  })

  it('tells enclosures on the way that contain the last one', async () => {
    const computation = await panels.prepare(request([definition], 15))
    const results: (ShardResult | undefined)[] = []
    let told = 0
    for (let i = 0; i < computation.shardCount; i++) {
      results.push(JSON.parse(JSON.stringify(await computation.runShard(i))))
      const interim = await computation.interim!(results)
      if (interim) told += 1
      const [outcome] = i + 1 === computation.shardCount ? await computation.combine(results as ShardResult[]) : []
      if (outcome) expect(outcome.convergence.every((point) => meet(point, outcome.enclosure))).toBe(true)
    }
    expect(told).toBeGreaterThan(1)
    expect(await computation.interim!([undefined, ...results.slice(1)])).toBeNull()
  })

  it('has a budget that adds up to the radius', async () => {
    const [outcome] = await run([definition], 15)
    const total = outcome.budget.reduce((sum, { magnitude }) => sum + Number(magnitude), 0)
    expect(total / Number(outcome.radius)).toBeGreaterThan(0.9)
    expect(total / Number(outcome.radius)).toBeLessThan(1.3)
    expect(outcome.budget.map(({ bound }) => bound)).toEqual(expect.arrayContaining(['P-4', 'P-7', 'P-8']))
  })

  it('refuses results that do not belong together', async () => {
    const computation = await panels.prepare(request([definition], 8))
    const results: ShardResult[] = []
    for (let i = 0; i < computation.shardCount; i++) results.push(await computation.runShard(i))
    await expect(computation.combine([results[1], results[0], ...results.slice(2)])).rejects.toThrow(/another cut/)
    await expect(computation.combine(results.slice(0, -1))).rejects.toThrow(/all its shards/)
    await expect(computation.combine([...results.slice(0, -2), results[results.length - 1]])).rejects.toThrow()
  })

  it('stays true with poor parameters, only wider', async () => {
    const [good] = await run([definition], 15)
    const half = String(good.parameters.panelNodes).split(',').map((n) => String(Math.ceil(Number(n) / 2)))
    const ends = String(good.parameters.panelEnds).split(',')
    const poor: Record<string, string | number>[] = [
      { edgeNodes: 9 },
      { terms: 12, split: 7 },
      { panelNodes: half.join() },
      { panelEnds: [...ends.slice(0, -1), '12'].join() },
    ]
    for (const change of poor) {
      const [outcome] = await run([definition], 15, { parameters: { ...good.parameters, ...change } })
      expect(compare(parseRational(good.radius)!, parseRational(outcome.radius)!)).toBe(-1)
      expect(contains(outcome.enclosure, '1.14481657340591799152445017389'), JSON.stringify(change)).toBe(true)
    }
  })
})

describe('refusals', () => {
  const primes = series({ kind: 'primes', exclude: none })
  const refusal = async (work: () => Promise<unknown>): Promise<EngineRefusal> => {
    const error = await work().then(() => null, (thrown: unknown) => thrown)
    expect(error).toBeInstanceOf(EngineRefusal)
    return error as EngineRefusal
  }

  it.each([
    ['edge', '2'],
    ['edge', '0'],
    ['edgeReach', '1/2'],
    ['edgeReach', '-1/4'],
    ['edgeNodes', 1],
    ['precision', 1e9],
    ['precision', '100'],
    ['panelEnds', '1,1,4'],
    ['panelAxes', '5,5,5,5,5'],
    ['panelNodes', '3'],
    ['terms', 0],
    ['split', 2.5],
  ])('of the parameter %s = %s', async (name, value) => {
    const [{ parameters }] = await run([primes], 5)
    const error = await refusal(() => panels.prepare(request([primes], 5, { parameters: { ...parameters, [name]: value } })))
    expect(error.code).toBe('unsound_parameter')
  })

  it('of parameters too poor to enclose anything', async () => {
    // 32 bits do not tell s0 + t from 1.
    const near: Definition = { type: 'series', set: { kind: 'primes', exclude: none }, weight: { power: '1000000000001/1000000000000', logPower: '1' } }
    const { parameters } = await panels.prepare(request([near], 5))
    const error = await refusal(() => run([near], 5, { parameters: { ...parameters, precision: 32 } }))
    expect(error.code).toBe('unsound_parameter')
  })

  it('of what has no such integral', async () => {
    const cases: [Definition[], string][] = [
      [[series({ kind: 'primes', exclude: none }, '2', '0')], 'method_does_not_fit'],
      [[{ type: 'named', name: 'mertens' }], 'method_does_not_fit'],
      [[primes, series({ kind: 'primes', exclude: none }, '2', '1')], 'mixed_weights'],
    ]
    for (const [definitions, code] of cases) {
      expect((await refusal(() => panels.prepare(request(definitions, 10)))).code).toBe(code)
      expect(panels.forecast(definitions[0], { digits: 10 }, 'ball', 1).possible).toBe(code === 'mixed_weights')
    }
    expect((await refusal(() => panels.prepare(request([primes], 5000)))).field).toBe('digits')
    expect((await refusal(() => panels.prepare(request([primes], 10, { goal: { cutoff: '1000' } })))).field).toBe('cutoff')
  })
})

describe('the singularity at the edge', () => {
  const a = createBallArithmetic(200)
  const context = createZetaContext(a, { terms: 80, split: 60 })
  const sets: SetOfIntegers[] = [
    { kind: 'primes', exclude: [5] },
    { kind: 'almost-primes', k: 4, exclude: none },
    { kind: 'squarefree-almost-primes', k: 3, exclude: [3] },
    { kind: 'distinct-prime-factors', k: 3, exclude: [2] },
    { kind: 'integers', exclude: [7] },
    { kind: 'squarefree', exclude: none },
    { kind: 'smooth', y: 7, exclude: none },
    { kind: 'residue-class', modulus: 5, residue: 2, exclude: [7] },
    { kind: 'residue-class', modulus: 24, residue: 17, exclude: none },
  ]
  const point = (t: Ball, log: Ball) => new PrimeZeta(new ZetaPoint(context, t, log))

  it.each(sets)('%j: the parts make up the series, and keep their bounds', (set) => {
    const edge = edgeSeries(set)!
    const whole = dirichletSeries(set, ONE)!
    whole.prepare?.(context)
    const room = edge.room?.(a)
    const [eps, reach] = room ? [divide(room, rational(3)), divide(room, rational(2))] : [rational(1, 2), rational(31, 64)]
    const bounds = edge.partBounds(eps, reach, a)
    for (const x of [rational(1, 1000), rational(1, 7), rational(99, 100)]) {
      const t = a.rational(multiply(eps, x))
      const parts = edge.parts(point(t, a.log(a.rational(eps))))
      const logInverse = a.negate(a.log(a.rational(x)))
      let [total, power] = [a.rational(rational(0)), a.rational(ONE)]
      for (let i = 0; i <= edge.logs; i++) {
        total = a.add(total, a.multiply(power, parts[edge.logs - i]))
        power = a.scale(a.multiply(power, logInverse), rational(1, i + 1))
        expect(compare(a.upper(parts[i]), bounds[i])).toBeLessThanOrEqual(0)
      }
      const direct = whole.evaluate(point(t, a.log(t)))
      expect(ballContains(a, a.subtract(total, direct), rational(0))).toBe(true)
      expect(a.subtract(total, direct).rad < 1n << 60n).toBe(true)
    }
  })

  it('over a class is refused beyond the disc in which no L-function vanishes, and L(1, chi) is bounded from below', () => {
    const edge = edgeSeries({ kind: 'residue-class', modulus: 5, residue: 2, exclude: [] })!
    const room = edge.room!(a)
    expect(() => edge.partBounds(divide(room, rational(2)), room, a)).toThrow('no L-function')
    // PARI/GP 2.15, abs(lfun([znstar(q, 1), chi], 1)) over all chi but the principal one: the least for each q.
    for (const [q, least] of [[3, 0.6045997881], [4, 0.7853981634], [5, 0.430408941], [12, 0.7603459963], [43, 0.4790883882], [97, 0.3890925912], [100, 0.6283185307]]) {
      const found = leastAtOne(a, q)
      expect(Math.abs(Number(found.num) / Number(found.den) - least)).toBeLessThan(1e-8)
    }
  })

  it('over a class needs small primes split off, or is refused', () => {
    expect(() => residueClassSeries(5, 2, [], ONE).prepare!(createZetaContext(a, { terms: 80, split: 40 }))).toThrow('split')
  })
})
