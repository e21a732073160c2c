import { estimateById } from '../../shared/engine/estimates/library.ts'
import type { EstimateUse } from '../../shared/engine/methods/computation.ts'
import type { ChecklistItem } from './claim-kind.ts'

/** A published estimate as a thing to check: what it says, where it holds, where it was used, on what it is conditional. */
export function estimateItem({ id, usedAt, validFor, conditional }: EstimateUse): ChecklistItem {
  const estimate = estimateById(id)
  const statement = estimate ? `${estimate.statement} (${estimate.source}).` : 'This release does not know the estimate.'
  const condition = conditional ? `Conditional${estimate?.condition ? ` on ${estimate.condition}` : ''}.` : 'Unconditional.'
  return { item: `Estimate ${id}${estimate ? `: ${estimate.title}` : ''}`, detail: `${statement} Holds for ${validFor}. Used at ${usedAt}. ${condition}` }
}
