import { z } from 'zod'
import { constantNumber, enclosure, id } from './common.ts'

/**
 * POST /imports/preview and POST /imports take a CSV file (UTF-8) with the columns definition, digits, reading (truncated or rounded) and
 * source. The definition is a register number or words such as "odd, k = 3" or "1/(p log p)".
 */
export const importLine = z.object({
  /** Line of the file that it begins on. */
  line: z.number().int(),
  /**
   * `new`: a constant that is not stated yet; `first`: stated, but without a signed enclosure; `meets` or `contradicts` the signed
   * enclosure; `bad`: cannot be read.
   */
  verdict: z.enum(['new', 'first', 'meets', 'contradicts', 'bad']),
  /** What is wrong with a bad line, or what the verdict means. */
  message: z.string(),
  definition: z.object({ latex: z.string(), text: z.string() }).nullable(),
  constant: constantNumber.nullable(),
  enclosure: enclosure.nullable(),
})
export type ImportLine = z.infer<typeof importLine>
export const importPreview = z.object({ lines: z.array(importLine) })
export type ImportPreview = z.infer<typeof importPreview>

/** What an import made: a draft for every line that is not bad. */
export const importResult = z.object({
  drafts: z.array(z.object({ line: z.number().int(), claimId: id, constant: constantNumber })),
  /** Lines that were left out, with the reason. */
  left: z.array(z.object({ line: z.number().int(), message: z.string() })),
})
export type ImportResult = z.infer<typeof importResult>
