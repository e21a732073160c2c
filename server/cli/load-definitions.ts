import { EngineRefusal } from '../../shared/engine/errors.ts'
import { definitionInput, type DefinitionInput } from '../../shared/schemas/definition.ts'
import { readDefinition, type ReadDefinition } from '../engine/definition.ts'
import { Problem } from '../errors.ts'

/** Whole numbers by chance, below the given one. */
export type Roll = (below: number) => number

export const pick = <T>(roll: Roll, items: readonly T[]): T => items[roll(items.length)]!

const PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37]
const LOG_POWERS = ['1', '1', '1', '1', '0', '1/2', '3/2', '2', '5/2', '3', '4', '1/3', '7/3', '-1']

/** Nothing is excluded from nearly half the sets, 2 from a quarter, a few primes from the others. */
function someExclusions(roll: Roll): number[] {
  const kind = roll(20)
  if (kind < 9) return []
  if (kind < 14) return [2]
  return PRIMES.filter(() => roll(PRIMES.length) < 2)
}

const someWeight = (roll: Roll) => (roll(3) === 0 ? { power: '1', logPower: pick(roll, ['1', '1', '2', '1/2', '3/2', '3']) } : { power: `${4 + roll(21)}/4`, logPower: pick(roll, LOG_POWERS) })

function someSet(roll: Roll): Extract<DefinitionInput, { type: 'series' }>['set'] {
  const exclude = someExclusions(roll)
  const kind = roll(100)
  if (kind < 12) return { kind: 'primes', exclude }
  if (kind < 45) return { kind: 'almost-primes', k: 2 + roll(19), exclude }
  if (kind < 60) return { kind: 'squarefree-almost-primes', k: 2 + roll(11), exclude }
  if (kind < 72) return { kind: 'distinct-prime-factors', k: 1 + roll(8), exclude }
  if (kind < 90) return { kind: 'residue-class', modulus: 3 + roll(60), residue: 1 + roll(60), exclude: [] }
  if (kind < 93) return { kind: 'integers', exclude }
  if (kind < 95) return { kind: 'squarefree', exclude }
  if (kind < 98) return { kind: 'smooth', y: pick(roll, PRIMES), exclude: [] }
  return { kind: 'finite', members: Array.from({ length: 3 + roll(40) }, (_, index) => String(2 + 25 * index + roll(25))) }
}

function someDefinition(roll: Roll): DefinitionInput {
  if (roll(200) === 0) return { type: 'over-primes', expression: `${1 + roll(9)}/(p^${1 + roll(4)}*(p+${1 + roll(30)}))`, combine: 'sum', exclude: someExclusions(roll) }
  return { type: 'series', set: someSet(roll), weight: someWeight(roll) }
}

/** Definitions by chance, each another number. What diverges or makes no sense is left out, as the register would refuse it. */
export function* definitions(roll: Roll): Generator<ReadDefinition, never> {
  const seen = new Set<string>()
  for (;;) {
    try {
      const read = readDefinition(definitionInput.parse(someDefinition(roll)))
      if (!seen.has(read.key)) yield read
      seen.add(read.key)
    } catch (error) {
      if (!(error instanceof EngineRefusal || error instanceof Problem)) throw error
    }
  }
}
