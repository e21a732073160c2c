import { describe, expect, it } from 'vitest'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { compare, multiply, parseRational, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { ComputationRequest, Enclosure, Outcome, ShardResult } from '../../shared/engine/methods/computation.ts'
import { levelOf } from '../../shared/engine/methods/trapezoid-sweep.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'

function series(set: SetOfIntegers, power = '1', logPower = '1'): Definition {
  return canonicalDefinition({ type: 'series', set, weight: { power, logPower } })
}

function request(definitions: Definition[], digits: number, more: Partial<ComputationRequest> = {}): ComputationRequest {
  return { definitions, method: 'transform', arithmetic: 'ball', goal: { digits }, ...more }
}

async function outcomeOf(definition: Definition, digits: number, more: Partial<ComputationRequest> = {}): Promise<Outcome> {
  const [outcome] = await computeAll(await prepare(request([definition], digits, more)))
  return outcome
}

function meet(a: Enclosure, b: Enclosure): boolean {
  const [aLo, aHi, bLo, bHi] = [a.lo, a.hi, b.lo, b.hi].map((text) => parseDecimal(text)!)
  return compare(aLo, bHi) <= 0 && compare(bLo, aHi) <= 0
}

const none: number[] = []
const semiprimes = series({ kind: 'almost-primes', k: 2, exclude: none })
const cases: [string, Definition][] = [
  ['primes', series({ kind: 'primes', exclude: none })],
  ['odd 3-almost primes', series({ kind: 'almost-primes', k: 3, exclude: [2] })],
  ['squarefree, k = 4, b = 1/2', series({ kind: 'squarefree-almost-primes', k: 4, exclude: none }, '1', '1/2')],
  ['3 distinct prime factors, b = 3', series({ kind: 'distinct-prime-factors', k: 3, exclude: none }, '1', '3')],
  ['integers, b = 5/2', series({ kind: 'integers', exclude: none }, '1', '5/2')],
  ['squarefree integers coprime to 6, b = 2', series({ kind: 'squarefree', exclude: [2, 3] }, '1', '2')],
  ['11-smooth, s = 3/2', series({ kind: 'smooth', y: 11, exclude: none }, '3/2', '1')],
  ['primes, s = 2, b = 1/3', series({ kind: 'primes', exclude: none }, '2', '1/3')],
  ['primes in a class', series({ kind: 'residue-class', modulus: 5, residue: 2, exclude: none })],
]

describe('the trapezoid', () => {
  it.each(cases)('%s: coarse and fine runs, and the other arithmetic, meet', async (_name, definition) => {
    const [coarse, fine] = [await outcomeOf(definition, 8), await outcomeOf(definition, 24)]
    const other = await outcomeOf(definition, 12, { arithmetic: 'mpfr' })
    expect(meet(coarse.enclosure, fine.enclosure)).toBe(true)
    expect(meet(fine.enclosure, other.enclosure)).toBe(true)
    for (const [outcome, digits] of [[coarse, 8], [fine, 24], [other, 12]] as const) {
      expect(compare(parseRational(outcome.radius)!, rational(1, 10n ** BigInt(digits)))).toBe(-1)
      expect(outcome.digits.truncated).toBeGreaterThanOrEqual(digits)
    }
  })

  it('every enclosure on the way contains the last one', async () => {
    const { convergence, enclosure } = await outcomeOf(semiprimes, 20)
    expect(convergence.length).toBeGreaterThanOrEqual(3)
    for (const point of convergence) expect(meet(point, enclosure)).toBe(true)
  })

  it('the parts of the budget add up to the radius', async () => {
    const { budget, radius } = await outcomeOf(semiprimes, 20)
    const total = budget.map((item) => parseRational(item.magnitude)!).reduce((a, b) => subtract(a, multiply(b, rational(-1))))
    const stated = parseRational(radius)!
    expect(compare(total, multiply(stated, rational(9, 10)))).toBe(1)
    expect(compare(total, multiply(stated, rational(12, 10)))).toBe(-1)
  })

  it('gives the same in a table as alone, and from its own parameters, to the last character', async () => {
    const table = [1, 2, 5].map((k) => series({ kind: 'almost-primes', k, exclude: none }))
    const together = await computeAll(await prepare(request(table, 15)))
    for (const outcome of together) {
      expect(await outcomeOf(outcome.definition, 15, { parameters: outcome.parameters })).toEqual(outcome)
    }
  })

  it('does not depend on who ran which shard when', async () => {
    const computation = await prepare(request([semiprimes], 12))
    const another = await prepare(request([semiprimes], 12, { parameters: computation.parameters }))
    const results: ShardResult[] = []
    for (let index = computation.shardCount - 1; index >= 0; index--) {
      const worker = index % 2 === 0 ? computation : another
      results[index] = JSON.parse(JSON.stringify(await worker.runShard(index))) as ShardResult
    }
    expect(await another.combine(results)).toEqual(await computeAll(computation))
  })

  it('stays true, only wider, with parameters that nobody would choose', async () => {
    const good = await outcomeOf(semiprimes, 25)
    const base = good.parameters
    const changed = [
      { ...base, step: '1/4' },
      { ...base, step: '1/5', gap: '1/3' },
      { ...base, first: -120 },
      { ...base, last: 20 },
      { ...base, precision: 60 },
      { ...base, terms: 9 },
      { ...base, split: 3 },
    ]
    for (const parameters of changed) {
      const outcome = await outcomeOf(semiprimes, 25, { parameters })
      expect(meet(outcome.enclosure, good.enclosure), JSON.stringify(parameters)).toBe(true)
    }
  })

  it.each([
    ['precision', 7],
    ['precision', 1e9],
    ['step', '0'],
    ['step', '3'],
    ['step', 'x'],
    ['gap', '-1/2'],
    ['first', 5],
    ['last', 1.5],
    ['terms', 0],
    ['split', 1],
    ['first', -1],
    ['last', 900],
  ])('refuses the parameter %s = %s', async (name, value) => {
    const { parameters } = await prepare(request([semiprimes], 10))
    const attempt = async () => computeAll(await prepare(request([semiprimes], 10, { parameters: { ...parameters, [name]: value } })))
    await expect(attempt()).rejects.toMatchObject({ name: 'EngineRefusal', code: 'unsound_parameter' })
  })

  it('knows how often 2 divides an index', () => {
    expect([0, 1, 2, 4, 8, 16, -1, -4, -12].map(levelOf)).toEqual([3, 0, 1, 2, 3, 3, 0, 2, 2])
  })
})

describe('identities between sums', () => {
  const digits = 22
  const value = async (definition: Definition): Promise<Enclosure> => (await outcomeOf(definition, digits)).enclosure
  const close = (a: string, b: string): boolean =>
    compare(rational(1, 10n ** 21n), (({ num, den }) => ({ num: num < 0n ? -num : num, den }))(subtract(parseDecimal(a)!, parseDecimal(b)!))) > 0
  const minus = (a: Enclosure, b: Enclosure): string => {
    const { num, den } = subtract(parseDecimal(a.lo)!, parseDecimal(b.lo)!)
    return `${num < 0n ? '-' : ''}0.${((num < 0n ? -num : num) * 10n ** 24n / den).toString().padStart(24, '0')}`
  }

  it('the sum over odd primes is that over all less 1/(2 log 2)', async () => {
    const [all, odd] = [await value(series({ kind: 'primes', exclude: none })), await value(series({ kind: 'primes', exclude: [2] }))]
    // 1/(2 log 2), PARI/GP.
    expect(close(minus(all, odd), '0.721347520444481703679962')).toBe(true)
  })

  it('squarefree semiprimes are the semiprimes less the squares of primes: half of sum 1/(p^2 log p)', async () => {
    const [all, squarefree, squares] = [
      await value(semiprimes),
      await value(series({ kind: 'squarefree-almost-primes', k: 2, exclude: none })),
      await value(series({ kind: 'primes', exclude: none }, '2', '1')),
    ]
    const half = multiply(parseDecimal(squares.lo)!, rational(1, 2))
    expect(close(minus(all, squarefree), `0.${(half.num * 10n ** 24n / half.den).toString().padStart(24, '0')}`)).toBe(true)
  })

  it('the primes 1 and 3 mod 4 make the odd primes', async () => {
    const classes = await Promise.all([1, 3].map((residue) => value(series({ kind: 'residue-class', modulus: 4, residue, exclude: none }))))
    const odd = await value(series({ kind: 'primes', exclude: [2] }))
    const total = minus(odd, classes[0])
    expect(close(total, classes[1].lo)).toBe(true)
  })
})

describe('the choice of nodes', () => {
  it('ends where the weight hardly decays and its bound has a power that no double holds', async () => {
    await expect(prepare(request([series({ kind: 'almost-primes', k: 60, exclude: none }, '1', '1/1000')], 18))).rejects.toMatchObject({ code: 'too_slow' })
  })
})
