import { z } from 'zod'
import { parseClaimNumber } from '../constant-number.ts'
import { constantNumber, decimalText, digest, enclosure, id, instant, longText, pageOf, pageQuery, personRef } from './common.ts'
import { definitionView } from './definition.ts'
import { arithmetic, method, outcome, runState } from './run.ts'

/** A claim in an address: its id, or its number as MST-0042-1. */
export const claimReference = z.union([
  id,
  z.string().regex(/^MST-\d{4,9}-\d{1,6}$/, 'write the number of a claim such as MST-0042-1').refine((text) => parseClaimNumber(text) !== null, 'is not how the number of a claim is written, such as MST-0042-1'),
])

export const claimState = z.enum(['draft', 'submitted', 'in-review', 'returned', 'endorsed', 'signed', 'superseded', 'suspended', 'withdrawn'])
export type ClaimState = z.infer<typeof claimState>

/** POST /claims. A new kind of claim is one more member here and one more file in each folder of the server. */
export const claimInput = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('enclosure'), runId: id, remark: z.string().trim().max(20_000).default('') }),
  z.object({
    kind: z.literal('stated'),
    constant: constantNumber,
    /** Digits as printed, read as truncated or rounded, or an interval. */
    value: z.union([z.object({ digits: z.string().trim().min(1).max(20_000), reading: z.enum(['truncated', 'rounded']) }), enclosure]),
    source: longText,
    remark: z.string().trim().max(20_000).default(''),
  }),
  z.object({ kind: z.literal('order'), lesser: constantNumber, greater: constantNumber, remark: z.string().trim().max(20_000).default('') }),
])
export type ClaimInput = z.input<typeof claimInput>
export const claimKind = z.enum(['enclosure', 'stated', 'order'])

/** PATCH /claims/:id while a draft or returned. `version` is the one that was read: a stale one is refused. */
export const claimPatch = z.object({
  version: z.number().int(),
  remark: z.string().trim().max(20_000).optional(),
  source: z.string().trim().max(20_000).optional(),
  runId: id.optional(),
})

/** Acts on a claim, each a POST /claims/:id/<act>; the state machine is shared/claim-life.ts. */
export const act = {
  submit: z.object({ version: z.number().int() }),
  assign: z.object({ refereeId: id, note: z.string().trim().max(5_000).default('') }),
  remind: z.object({ assignmentId: id }),
  accept: z.object({}),
  decline: z.object({ reason: longText }),
  recheck: z.object({ method, arithmetic, digits: z.number().int().min(1).optional(), cutoff: z.string().optional() }),
  object: z.object({ text: longText }),
  answer: z.object({ objectionId: id, text: longText }),
  /** The referee's word on an answer: settled closes the objection, upheld keeps it and returns the claim. */
  settle: z.object({ objectionId: id, outcome: z.enum(['settled', 'upheld']), text: z.string().trim().max(20_000).default('') }),
  confirm: z.object({ version: z.number().int(), remark: longText, checklist: z.array(z.object({ item: z.string().max(500), checked: z.boolean() })).max(200).default([]) }),
  return: z.object({ reason: longText }),
  resubmit: z.object({ version: z.number().int(), remark: longText }),
  sign: z.object({ version: z.number().int(), password: z.string().min(1, 'is needed').max(200) }),
  suspend: z.object({ reason: longText }),
  reinstate: z.object({ reason: longText }),
  withdraw: z.object({ reason: longText }),
}
export type Act = keyof typeof act

/** PUT /claims/:id/verdict-draft */
export const verdictDraft = z.object({ text: z.string().max(20_000) })

export const claimSummary = z.object({
  id,
  /** MST-0042/1, from submission on; null while a draft that was never submitted. */
  number: z.string().nullable(),
  kind: claimKind,
  constant: constantNumber,
  definition: definitionView,
  /** For an order: the greater constant. */
  otherConstant: constantNumber.nullable(),
  enclosure: enclosure.nullable(),
  digits: z.object({ truncated: z.number().int(), rounded: z.number().int() }).nullable(),
  state: claimState,
  inConflict: z.boolean(),
  /** False for a value from elsewhere until a run of ours meets it. */
  repeatedHere: z.boolean(),
  author: personRef,
  group: z.object({ id, name: z.string() }),
  /** Since when it is in this state. */
  since: instant,
  signedAt: instant.nullable(),
})
export type ClaimSummary = z.infer<typeof claimSummary>

export const assignment = z.object({
  id,
  referee: personRef,
  refereeGroup: z.string(),
  state: z.enum(['asked', 'accepted', 'declined']),
  verdict: z.enum(['confirmed', 'objected']).nullable(),
  /** False where the claim was changed after this verdict, so that it no longer counts. */
  verdictCurrent: z.boolean(),
  remark: z.string().nullable(),
  declineReason: z.string().nullable(),
  checklist: z.array(z.object({ item: z.string(), checked: z.boolean() })),
  askedAt: instant,
  answeredAt: instant.nullable(),
  verdictAt: instant.nullable(),
})
export const objection = z.object({
  id,
  referee: personRef,
  state: z.enum(['open', 'answered', 'settled', 'upheld']),
  messages: z.array(z.object({ author: personRef, text: z.string(), at: instant })),
  /** Whether this reader may answer or settle it. */
  abilities: z.object({ answer: z.boolean(), settle: z.boolean() }),
})
export const evidence = z.object({
  id,
  name: z.string(),
  /** Told from the content. */
  mediaType: z.string(),
  bytes: z.number().int(),
  digest,
  uploadedBy: personRef,
  uploadedAt: instant,
})
export const recheckView = z.object({
  runId: id,
  /** Null for readers outside the review. */
  startedBy: personRef.nullable(),
  state: runState,
  progress: z.number(),
  method,
  arithmetic,
  enclosure: enclosure.nullable(),
  /** `meets`: the enclosures have a common point; `independent`: other arithmetic or other method than the claim's run. */
  verdict: z.enum(['meets', 'disjoint']).nullable(),
  independent: z.boolean(),
  finishedAt: instant.nullable(),
  failure: z.string().nullable(),
})
export const historyEntry = z.object({ at: instant, actor: z.string(), act: z.string(), from: claimState.nullable(), to: claimState.nullable(), reason: z.string().nullable() })

export const claim = claimSummary.extend({
  version: z.number().int(),
  remark: z.string(),
  source: z.string().nullable(),
  run: z.object({ id, method, arithmetic }).nullable(),
  outcome: outcome.nullable(),
  /** Digest that verdicts and signature are about. */
  digest,
  certificate: z.object({ digest, signed: z.boolean(), keyId: z.string().nullable() }).nullable(),
  evidence: z.array(evidence),
  assignments: z.array(assignment),
  objections: z.array(objection),
  rechecks: z.array(recheckView),
  /** Open doubts about estimates that it rests on, of the reader's group and of groups that publish. */
  doubts: z.array(z.object({ estimate: z.string(), title: z.string(), group: z.object({ id, name: z.string() }), at: instant, reason: z.string() })),
  /** Each estimate and bound to check, made from the certificate. */
  checklist: z.array(z.object({ item: z.string(), detail: z.string() })),
  confirmations: z.object({ have: z.number().int(), need: z.number().int(), recheckNeeded: z.boolean(), recheckDone: z.boolean() }),
  conflicts: z.array(z.object({ claim: z.string(), claimId: id, openedAt: instant, closedAt: instant.nullable() })),
  supersededBy: z.string().nullable(),
  supersedes: z.string().nullable(),
  /** For an order: the two enclosures it rests on. */
  order: z.object({ lesser: z.object({ constant: constantNumber, text: z.string(), enclosure }), greater: z.object({ constant: constantNumber, text: z.string(), enclosure }) }).nullable(),
  statedValue: z.object({ digits: z.string(), reading: z.enum(['truncated', 'rounded']) }).nullable(),
  /** Who is to act next, in words: "the author: answer the objection". */
  next: z.string(),
  history: z.array(historyEntry),
  signature: z.object({ by: z.string(), at: instant }).nullable(),
  cite: z.object({ plain: z.string(), bibtex: z.string() }).nullable(),
  /** Own private verdict draft. */
  draftVerdict: z.string().nullable(),
  /** Members who may be asked to referee this claim; only for leads. */
  possibleReferees: z.array(personRef.extend({ group: z.string() })),
  abilities: z.record(z.string(), z.boolean()),
})
export type Claim = z.infer<typeof claim>

export const claimQuery = pageQuery.extend({ state: claimState.optional(), mine: z.stringbool().optional(), constant: constantNumber.optional() })
export const claimPage = pageOf(claimSummary)

/** POST /digit-checks: pasted digits of a manuscript against a claim, a constant or a given enclosure. */
export const digitCheckInput = z.object({
  against: z.union([z.object({ claim: claimReference }), z.object({ constant: constantNumber }), z.object({ enclosure })]),
  text: z.string().min(1, 'paste the digits').max(100_000),
  reading: z.enum(['truncated', 'rounded']),
})
const verdict = z.enum(['confirmed', 'refuted', 'undecided'])
export const digitCheck = z.object({
  /** The number as read from the text. */
  read: decimalText,
  sign: verdict,
  /** One entry a digit after the sign: the digit and what is known of it. */
  digits: z.array(z.object({ digit: z.string(), place: z.number().int(), verdict })),
  /** The number as a whole. */
  whole: verdict,
  /** Place up to which the digits fit no number of the enclosure any more; 0 and below: before the point; null: they fit. */
  firstWrong: z.number().int().nullable(),
  /** Places after the point that are confirmed one after the other. */
  confirmed: z.number().int(),
  /** Whether the interval of an uncertainty in the text contains the enclosure; null where the text states none. */
  uncertainty: verdict.nullable(),
  /** What came out, for a person. */
  summary: z.string(),
  enclosure,
})
export type DigitCheck = z.infer<typeof digitCheck>

/** GET /desk */
export const deskItem = z.object({
  kind: z.enum(['answer', 'resubmit', 'finish-draft', 'accept', 'review', 'settle', 'assign', 'sign', 'conflict', 'remind', 'decide']),
  claim: claimSummary,
  since: instant,
  text: z.string(),
})
export const desk = z.object({
  researcher: z.array(deskItem),
  referee: z.array(deskItem),
  lead: z.array(deskItem),
  /** How much waits in each part in all: the lists hold what has waited longest. */
  total: z.object({ researcher: z.number().int(), referee: z.number().int(), lead: z.number().int() }),
})
export type Desk = z.infer<typeof desk>
