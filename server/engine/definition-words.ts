import type { z } from 'zod'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import type { definitionInput } from '../../shared/schemas/definition.ts'
import { fold, readTextQuery } from '../queries/constant-text.ts'

type DefinitionInput = z.output<typeof definitionInput>

/** Words that are part of a definition and of no other use. */
const UNDERSTOOD = new Set(['prime', 'primes', 'almost', 'squarefree', 'distinct', 'factor', 'factors', 'exactly', 'numbers', 'integer', 'products', 'product', 'powers', 'n', 'p', 'k'])

const NAMED: [RegExp, 'mertens' | 'twin-prime' | 'artin'][] = [
  [/\bmertens\b/, 'mertens'],
  [/\btwin[- ]primes?\b/, 'twin-prime'],
  [/\bartin('s)?\b/, 'artin'],
]

/**
 * The definition that words mean, such as "odd, k = 3", "squarefree, k = 2, 1/(n log^2 n)", "1/(p log p)", or the number of a constant in
 * the register; without a weight it is 1/(n log n). Refuses what it does not understand in full: nothing is guessed.
 */
export function definitionOfWords(text: string): DefinitionInput | { number: number } {
  const folded = fold(text)
  const name = NAMED.find(([pattern]) => pattern.test(folded))
  if (name) return { type: 'named', name: name[1] }
  const query = readTextQuery(text)
  if (query.number !== undefined) return { number: query.number }
  const unknown = query.words.filter((word) => !UNDERSTOOD.has(word))
  if (text.trim() === '' || query.digits !== undefined || unknown.length > 0) {
    const what = unknown.length > 0 ? `"${unknown.join(' ')}" is not understood` : 'It is empty or holds digits'
    throw new EngineRefusal('definition_not_understood', 'definition', `${what}: write a register number, or words such as "odd, k = 3" or "1/(p log p)".`)
  }
  const exclude = query.exclude ?? (query.odd ? [2] : [])
  const weight = { power: query.power ?? '1', logPower: query.logPower ?? '1' }
  return { type: 'series', set: setOf(folded, query.k, query.overPrimes ?? false, exclude), weight }
}

function setOf(words: string, k: number | undefined, overPrimes: boolean, exclude: number[]): Extract<DefinitionInput, { type: 'series' }>['set'] {
  if (k !== undefined) {
    if (/\bdistinct\b/.test(words)) return { kind: 'distinct-prime-factors', k, exclude }
    return { kind: /\bsquarefree\b/.test(words) ? 'squarefree-almost-primes' : 'almost-primes', k, exclude }
  }
  if (/\bprime powers\b/.test(words)) return { kind: 'distinct-prime-factors', k: 1, exclude }
  if (overPrimes || /\bprimes?\b/.test(words)) return { kind: 'primes', exclude }
  return { kind: /\bsquarefree\b/.test(words) ? 'squarefree' : 'integers', exclude }
}
