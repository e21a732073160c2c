import { z } from 'zod'
import { claimKind, claimState } from './claim.ts'
import { constantNumber, digest, id, instant, longText, personRef } from './common.ts'
import { definitionView } from './definition.ts'
import { goal, runState } from './run.ts'

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
  /** In doubt where a doubt is open that the reader may know of: of their own group, or of one that publishes. */
  state: z.enum(['in-force', 'in-doubt']),
  stateSince: instant.nullable(),
  /** Those doubts in the order of time, lifted ones too. */
  doubts: z.array(z.object({ group: z.object({ id, name: z.string() }), own: z.boolean(), at: instant, reason: z.string(), lifted: z.object({ at: instant, reason: z.string() }).nullable() })),
  /** Whether this reader may see what a doubt brings down, and mark or lift one. */
  abilities: z.object({ doubt: z.boolean() }),
  /** How many signed claims rest on it. */
  uses: z.number().int(),
  /** The newest of them: a few in the list, up to 500 with the estimate itself. */
  usedBy: z.array(z.object({ claimNumber: z.string(), usedAt: z.string() })),
})
export type Estimate = z.infer<typeof estimate>

/** POST /estimates/:id/doubt. The digest is that of the list which the lead has read. */
export const doubtInput = z.object({ reason: longText, digest })
/** POST /estimates/:id/doubt/lift, with the suspended claims that are to be in force again. */
export const liftInput = z.object({ reason: longText, reinstate: z.array(id).max(10_000).default([]) })

export const restingClaim = z.object({
  id,
  number: z.string(),
  kind: claimKind,
  /** The constant in words; for an order both, as "… < …". */
  text: z.string(),
  state: claimState,
  author: personRef,
  /** For an order: the claims on the estimate whose enclosures it compares. */
  through: z.array(z.string()),
  /**
   * What a doubt does to it. `falls`: in force, and will be suspended; `fallen`: a doubt has suspended it; `suspended`: for another
   * reason; `waits`: before the register, where it can be neither endorsed nor signed.
   */
  fate: z.enum(['falls', 'fallen', 'suspended', 'waits']),
})

/** GET /estimates/:id/doubt: what rests on an estimate in the lead's group, all of it. */
export const estimateDoubt = z.object({
  estimate: z.string(),
  /** The group's open doubt. */
  doubt: z.object({ id, by: personRef, at: instant, reason: z.string() }).nullable(),
  /** Changes with the list of claims and with what is in it. */
  digest,
  claims: z.array(restingClaim),
  /** Constants with an enclosure that rests on it, of another group too where an own order does: what to compute again, and what there is already. */
  again: z.array(
    z.object({
      constant: constantNumber,
      definition: definitionView,
      goal,
      /** The narrowest enclosure in force that does not rest on the estimate. */
      other: z.object({ claimNumber: z.string(), digits: z.number().int() }).nullable(),
      /** The newest run of the group without the estimate since it was marked. */
      run: z.object({ id, state: runState }).nullable(),
    }),
  ),
})
export type EstimateDoubt = z.infer<typeof estimateDoubt>

/** What came of lifting a doubt; claims that could not be reinstated are told with the reason. */
export const liftResult = z.object({ reinstated: z.array(z.string()), kept: z.array(z.object({ claimNumber: z.string(), reason: z.string() })), now: estimateDoubt })
export type LiftResult = z.infer<typeof liftResult>
