import { printedText } from '../../shared/printed-text.ts'
import { estimateById } from '../../shared/engine/estimates/library.ts'
import type { Desk } from '../../shared/schemas/claim.ts'
import type { ClaimRow } from '../queries/claim.ts'
import type { WaitingRow } from '../queries/desk.ts'
import { presentClaimSummary } from './claim.ts'

/** What is to be done, in words. */
export function deskText({ kind, count, who }: Pick<WaitingRow, 'kind' | 'count' | 'who'>): string {
  switch (kind) {
    case 'finish-draft':
      return 'Finish and submit your draft'
    case 'answer':
      return count === 1 ? 'Answer an objection' : `Answer ${count} objections`
    case 'resubmit':
      return 'Resubmit: it was returned to you'
    case 'accept':
      return 'Accept or decline the review'
    case 'review':
      return 'Check it and give your verdict'
    case 'settle':
      return count === 1 ? 'Your objection is answered: settle or uphold it' : `${count} of your objections are answered: settle or uphold them`
    case 'assign':
      return count === 0 ? 'Assign a referee' : 'Assign another referee: confirmations are missing'
    case 'remind':
      return count === 1 ? `Remind ${who}` : `Remind ${who} and ${count - 1} more`
    case 'sign':
      return 'Sign it into the register'
    case 'conflict':
      return 'Settle a conflict: two enclosures do not meet'
    case 'decide':
      return who === null ? 'Reinstate or withdraw: it is suspended' : `Suspended: the estimate “${printedText(estimateById(who)?.title ?? who)}” is in doubt`
  }
}

export function presentDesk(waiting: readonly WaitingRow[], claims: readonly ClaimRow[]): Desk {
  const byId = new Map(claims.map((claim) => [claim.id, presentClaimSummary(claim)]))
  const desk: Desk = { researcher: [], referee: [], lead: [], total: { researcher: 0, referee: 0, lead: 0 } }
  for (const row of waiting) {
    desk.total[row.part] = row.in_part
    const claim = byId.get(row.claim_id)
    if (claim) desk[row.part].push({ kind: row.kind, claim, since: row.since.toISOString(), text: deskText(row) })
  }
  return desk
}
