import { createHash } from 'node:crypto'
import type { z } from 'zod'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import { convergenceCondition } from '../../shared/engine/sets/convergence.ts'
import type { Definition, SetKind } from '../../shared/engine/sets/definition.ts'
import { loadExpressionParser } from '../../shared/engine/sets/rational-function.ts'
import { readDefinition as reading } from '../../shared/engine/sets/typeset.ts'
import type { definitionInput, DefinitionView } from '../../shared/schemas/definition.ts'
import { canonicalJson } from '../audit/canonical.ts'
import { askingEngine } from './refusal.ts'

await loadExpressionParser()

/** A definition that was typed, as the engine understands it. */
export interface ReadDefinition {
  definition: Definition
  /** SHA-256 of its canonical JSON: one number, one key. */
  key: string
  view: DefinitionView
  /** What the register filters by. */
  filters: { setKind: SetKind | 'over-primes' | 'named'; k: number | null; exclude: string; power: string | null; logPower: string | null }
}

/** A definition with its two readings. */
export function viewDefinition(definition: Definition): DefinitionView {
  return { canonical: definition, ...reading(definition) }
}

/** Reads a definition as typed; refuses what is none, or does not converge, with the field at fault. */
export function readDefinition(input: z.output<typeof definitionInput>): ReadDefinition {
  const definition = askingEngine(input.type === 'over-primes', () => canonicalDefinition(input))
  const key = createHash('sha256').update(canonicalJson(definition)).digest('hex')
  return { definition, key, view: viewDefinition(definition), filters: filtersOf(definition) }
}

function filtersOf(definition: Definition): ReadDefinition['filters'] {
  if (definition.type !== 'series') {
    const exclude = definition.type === 'over-primes' ? definition.exclude : []
    return { setKind: definition.type, k: null, exclude: exclude.join(','), power: null, logPower: null }
  }
  const { set, weight } = definition
  const k = set.kind === 'primes' ? 1 : 'k' in set ? set.k : null
  return { setKind: set.kind, k, exclude: 'exclude' in set ? set.exclude.join(',') : '', power: weight.power, logPower: weight.logPower }
}

/** A sentence on where the sum or product converges. */
export function convergenceText(definition: Definition): string {
  switch (definition.type) {
    case 'series':
      return `With terms n^-s (log n)^-b: ${convergenceCondition(definition.set)}.`
    case 'over-primes':
      return `The ${definition.combine} converges absolutely, since ${definition.combine === 'sum' ? 'the expression falls at least like' : 'a factor differs from 1 by at most about'} 1/p^2.`
    case 'named':
      return 'The limit exists.'
  }
}
