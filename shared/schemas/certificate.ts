import { z } from 'zod'
import type { Certificate } from '../engine/certificate/certificate.ts'
import { ARITHMETIC_NAMES, ERROR_SOURCES, METHOD_NAMES } from '../engine/methods/computation.ts'
import { WIDTH_HINT, parseWidth } from '../engine/methods/goal.ts'
import { LIMITS } from '../limits.ts'

/** The certificate's file format, version 1. Unknown members are refused: what is not understood is not certified. */

const decimal = z.string().regex(/^-?\d{1,60}(\.\d{1,2000})?$/)
const magnitude = z.string().regex(/^(0|\d\.\de-?\d{1,6})$/)
const rational = z.string().regex(/^-?\d{1,30}(\/\d{1,30})?$/)
const whole = z.number().int().nonnegative()
const exclude = z.array(z.number().int().min(2)).max(LIMITS.exclusions)
const hex = z.string().regex(/^[0-9a-f]{64}$/)

const set = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('primes'), exclude }),
  z.strictObject({ kind: z.literal('almost-primes'), k: whole, exclude }),
  z.strictObject({ kind: z.literal('squarefree-almost-primes'), k: whole, exclude }),
  z.strictObject({ kind: z.literal('distinct-prime-factors'), k: whole, exclude }),
  z.strictObject({ kind: z.literal('integers'), exclude }),
  z.strictObject({ kind: z.literal('squarefree'), exclude }),
  z.strictObject({ kind: z.literal('smooth'), y: whole, exclude }),
  z.strictObject({ kind: z.literal('residue-class'), modulus: whole, residue: whole, exclude }),
  z.strictObject({ kind: z.literal('finite'), members: z.array(z.string().regex(/^\d{1,40}$/)).max(LIMITS.members) }),
])

const coefficients = z.array(z.string().regex(/^-?\d{1,2000}$/)).max(200)

export const canonicalDefinitionSchema = z.discriminatedUnion('type', [
  z.strictObject({ type: z.literal('series'), set, weight: z.strictObject({ power: rational, logPower: rational }) }),
  z.strictObject({ type: z.literal('over-primes'), numerator: coefficients, denominator: coefficients, combine: z.enum(['sum', 'product']), exclude }),
  z.strictObject({ type: z.literal('named'), name: z.literal('mertens') }),
])

export const certificateSchema = z.strictObject({
  format: z.literal('merestone-certificate'),
  version: z.literal(1),
  definition: canonicalDefinitionSchema,
  method: z.enum(METHOD_NAMES),
  arithmetic: z.enum(ARITHMETIC_NAMES),
  goal: z.union([
    z.strictObject({ digits: z.number().int().min(1).max(LIMITS.digits) }),
    z.strictObject({ width: z.string().refine((text) => parseWidth(text) !== null, `a width is ${WIDTH_HINT}`) }),
    z.strictObject({ cutoff: z.string().regex(/^[1-9]\d{0,17}$/) }),
  ]),
  parameters: z.record(z.string().max(60), z.union([z.string().max(4000), z.number()])),
  enclosure: z.strictObject({ lo: decimal, hi: decimal }),
  radius: magnitude,
  digits: z.strictObject({ truncated: z.number().int().min(-1), rounded: z.number().int().min(-1) }),
  budget: z.array(
    z.strictObject({
      source: z.enum(ERROR_SOURCES),
      bound: z.string().max(20),
      magnitude,
    }),
  ).max(100),
  estimates: z.array(
    z.strictObject({ id: z.string().max(100), usedAt: z.string().max(500), validFor: z.string().max(500), conditional: z.boolean() }),
  ).max(100),
  engine: z.strictObject({ version: z.string().max(60), digest: hex }),
  digest: hex,
  signature: z.strictObject({ algorithm: z.literal('Ed25519'), keyId: z.string().max(100), value: z.string().regex(/^[A-Za-z0-9+/]{86}==$/) }).optional(),
})

/** Reads a certificate's text; the message says in one line what is wrong with it. */
export function readCertificate(text: string): { certificate: Certificate } | { problem: string } {
  let data: unknown
  try {
    data = JSON.parse(text)
  } catch {
    return { problem: 'The file is not JSON.' }
  }
  const parsed = certificateSchema.safeParse(data)
  if (parsed.success) return { certificate: parsed.data as Certificate }
  const [issue] = parsed.error.issues
  return { problem: `The file is no certificate: ${issue.path.join('.') || 'content'}: ${issue.message}` }
}
