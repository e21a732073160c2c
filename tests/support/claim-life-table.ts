import type { PersonAct } from '../../shared/claim-life.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'

/*
 * What is agreed of a claim's life, written down a second time and by people, for the tests: who may do an act at all, and in
 * which states it leads where. Whatever is not here has to be refused.
 */

export const STATES: readonly ClaimState[] = ['draft', 'submitted', 'in-review', 'returned', 'endorsed', 'signed', 'superseded', 'suspended', 'withdrawn']

/** In what capacity an act is done. */
export type Capacity = 'author' | 'lead' | 'lead without a part in it' | 'referee who is asked' | 'referee who has accepted' | 'referee who objected'

export interface Expectation {
  by: readonly Capacity[]
  to: Partial<Record<ClaimState, ClaimState>>
}

const UNDER_REVIEW = { 'in-review': 'in-review', returned: 'returned', endorsed: 'endorsed' } as const

export const EXPECTED: Record<PersonAct, Expectation> = {
  edit: { by: ['author'], to: { draft: 'draft', returned: 'returned' } },
  delete: { by: ['author'], to: { draft: 'draft' } },
  attach: { by: ['author'], to: { draft: 'draft', returned: 'returned' } },
  detach: { by: ['author'], to: { draft: 'draft' } },
  submit: { by: ['author'], to: { draft: 'submitted' } },
  answer: { by: ['author'], to: { returned: 'returned' } },
  resubmit: { by: ['author'], to: { returned: 'in-review' } },
  assign: { by: ['lead'], to: { submitted: 'in-review', ...UNDER_REVIEW } },
  remind: { by: ['lead'], to: UNDER_REVIEW },
  return: { by: ['lead'], to: { submitted: 'returned', 'in-review': 'returned', endorsed: 'returned' } },
  sign: { by: ['lead without a part in it'], to: { endorsed: 'signed' } },
  suspend: { by: ['lead'], to: { signed: 'suspended', superseded: 'suspended' } },
  reinstate: { by: ['lead'], to: { suspended: 'signed' } },
  withdraw: {
    by: ['lead'],
    to: { submitted: 'withdrawn', 'in-review': 'withdrawn', returned: 'withdrawn', endorsed: 'withdrawn', signed: 'withdrawn', superseded: 'withdrawn', suspended: 'withdrawn' },
  },
  accept: { by: ['referee who is asked'], to: UNDER_REVIEW },
  decline: { by: ['referee who is asked', 'referee who has accepted'], to: UNDER_REVIEW },
  recheck: { by: ['referee who has accepted'], to: UNDER_REVIEW },
  'draft-verdict': { by: ['referee who has accepted'], to: UNDER_REVIEW },
  object: { by: ['referee who has accepted'], to: { 'in-review': 'returned', endorsed: 'returned' } },
  settle: { by: ['referee who objected'], to: { 'in-review': 'in-review', returned: 'returned' } },
  uphold: { by: ['referee who objected'], to: { 'in-review': 'returned', returned: 'returned' } },
  confirm: { by: ['referee who has accepted'], to: { 'in-review': 'in-review', endorsed: 'endorsed' } },
}

export const ACTS = Object.keys(EXPECTED) as PersonAct[]
