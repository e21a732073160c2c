import { claimNumberText } from '../../shared/constant-number.ts'
import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import type { Estimate as EstimateView } from '../../shared/schemas/estimate.ts'
import type { EstimateUseRow } from '../queries/estimate.ts'

/** An estimate of the engine's library with the signed claims that rest on it. All that is in the library is in force. */
export const presentEstimate = (estimate: Estimate, uses: readonly EstimateUseRow[]): EstimateView => ({
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
  usedBy: uses.filter((use) => use.estimate === estimate.id).map((use) => ({ claimNumber: claimNumberText(use.number, use.ordinal), usedAt: use.used_at })),
})
