import { z } from 'zod'

const integer = z.number().int().nonnegative().max(Number.MAX_SAFE_INTEGER)
const exclude = z.array(integer).max(200).default([])
/** A rational as text: "1", "-2", "1/2" or "0.5"; the engine reduces it. */
export const rationalText = z.string().trim().regex(/^-?\d{1,9}(\.\d{1,9}|\/\d{1,9})?$/, 'write a whole number, a fraction such as 1/2, or a decimal')

/**
 * A definition as typed: the engine's `canonicalDefinition` decides what it means, whether it converges, and which number it
 * is. Bounds here only keep the input small; the engine gives the reasons.
 */
export const setInput = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('primes'), exclude }),
  z.object({ kind: z.literal('almost-primes'), k: integer, exclude }),
  z.object({ kind: z.literal('squarefree-almost-primes'), k: integer, exclude }),
  z.object({ kind: z.literal('distinct-prime-factors'), k: integer, exclude }),
  z.object({ kind: z.literal('integers'), exclude }),
  z.object({ kind: z.literal('squarefree'), exclude }),
  z.object({ kind: z.literal('smooth'), y: integer, exclude }),
  z.object({ kind: z.literal('residue-class'), modulus: integer, residue: integer, exclude }),
  z.object({ kind: z.literal('finite'), members: z.array(z.string().regex(/^\d{1,40}$/)).max(100_000) }),
])

export const definitionInput = z.discriminatedUnion('type', [
  z.object({ type: z.literal('series'), set: setInput, weight: z.object({ power: rationalText.default('1'), logPower: rationalText.default('1') }) }),
  z.object({ type: z.literal('over-primes'), expression: z.string().trim().min(1).max(500), combine: z.enum(['sum', 'product']), exclude }),
  z.object({ type: z.literal('named'), name: z.enum(['mertens', 'twin-prime', 'artin']) }),
])
export type DefinitionInput = z.input<typeof definitionInput>

/** A definition as the server sends it: canonical data with its two readings. */
export const definitionView = z.object({
  /** Canonical definition; see shared/engine/sets/definition.ts. */
  canonical: z.unknown(),
  latex: z.string(),
  /** One line in plain text. */
  text: z.string(),
  /** Other usual names of the same number, e.g. "odd primes". */
  aliases: z.array(z.string()),
})
export type DefinitionView = z.infer<typeof definitionView>
