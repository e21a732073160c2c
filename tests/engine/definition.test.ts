import { describe, expect, it } from 'vitest'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { type DefinitionText, canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import { convergenceCondition } from '../../shared/engine/sets/convergence.ts'
import type { SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { readDefinition } from '../../shared/engine/sets/typeset.ts'
import { loadExpressionParser } from '../../shared/engine/sets/rational-function.ts'

await loadExpressionParser()

function series(set: SetOfIntegers, power = '1', logPower = '1'): DefinitionText {
  return { type: 'series', set, weight: { power, logPower } }
}

function setOf(set: SetOfIntegers): SetOfIntegers {
  const definition = canonicalDefinition(series(set))
  return definition.type === 'series' ? definition.set : expect.fail('not a series')
}

function refusal(act: () => unknown): { code: string; field: string } {
  try {
    act()
  } catch (error) {
    if (error instanceof EngineRefusal) return { code: error.code, field: error.field }
    throw error
  }
  return expect.fail('nothing was refused')
}

const none: number[] = []

describe('one number has one definition', () => {
  it.each<[string, SetOfIntegers, SetOfIntegers]>([
    ['k = 1 is the primes', { kind: 'almost-primes', k: 1, exclude: [3, 2, 3] }, { kind: 'primes', exclude: [2, 3] }],
    ['squarefree k = 1 is the primes', { kind: 'squarefree-almost-primes', k: 1, exclude: none }, { kind: 'primes', exclude: none }],
    ['prime powers stay', { kind: 'distinct-prime-factors', k: 1, exclude: none }, { kind: 'distinct-prime-factors', k: 1, exclude: none }],
    ['y is a prime', { kind: 'smooth', y: 10, exclude: none }, { kind: 'smooth', y: 7, exclude: none }],
    ['y is the largest prime left', { kind: 'smooth', y: 10, exclude: [7, 11, 2] }, { kind: 'smooth', y: 5, exclude: [2] }],
    ['modulus 2', { kind: 'residue-class', modulus: 2, residue: 1, exclude: none }, { kind: 'primes', exclude: [2] }],
    ['modulus 1', { kind: 'residue-class', modulus: 1, residue: 0, exclude: [5] }, { kind: 'primes', exclude: [5] }],
    ['modulus 2m, m odd', { kind: 'residue-class', modulus: 10, residue: 7, exclude: [7, 3] }, { kind: 'residue-class', modulus: 5, residue: 2, exclude: [2, 7] }],
    ['a negative residue', { kind: 'residue-class', modulus: 4, residue: -1, exclude: [5] }, { kind: 'residue-class', modulus: 4, residue: 3, exclude: none }],
    ['a list', { kind: 'finite', members: ['10', '3', '010', '3'] }, { kind: 'finite', members: ['3', '10'] }],
  ])('%s', (_name, given, canonical) => {
    expect(setOf(given)).toEqual(canonical)
    expect(setOf(canonical)).toEqual(canonical)
  })

  it('weights are exact fractions in lowest terms', () => {
    const weight = (power: string, logPower: string) => (canonicalDefinition(series({ kind: 'primes', exclude: none }, power, logPower)) as { weight: object }).weight
    expect(weight('1.50', '2/4')).toEqual({ power: '3/2', logPower: '1/2' })
    expect(weight('2', '-3.0')).toEqual({ power: '2', logPower: '-3' })
    expect(weight('2', '0')).toEqual({ power: '2', logPower: '0' })
  })

  it('an expression is the quotient of polynomials that it is', () => {
    const text = (expression: string) => canonicalDefinition({ type: 'over-primes', expression, combine: 'sum', exclude: none })
    expect(text('1/(p*(p-1))')).toEqual(text('2p/(2p^3-2p^2)'))
    expect(canonicalDefinition(text('1/(p^2-1)'))).toEqual(text('1/(p^2-1)'))
    expect(canonicalDefinition({ type: 'named', name: 'twin-prime' })).toEqual({
      type: 'over-primes', numerator: ['0', '-2', '1'], denominator: ['1', '-2', '1'], combine: 'product', exclude: [2],
    })
    expect(canonicalDefinition({ type: 'named', name: 'mertens' })).toEqual({ type: 'named', name: 'mertens' })
  })
})

describe('what makes no sense is refused with the field at fault', () => {
  const almost = (k: number, exclude: number[] = none): DefinitionText => series({ kind: 'almost-primes', k, exclude })
  it.each<[string, DefinitionText, string, string]>([
    ['k = 0', almost(0), 'out_of_range', 'k'],
    ['k = 10^9', almost(1e9), 'out_of_range', 'k'],
    ['k = 1.5', almost(1.5), 'out_of_range', 'k'],
    ['an exclusion that is no prime', almost(2, [4]), 'not_a_prime', 'exclude'],
    ['an exclusion beyond reason', almost(2, [1000003]), 'not_a_prime', 'exclude'],
    ['no member left', series({ kind: 'smooth', y: 3, exclude: [2, 3] }), 'empty_set', 'exclude'],
    ['a class with a common divisor', series({ kind: 'residue-class', modulus: 10, residue: 5, exclude: none }), 'finite_class', 'residue'],
    ['a modulus too large', series({ kind: 'residue-class', modulus: 1e6, residue: 1, exclude: none }), 'out_of_range', 'modulus'],
    ['an empty list', series({ kind: 'finite', members: [] }), 'empty_set', 'members'],
    ['a list with 1', series({ kind: 'finite', members: ['1'] }), 'not_an_integer', 'members'],
    ['sum of 1/p', series({ kind: 'primes', exclude: none }, '1', '0'), 'diverges', 'logPower'],
    ['sum of log p/p', series({ kind: 'primes', exclude: none }, '1', '-1'), 'diverges', 'logPower'],
    ['sum of 1/(n log n)', series({ kind: 'integers', exclude: [2] }), 'diverges', 'logPower'],
    ['squarefree 1/(n log n)', series({ kind: 'squarefree', exclude: none }), 'diverges', 'logPower'],
    ['power below 1', series({ kind: 'primes', exclude: none }, '1/2', '5'), 'out_of_range', 'power'],
    ['a power that is no number', series({ kind: 'primes', exclude: none }, 'x'), 'not_a_number', 'power'],
    ['log to a broken negative power', series({ kind: 'primes', exclude: none }, '2', '-1/2'), 'out_of_range', 'logPower'],
    ['an expression like 1/p', { type: 'over-primes', expression: '1 + 1/(p+1)', combine: 'product', exclude: none }, 'diverges', 'expression'],
    ['a pole at a prime', { type: 'over-primes', expression: '1/(p-3)^2', combine: 'sum', exclude: [2] }, 'pole_at_prime', 'expression'],
    ['a factor that is 0', { type: 'over-primes', expression: '1 - 4/p^2', combine: 'product', exclude: none }, 'zero_factor', 'expression'],
    ['no rational function', { type: 'over-primes', expression: 'sin(p)', combine: 'sum', exclude: none }, 'not_rational_function', 'expression'],
  ])('%s', (_name, definition, code, field) => {
    expect(refusal(() => canonicalDefinition(definition))).toEqual({ code, field })
  })

  it('but what converges is taken', () => {
    for (const [set, power, logPower] of [
      [{ kind: 'smooth', y: 5, exclude: none }, '1', '-2'],
      [{ kind: 'integers', exclude: none }, '1', '1001/1000'],
      [{ kind: 'integers', exclude: none }, '11/10', '-5'],
      [{ kind: 'finite', members: ['2'] }, '1', '0'],
    ] as [SetOfIntegers, string, string][]) {
      expect(() => canonicalDefinition(series(set, power, logPower))).not.toThrow()
    }
    expect(convergenceCondition({ kind: 'integers', exclude: none })).toContain('b > 1')
  })
})

describe('readings', () => {
  it.each<[DefinitionText, string, string]>([
    [series({ kind: 'primes', exclude: none }), '\\sum_{p} \\frac{1}{p \\log p}', 'sum over primes p of 1/(p log p)'],
    [{ type: 'over-primes', expression: '(6p-1)/p^4', combine: 'sum', exclude: none }, '\\sum_{p} \\frac{6p - 1}{p^{4}}', 'sum over primes p of (6p - 1)/p^4'],
    [{ type: 'over-primes', expression: '1-1/(2*p^2)', combine: 'product', exclude: [2] }, '\\prod_{p \\ne 2} \\left(1 - \\frac{1}{2p^{2}}\\right)', 'product over primes p other than 2 of 1 - 1/(2p^2)'],
    [
      series({ kind: 'almost-primes', k: 3, exclude: [2] }),
      '\\sum_{\\substack{n \\ge 2 \\\\ \\Omega(n) = 3 \\\\ 2 \\nmid n}} \\frac{1}{n \\log n}',
      'sum over integers n with exactly 3 prime factors (with multiplicity), not divisible by 2 of 1/(n log n)',
    ],
    [series({ kind: 'integers', exclude: none }, '3/2', '-2'), '\\sum_{n \\ge 2} \\frac{\\log^{2} n}{n^{3/2}}', 'sum over integers n >= 2 of log^2 n/n^(3/2)'],
  ])('%o', (definition, latex, text) => {
    expect(readDefinition(canonicalDefinition(definition))).toMatchObject({ latex, text })
  })

  it('know the usual other names', () => {
    const aliases = (definition: DefinitionText) => readDefinition(canonicalDefinition(definition)).aliases
    expect(aliases(series({ kind: 'primes', exclude: [2] }))).toContain('odd primes')
    expect(aliases({ type: 'named', name: 'artin' })).toEqual(["Artin's constant"])
    expect(aliases({ type: 'named', name: 'twin-prime' })).toEqual(['twin prime constant'])
    expect(aliases(series({ kind: 'almost-primes', k: 2, exclude: none }))).toContain('semiprimes')
  })
})
