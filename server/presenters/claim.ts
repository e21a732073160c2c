import { judge, type Facts, type Standing } from '../../shared/claim-life.ts'
import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import { estimateById } from '../../shared/engine/estimates/library.ts'
import type { Claim, ClaimSummary } from '../../shared/schemas/claim.ts'
import { kindOf } from '../claim-kinds/kinds.ts'
import { orderOf } from '../claim-kinds/order.ts'
import { claimAbilities, mayCheckDigits, type View } from '../policies/claim.ts'
import type { Reader } from '../queries/audience.ts'
import type { ClaimDetailRow, ClaimRow } from '../queries/claim.ts'
import type { HistoryRow } from '../queries/claim-history.ts'
import type { AssignmentRow, ConflictRow, EvidenceRow, ObjectionRow, RecheckRow } from '../queries/claim-parts.ts'
import type { DoubtRow } from '../queries/estimate-doubt.ts'
import { citeClaim } from './claim-cite.ts'
import { nextStep } from './claim-next.ts'
import { presentOutcome } from './run.ts'

export const presentClaimSummary = (row: ClaimRow): ClaimSummary => ({
  id: row.id,
  number: row.ordinal === null ? null : claimNumberText(row.number, row.ordinal),
  kind: row.kind,
  constant: constantNumberText(row.number),
  definition: { canonical: row.definition, latex: row.latex, text: row.text, aliases: row.aliases },
  otherConstant: row.other_number === null ? null : constantNumberText(row.other_number),
  enclosure: row.lo === null || row.hi === null ? null : { lo: row.lo, hi: row.hi },
  digits: row.digits_truncated === null || row.digits_rounded === null ? null : { truncated: row.digits_truncated, rounded: row.digits_rounded },
  state: row.state,
  inConflict: row.in_conflict,
  repeatedHere: row.repeated_here,
  author: { id: row.author_id, name: row.author_name },
  group: { id: row.group_id, name: row.group_name },
  since: row.since.toISOString(),
  signedAt: row.signed_at?.toISOString() ?? null,
})

export const presentEvidence = (row: EvidenceRow): Claim['evidence'][number] => ({
  id: row.id,
  name: row.name,
  mediaType: row.media_type,
  bytes: row.bytes,
  digest: row.digest,
  uploadedBy: { id: row.uploaded_by, name: row.uploader_name },
  uploadedAt: row.uploaded_at.toISOString(),
})

const presentAssignment = (row: AssignmentRow): Claim['assignments'][number] => ({
  id: row.id,
  referee: { id: row.referee_id, name: row.referee_name },
  refereeGroup: row.referee_group,
  state: row.state,
  verdict: row.verdict,
  verdictCurrent: row.verdict_current,
  remark: row.remark,
  declineReason: row.decline_reason,
  checklist: row.checklist.map(({ item, checked }) => ({ item, checked })),
  askedAt: row.asked_at.toISOString(),
  answeredAt: row.answered_at?.toISOString() ?? null,
  verdictAt: row.verdict_at?.toISOString() ?? null,
})

/** A recheck; outside the review it is told without the referee's name. */
const presentRecheck = (row: RecheckRow, inside: boolean): Claim['rechecks'][number] => ({
  runId: row.id,
  startedBy: inside ? { id: row.started_by, name: row.starter_name } : null,
  state: row.state,
  progress: Number(row.progress),
  method: row.method,
  arithmetic: row.arithmetic,
  enclosure: row.lo === null || row.hi === null ? null : { lo: row.lo, hi: row.hi },
  verdict: row.verdict,
  independent: row.independent,
  finishedAt: row.finished_at?.toISOString() ?? null,
  failure: inside ? row.failure : null,
})

const presentHistory = (row: HistoryRow): Claim['history'][number] => ({ at: row.at.toISOString(), actor: row.actor_name, act: row.act, from: row.from, to: row.to, reason: row.reason })

const presentClaimDoubt = (row: DoubtRow): Claim['doubts'][number] => ({
  estimate: row.estimate,
  title: estimateById(row.estimate)?.title ?? row.estimate,
  group: { id: row.group_id, name: row.group_name },
  at: row.marked_at.toISOString(),
  reason: row.reason,
})

/** What of a claim's history is in the register: from the signature on, and when it was submitted. */
const PUBLIC_ACTS = new Set(['submit', 'sign', 'supersede', 'restore', 'suspend', 'reinstate', 'withdraw'])

function presentOrder({ kind, basis }: ClaimDetailRow): Claim['order'] {
  if (kind !== 'order') return null
  const { lesser, greater } = orderOf(basis)
  const side = ({ constant, text, enclosure }: typeof lesser) => ({ constant, text, enclosure: { lo: enclosure.lo, hi: enclosure.hi } })
  return { lesser: side(lesser), greater: side(greater) }
}

export interface ClaimParts {
  view: View
  reader: Reader
  standing: Standing | undefined
  facts: Facts
  evidence: EvidenceRow[]
  assignments: AssignmentRow[]
  objections: ObjectionRow[]
  rechecks: RecheckRow[]
  conflicts: ConflictRow[]
  doubts: DoubtRow[]
  history: HistoryRow[]
  possible: { id: string; name: string; group: string }[]
  draftVerdict: string | null
}

/** The objection as this reader may handle it. */
function presentObjection(row: ObjectionRow, claim: ClaimDetailRow, { standing, facts, reader }: ClaimParts): Claim['objections'][number] {
  const about: Facts = { ...facts, objection: { state: row.state, own: row.referee_id === reader?.id, refereeGone: row.referee_gone } }
  const may = (act: 'answer' | 'settle' | 'uphold') => judge(act, claim.state, standing, about).allowed
  return {
    id: row.id,
    referee: { id: row.referee_id, name: row.referee_name },
    state: row.state,
    messages: row.messages.map((message) => ({ author: { id: message.author_id, name: message.author_name }, text: message.text, at: new Date(message.at).toISOString() })),
    abilities: { answer: may('answer'), settle: may('settle') || may('uphold') },
  }
}

export function presentClaim(row: ClaimDetailRow, parts: ClaimParts): Claim {
  const { view, reader, standing, facts } = parts
  const inside = view === 'work'
  const numberOf = (ordinal: number | null) => (ordinal === null ? null : claimNumberText(row.number, ordinal))
  const history = parts.history.filter(({ act }) => inside || PUBLIC_ACTS.has(act))
  return {
    ...presentClaimSummary(row),
    definition: { canonical: row.full_definition, latex: row.latex, text: row.text, aliases: row.aliases },
    version: row.version,
    remark: row.remark,
    source: row.source,
    run: row.run_id === null || row.method === null || row.arithmetic === null ? null : { id: row.run_id, method: row.method, arithmetic: row.arithmetic },
    outcome: row.outcome && presentOutcome(row.outcome, row.certificate_digest),
    digest: row.digest,
    certificate: { digest: row.certificate_digest, signed: row.signed_at !== null, keyId: row.key_id },
    evidence: parts.evidence.map(presentEvidence),
    assignments: parts.assignments.map(presentAssignment),
    objections: parts.objections.map((objection) => presentObjection(objection, row, parts)),
    rechecks: parts.rechecks.filter(({ state }) => inside || state === 'done').map((recheck) => presentRecheck(recheck, inside)),
    doubts: parts.doubts.map(presentClaimDoubt),
    checklist: kindOf(row).checklist(row, row.outcome, parts.doubts.map(({ estimate, group_name }) => ({ estimate, group: group_name }))),
    confirmations: { have: facts.confirmations, need: facts.confirmationsNeeded, recheckNeeded: facts.recheckNeeded, recheckDone: facts.recheckMeets },
    conflicts: parts.conflicts
      .filter((conflict) => conflict.open || inside || conflict.other_group === reader?.groupId)
      .map((conflict) => ({ claim: claimNumberText(conflict.number, conflict.ordinal), claimId: conflict.other_id, openedAt: conflict.opened_at.toISOString(), closedAt: conflict.closed_at?.toISOString() ?? null })),
    supersededBy: numberOf(row.superseder_ordinal),
    supersedes: numberOf(row.superseded_ordinal),
    order: presentOrder(row),
    statedValue: (row.basis.printed as Claim['statedValue'] | undefined) ?? null,
    next: nextStep({ state: row.state, author: row.author_name, facts, assignments: parts.assignments, objections: parts.objections }),
    history: history.map(presentHistory),
    signature: row.signed_at === null || row.signer_name === null ? null : { by: row.signer_name, at: row.signed_at.toISOString() },
    cite: citeClaim(row),
    draftVerdict: parts.draftVerdict,
    possibleReferees: parts.possible.map(({ id, name, group }) => ({ id, name, group })),
    abilities: { ...claimAbilities(row.state, standing, facts), 'check-digits': mayCheckDigits({ signedAt: row.signed_at, groupPublic: row.group_public }, standing) },
  }
}
