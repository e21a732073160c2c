import { parseRational, rational, toText, compare, ONE, type Rational, isInteger } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { canonicalExclusions, canonicalSet } from './canonical-set.ts'
import { requireConvergence } from './convergence.ts'
import type { Definition, NamedDefinition, OverPrimesDefinition, SeriesDefinition } from './definition.ts'
import { parseRationalFunction, reduce } from './rational-function.ts'

/** Limits of the exponents in a weight: beyond them the sum is its first terms and nothing is gained. */
const LARGEST_EXPONENT = 60
const LARGEST_DENOMINATOR = 1_000n

/** A definition as a person writes it; a canonical `Definition` is one too. */
export type DefinitionText =
  | SeriesDefinition
  | OverPrimesDefinition
  | { type: 'over-primes'; expression: string; combine: 'sum' | 'product'; exclude: number[] }
  | { type: 'named'; name: NamedDefinition['name'] | 'twin-prime' | 'artin' }

/**
 * The one canonical definition of the number that is meant: idempotent, and equal for definitions that say the same in
 * different words. Throws EngineRefusal with the field at fault where the definition makes no sense or the sum diverges.
 */
export function canonicalDefinition(input: DefinitionText): Definition {
  switch (input.type) {
    case 'series': {
      const definition: SeriesDefinition = { type: 'series', set: canonicalSet(input.set), weight: canonicalWeight(input.weight) }
      requireConvergence(definition)
      return definition
    }
    case 'over-primes':
      return canonicalOverPrimes(input)
    case 'named':
      return named(input.name)
  }
}

/** Twin primes: prod of 1 - 1/(p-1)^2 over p > 2; Artin: prod of 1 - 1/(p(p-1)). Only what is no such product keeps its name. */
function named(name: NamedDefinition['name'] | 'twin-prime' | 'artin'): Definition {
  switch (name) {
    case 'twin-prime':
      return canonicalOverPrimes({ type: 'over-primes', numerator: ['0', '-2', '1'], denominator: ['1', '-2', '1'], combine: 'product', exclude: [2] })
    case 'artin':
      return canonicalOverPrimes({ type: 'over-primes', numerator: ['-1', '-1', '1'], denominator: ['0', '-1', '1'], combine: 'product', exclude: [] })
    default:
      return { type: 'named', name }
  }
}

function exponent(text: string, field: 'power' | 'logPower'): Rational {
  const value = parseRational(text)
  if (!value) throw new EngineRefusal('not_a_number', field, `"${text.slice(0, 40)}" is no number: write 1, 1/2 or 0.5.`)
  if (value.den > LARGEST_DENOMINATOR || compare(value, rational(LARGEST_EXPONENT)) > 0 || compare(value, rational(-LARGEST_EXPONENT)) < 0) {
    throw new EngineRefusal('out_of_range', field, `The exponent must be between -${LARGEST_EXPONENT} and ${LARGEST_EXPONENT}, with a denominator up to ${LARGEST_DENOMINATOR}.`)
  }
  return value
}

function canonicalWeight(weight: SeriesDefinition['weight']): SeriesDefinition['weight'] {
  const power = exponent(weight.power, 'power')
  const logPower = exponent(weight.logPower, 'logPower')
  if (compare(power, ONE) < 0) throw new EngineRefusal('out_of_range', 'power', 'The power of n must be at least 1.')
  if (logPower.num < 0n && !isInteger(logPower)) {
    throw new EngineRefusal('out_of_range', 'logPower', 'A negative power of the logarithm must be a whole number.')
  }
  return { power: toText(power), logPower: toText(logPower) }
}

function canonicalOverPrimes(input: Exclude<DefinitionText, SeriesDefinition | { type: 'named' }>): OverPrimesDefinition {
  const exclude = canonicalExclusions(input.exclude)
  const f =
    'expression' in input
      ? parseRationalFunction(input.expression)
      : reduce({ numerator: trimmed(input.numerator), denominator: trimmed(input.denominator) })
  const definition: OverPrimesDefinition = {
    type: 'over-primes',
    numerator: f.numerator.map(String),
    denominator: f.denominator.map(String),
    combine: input.combine,
    exclude,
  }
  requireConvergence(definition)
  return definition
}

function trimmed(coefficients: readonly string[]): bigint[] {
  const numbers = coefficients.map((text) => {
    if (!/^-?\d{1,2000}$/.test(text)) throw new EngineRefusal('not_a_number', 'expression', 'A coefficient is no integer.')
    return BigInt(text)
  })
  while (numbers.length > 0 && numbers[numbers.length - 1] === 0n) numbers.pop()
  return numbers
}
