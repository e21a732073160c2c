import type { Transaction } from 'sequelize'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import type { Json } from '../audit/canonical.ts'
import type { Claim } from '../models/claim.ts'

/** What a claim says, as its kind makes it from what the author gave. */
export interface ClaimContent {
  constantId: string
  otherConstantId: string | null
  lo: string | null
  hi: string | null
  digitsTruncated: number | null
  digitsRounded: number | null
  runId: string | null
  basis: { [key: string]: Json }
  source: string | null
  repeatedHere: boolean
  /** Text of the file to download, unsigned, and the digest it carries. */
  certificate: string
  certificateDigest: string
}

/** Who puts a claim to the register, and for which group. */
export interface Claimant {
  id: string
  groupId: string
}

/** What an author may change of a claim's content after it was drafted. */
export interface ContentPatch {
  source?: string | undefined
  runId?: string | undefined
}

/** A published estimate that a group has in doubt. */
export interface EstimateDoubt {
  estimate: string
  /** The group's name. */
  group: string
}

/** One thing for a referee to check. */
export interface ChecklistItem {
  item: string
  detail: string
}

/**
 * A kind of claim. A new one is a file beside this one, a line in kinds.ts, and a member of `claimInput`; everything else about a
 * claim's life is the same for all.
 */
export interface ClaimKind<Input> {
  /** Whether a group may ask for a recheck before it is endorsed: the enclosure was computed here. */
  readonly computed: boolean
  /** The content of a new claim. Refuses, with the field at fault, what cannot be claimed. */
  content(transaction: Transaction, claimant: Claimant, input: Input): Promise<ClaimContent>
  /** The content anew, from the claim and what changes of it: after an edit, and when it is put to the register. */
  renew(transaction: Transaction, claimant: Claimant, claim: Claim, patch: ContentPatch): Promise<ClaimContent>
  /** Refuses a signature where what the claim rests on no longer stands. */
  beforeSigning(transaction: Transaction, claim: Claim): Promise<void>
  /** What a referee has to look at, from the certificate; `doubts` are open ones about estimates that the claim rests on. */
  checklist(claim: { basis: { [key: string]: Json }; source: string | null }, outcome: Outcome | null, doubts: readonly EstimateDoubt[]): ChecklistItem[]
}
