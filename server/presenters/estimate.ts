import { claimNumberText } from '../../shared/constant-number.ts'
import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import type { Estimate as EstimateView } from '../../shared/schemas/estimate.ts'
import type { EstimateUseRow } from '../queries/estimate.ts'

/** An estimate of the engine's library with signed claims that rest on it. All that is in the library is in force. */
export function presentEstimate(estimate: Estimate, rows: readonly EstimateUseRow[]): EstimateView {
  const uses = rows.filter((row) => row.estimate === estimate.id)
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
    state: 'in-force',
    stateSince: null,
    uses: uses[0]?.uses ?? 0,
    usedBy: uses.map((use) => ({ claimNumber: claimNumberText(use.number, use.ordinal), usedAt: use.used_at })),
  }
}
