import { claimNumberText } from '../../shared/constant-number.ts'
import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import type { Estimate as EstimateView } from '../../shared/schemas/estimate.ts'
import { hasRight } from '../../shared/permissions.ts'
import type { Reader } from '../queries/audience.ts'
import type { EstimateUseRow } from '../queries/estimate.ts'
import type { DoubtRow } from '../queries/estimate-doubt.ts'

/** An estimate of the engine's library with signed claims that rest on it, and the doubts about it that the reader may know of. */
export function presentEstimate(estimate: Estimate, rows: readonly EstimateUseRow[], allDoubts: readonly DoubtRow[], reader: Reader): EstimateView {
  const uses = rows.filter((row) => row.estimate === estimate.id)
  const doubts = allDoubts.filter((row) => row.estimate === estimate.id)
  const open = doubts.find(({ lifted_at: lifted }) => lifted === null)
  return {
    id: estimate.id,
    title: estimate.title,
    statementLatex: estimate.statementLatex,
    statement: estimate.statement,
    validFor: estimate.validFor,
    conditional: estimate.conditional,
    condition: estimate.condition,
    source: estimate.source,
    checked: estimate.checked,
    state: open ? 'in-doubt' : 'in-force',
    stateSince: open?.marked_at.toISOString() ?? null,
    doubts: doubts.map((row) => ({
      group: { id: row.group_id, name: row.group_name },
      own: row.group_id === reader?.groupId,
      at: row.marked_at.toISOString(),
      reason: row.reason,
      lifted: row.lifted_at && row.lift_reason !== null ? { at: row.lifted_at.toISOString(), reason: row.lift_reason } : null,
    })),
    abilities: { doubt: reader !== undefined && hasRight(reader.roles, 'estimates.doubt') },
    uses: uses[0]?.uses ?? 0,
    usedBy: uses.map((use) => ({ claimNumber: claimNumberText(use.number, use.ordinal), usedAt: use.used_at })),
  }
}
