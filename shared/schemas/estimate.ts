import { z } from 'zod'
import { instant } from './common.ts'

/** GET /estimates, GET /estimates/:id */
export const estimate = z.object({
  id: z.string(),
  title: z.string(),
  statementLatex: z.string(),
  statement: z.string(),
  validFor: z.string(),
  conditional: z.boolean(),
  /** What it is conditional on. */
  condition: z.string().nullable(),
  source: z.string(),
  /** What was checked and how far, e.g. "checked numerically to 10^8; source text not seen". */
  checked: z.string(),
  state: z.enum(['in-force', 'in-doubt']),
  stateSince: instant.nullable(),
  /** How many signed claims rest on it. */
  uses: z.number().int(),
  /** The newest of them: a few in the list, up to 500 with the estimate itself. */
  usedBy: z.array(z.object({ claimNumber: z.string(), usedAt: z.string() })),
})
export type Estimate = z.infer<typeof estimate>
