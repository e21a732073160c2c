import { describe, expect, test } from 'vitest'
import { METHODS, computeAll, prepare } from '../../shared/engine/engine.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import type { Goal } from '../../shared/engine/methods/goal.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { parseRational, compare } from '../../shared/engine/arithmetic/rational.ts'

/*
 * Estimates that nothing may rest on. Held against the transform and the same sum with all estimates: enclosures of one number meet
 * (common practice, no source).
 */

const over = (set: SetOfIntegers, power = '1'): Definition => ({ type: 'series', set, weight: { power, logPower: '1' } })
const SETS: Record<string, Definition> = {
  primes: over({ kind: 'primes', exclude: [] }),
  'primes, steeper': over({ kind: 'primes', exclude: [2] }, '2'),
  'products of two primes': over({ kind: 'almost-primes', k: 2, exclude: [] }),
  'a residue class': over({ kind: 'residue-class', modulus: 4, residue: 1, exclude: [] }),
}
const ALL = ESTIMATES.map(({ id }) => id)
const sumOf = async (definition: Definition, without: readonly string[], goal: Goal = { cutoff: '30000' }): Promise<Outcome> =>
  (await computeAll(await prepare({ definitions: [definition], method: 'partial-sum', arithmetic: 'ball', goal, without })))[0]!
const number = (text: string) => parseRational(text)!
const meet = (a: Outcome, b: Outcome): boolean => compare(number(a.enclosure.lo), number(b.enclosure.hi)) <= 0 && compare(number(b.enclosure.lo), number(a.enclosure.hi)) <= 0
const refusal = async (work: Promise<unknown>): Promise<string> => work.then(() => 'none', (error) => (error instanceof EngineRefusal ? error.code : String(error)))

describe.each(Object.entries(SETS))('over %s', (_name, definition) => {
  test('leaving out what was used, one after the other, never uses it again and encloses the same number less narrowly', async () => {
    let without: string[] = []
    const first = await sumOf(definition, [])
    for (let turn = 0; turn < 3; turn += 1) {
      const used = (await sumOf(definition, without)).estimates.map(({ id }) => id)
      without = [...without, ...used]
      const next = await sumOf(definition, without)
      expect(next.estimates.length).toBeGreaterThan(0)
      expect(next.estimates.filter(({ id }) => without.includes(id))).toEqual([])
      expect(String(next.parameters.estimates).split(',').filter((id) => without.includes(id))).toEqual([])
      expect(meet(first, next)).toBe(true)
      expect(compare(number(next.radius), number(first.radius))).toBeGreaterThanOrEqual(0)
    }
  }, 120_000)

  test('without any it is refused, in the forecast as in the run', async () => {
    for (const goal of [{ cutoff: '30000' }, { digits: 3 }]) {
      expect(METHODS['partial-sum'].forecast(definition, goal, 'ball', 1, ALL)).toMatchObject({ possible: false, reason: expect.stringContaining('none is left') })
      expect(await refusal(sumOf(definition, ALL, goal))).toBe('no_estimate')
    }
  })
})

// Of a class only estimates from 8 * 10^9 on are left then, which takes too long for a test.
test.each(['primes', 'primes, steeper', 'products of two primes'])('a goal over %s is still reached, from a later cut-off if need be', async (name) => {
  const definition = SETS[name]!
  const used = (await sumOf(definition, [])).estimates.map(({ id }) => id)
  const outcome = await sumOf(definition, used, { digits: 2 })
  expect(compare(number(outcome.radius), number('0.005'))).toBeLessThanOrEqual(0)
})

test('where estimates are left that begin beyond the first marks, the curve begins there', async () => {
  const from = (id: string) => ESTIMATES.find((each) => each.id === id)!.claim.from
  const early = ESTIMATES.filter(({ id }) => 'x' in from(id) && Number((from(id) as { x: string }).x) < 1_000_000).map(({ id }) => id)
  const outcome = await sumOf(SETS.primes!, early, { cutoff: '3000000' })
  expect(outcome.convergence.map(({ at }) => at)).toEqual(['1000000', '3000000'])
  expect(await refusal(sumOf(SETS.primes!, early, { cutoff: '30000' }))).toBe('no_estimate')
})

test('sums that need no estimate keep theirs, other methods do not care, and an unknown id is refused', async () => {
  const integers = over({ kind: 'squarefree', exclude: [] }, '2')
  expect((await sumOf(integers, ALL)).enclosure).toEqual((await sumOf(integers, [])).enclosure)
  expect(METHODS.transform.forecast(SETS.primes!, { digits: 10 }, 'ball', 1, ALL)).toEqual(METHODS.transform.forecast(SETS.primes!, { digits: 10 }, 'ball', 1))
  expect(await refusal(sumOf(SETS.primes!, ['nothing']))).toBe('unknown_estimate')
})

test('a certificate’s parameters repeat the sum as it was, whatever is in doubt since', async () => {
  const outcome = await sumOf(SETS.primes!, [])
  const again = await prepare({ definitions: [SETS.primes!], method: 'partial-sum', arithmetic: 'ball', goal: outcome.goal, parameters: outcome.parameters, without: ALL })
  expect((await computeAll(again))[0]!.enclosure).toEqual(outcome.enclosure)
})
