import { estimateById } from '../../shared/engine/estimates/library.ts'
import type { EstimateUse } from '../../shared/engine/methods/computation.ts'
import type { ChecklistItem, EstimateDoubt } from './claim-kind.ts'

/** A published estimate as a thing to check: what it says, where it holds, where it was used, on what it is conditional, who has it in doubt. */
export function estimateItem({ id, usedAt, validFor, conditional }: EstimateUse, doubts: readonly EstimateDoubt[]): ChecklistItem {
  const estimate = estimateById(id)
  const statement = estimate ? `${estimate.statement} (${estimate.source}).` : 'This release does not know the estimate.'
  const condition = conditional ? `Conditional${estimate?.condition ? ` on ${estimate.condition}` : ''}.` : 'Unconditional.'
  const groups = doubts.filter(({ estimate: other }) => other === id).map(({ group }) => group)
  const doubt = groups.length === 0 ? '' : ` In doubt at ${groups.join(' and ')}.`
  return { item: `Estimate ${id}${estimate ? `: ${estimate.title}` : ''}`, detail: `${statement} Holds for ${validFor}. Used at ${usedAt}. ${condition}${doubt}` }
}
