import type { ErrorSource, Method } from './engine/methods/computation.ts'
import type { Claim, ClaimState, ClaimSummary } from './schemas/claim.ts'

/** Words for what the data name by a code, the same on every page, with and without JavaScript. */

/** States of a claim, and of a constant of which nothing is claimed yet. */
export const STATE_WORDS: Record<ClaimState | 'stated', string> = {
  stated: 'stated',
  draft: 'draft',
  submitted: 'submitted',
  'in-review': 'in review',
  returned: 'returned',
  endorsed: 'endorsed',
  signed: 'signed',
  superseded: 'superseded',
  suspended: 'suspended',
  withdrawn: 'withdrawn',
}

export const KIND_WORDS: Record<ClaimSummary['kind'], string> = {
  enclosure: 'Enclosure from a run',
  stated: 'Value from elsewhere',
  order: 'Order between two constants',
}

export const METHOD_WORDS: Record<Method, string> = {
  transform: 'transform, trapezoid',
  panels: 'transform, panels',
  'partial-sum': 'partial sum with tail',
  expansion: 'expansion in prime zeta values',
  derivatives: 'derivatives of the series',
  finite: 'finite sum',
}

export const SOURCE_WORDS: Record<ErrorSource, string> = {
  discretisation: 'Discretisation',
  'truncation-below': 'Truncation below',
  'truncation-above': 'Truncation above',
  tail: 'Tail',
  series: 'Series',
  rounding: 'Rounding',
}

const PAST: Record<string, string> = {
  create: 'drafted', draft: 'drafted', edit: 'edited', attach: 'added evidence', detach: 'removed evidence', submit: 'submitted', assign: 'assigned a referee', remind: 'reminded',
  accept: 'accepted to referee', decline: 'declined to referee', recheck: 'started a recheck', object: 'objected', answer: 'answered', settle: 'settled an objection',
  uphold: 'upheld an objection', confirm: 'confirmed', return: 'returned it', resubmit: 'resubmitted', endorse: 'endorsed', sign: 'signed', supersede: 'superseded',
  suspend: 'suspended', reinstate: 'reinstated', withdraw: 'withdrew', restore: 'restored', 'await-referee': 'put back to wait for a referee',
  conflict: 'found it in conflict', 'conflict-closed': 'found the conflict settled',
}

/** An act of the history in the past tense; one that is not known here is shown as the trail names it. */
export function pastWords(act: string): string {
  const name = act.replace(/^claim[.:]/, '')
  return PAST[name] ?? name
}

/** How many digits of a claim are certified, or follow from what its source states. */
export function digitsWords({ digits, kind, repeatedHere }: Pick<ClaimSummary, 'digits' | 'kind' | 'repeatedHere'>): string | null {
  if (!digits) return null
  const how = kind === 'stated' && !repeatedHere ? 'follow from what the source states' : 'certified'
  return `${digits.truncated} digits after the point ${how} when truncated, ${digits.rounded} when rounded.`
}

/** The usual caution: on what the claim rests and which arithmetics agree. */
export function cautionWords({ kind, outcome, rechecks, run }: Pick<Claim, 'kind' | 'outcome' | 'rechecks' | 'run'>): string {
  if (kind === 'order') return 'An order is as sound as the two enclosures that it compares: their claims say on what they rest.'
  const estimates = outcome?.estimates ?? []
  const conditional = estimates.filter((use) => use.conditional).length
  const meeting = rechecks.filter((recheck) => recheck.verdict === 'meets')
  const arithmetics = [...new Set([...(run ? [run.arithmetic] : []), ...meeting.map((recheck) => recheck.arithmetic)])]
  if (kind === 'stated') {
    const met = meeting.length > 0 ? ` Here it was met by a run with ${arithmetics.join(' and with ')} arithmetic.` : ''
    return `A value from elsewhere is as sound as its source.${met} Whoever builds a proof on it should read the source.`
  }
  const uses = estimates.length === 0 ? 'uses no published estimate' : `uses ${estimates.length} published estimate${estimates.length === 1 ? '' : 's'}`
  const under = conditional > 0 ? `, ${conditional} of them conditional` : ''
  const agree = arithmetics.length > 1 ? `; the arithmetics ${arithmetics.join(' and ')} agree` : arithmetics.length === 1 ? `; it was computed by ${arithmetics[0]} arithmetic alone` : ''
  return `An enclosure is as sound as the estimates it cites and the programs that computed it. This one ${uses}${under}${agree}. Whoever builds a proof on it should repeat it from the certificate.`
}

/** What stands of a conflict for a reader to whom the other claim, still in review, is not open. */
export const CONFLICT_UNSEEN = 'A claim that is not open to you yet has no number in common with it. At least one is wrong; it is being settled.'
