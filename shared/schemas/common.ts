import { z } from 'zod'

/** Identifier of a row that has no register number. */
export const id = z.uuid()
/** Instant, ISO 8601 in UTC; shown in the reader's zone. */
export const instant = z.iso.datetime()
/** Exact decimal text, e.g. "1.6366" or "-0.25": never a JSON number, never a float. */
export const decimalText = z.string().regex(/^-?\d+(\.\d+)?$/, 'write a plain decimal number').max(20_000)
/** SHA-256 in lower-case hexadecimal. */
export const digest = z.string().regex(/^[0-9a-f]{64}$/)
export const shortText = z.string().trim().min(1, 'is needed').max(200)
export const longText = z.string().trim().min(1, 'is needed').max(20_000)
/** Register number of a constant: MST-0042. */
export const constantNumber = z.string().regex(/^MST-\d{4,}$/, 'write a register number such as MST-0042')
/** Number of a claim: MST-0042/1, written MST-0042-1 in an address. */
export const enclosure = z.object({ lo: decimalText, hi: decimalText })

export const pageQuery = z.object({
  cursor: z.string().max(500).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(25),
})

/** A page of a list; `next` is the cursor of the following page. */
export const pageOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), next: z.string().nullable(), total: z.number().int().optional() })

/** A person as others see them. */
export const personRef = z.object({ id, name: z.string() })
export type PersonRef = z.infer<typeof personRef>

/** RFC 9457 problem, the body of every refusal. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  /** Stable machine-readable reason, e.g. "own_claim". */
  code: z.string(),
  /** What is wrong and what to do next, for a person. */
  detail: z.string(),
  /** One entry a field at fault; the path is dotted ("definition.set.k"). */
  fields: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  requestId: z.string().optional(),
})
export type Problem = z.infer<typeof problem>
