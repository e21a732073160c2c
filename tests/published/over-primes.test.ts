import { describe, expect, it } from 'vitest'
import { computeAll } from '../../shared/engine/engine.ts'
import { expansion } from '../../shared/engine/methods/expansion.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { loadExpressionParser, parseRationalFunction } from '../../shared/engine/sets/rational-function.ts'

await loadExpressionParser()

async function digitsOf(definition: Definition, digits: number): Promise<string> {
  const [outcome] = await computeAll(await expansion.prepare({ definitions: [definition], method: 'expansion', arithmetic: 'ball', goal: { digits } }))
  expect(outcome.digits.truncated).toBeGreaterThanOrEqual(digits)
  return outcome.enclosure.lo.slice(0, digits + 2)
}

function overPrimes(text: string, combine: 'sum' | 'product', exclude: number[] = []): Definition {
  const { numerator, denominator } = parseRationalFunction(text)
  return { type: 'over-primes', numerator: numerator.map(String), denominator: denominator.map(String), combine, exclude }
}

describe('constants over the primes in the literature', () => {
  it('twin prime constant: 0.66016 18158 46869 57392 78121 (J. W. Wrench, Math. Comp. 15 (1961) 396-398)', async () => {
    expect(await digitsOf(overPrimes('1 - 1/(p-1)^2', 'product', [2]), 25)).toBe('0.6601618158468695739278121')
  })

  it("Artin's constant: 0.37395 58136 19202 28805 47280 54346 41641 51116 (Wrench, as above)", async () => {
    expect(await digitsOf(overPrimes('1 - 1/(p*(p-1))', 'product'), 40)).toBe('0.3739558136192022880547280543464164151116')
  })

  it('Mertens constant: 0.26149 72128 47643 (J. B. Rosser and L. Schoenfeld, Illinois J. Math. 6 (1962), (2.10))', async () => {
    expect(await digitsOf({ type: 'named', name: 'mertens' }, 15)).toBe('0.261497212847642')
    expect(await digitsOf({ type: 'named', name: 'mertens' }, 16)).toMatch(/^0\.2614972128476427[5-9]?/)
  })

  it('prime zeta values P(2), P(3), P(4) (C. W. Merrifield 1881; C.-E. Froeberg, BIT 8 (1968) 187-202; digits from memory, there rounded: P(4) ends in 106)', async () => {
    expect(await digitsOf(overPrimes('1/p^2', 'sum'), 44)).toBe('0.45224742004106549850654336483224793417323134')
    expect(await digitsOf(overPrimes('1/p^3', 'sum'), 44)).toBe('0.17476263929944353642311331466570670097541212')
    expect(await digitsOf(overPrimes('1/p^4', 'sum'), 44)).toBe('0.07699313976424684494261929593315787016204105')
  })

  it('prod (1 - p^-2) = 6/pi^2, pi to 30 decimals (Abramowitz and Stegun, Table 1.1)', async () => {
    const pi = 3141592653589793238462643383279n // 10^30 pi, cut off
    const [low, high] = [pi + 1n, pi].map((n) => (6n * 10n ** 87n) / (n * n))
    expect(`${low}`).toBe(`${high}`)
    expect(await digitsOf(overPrimes('1 - 1/p^2', 'product'), 27)).toBe(`0.${low}`)
  })
})
