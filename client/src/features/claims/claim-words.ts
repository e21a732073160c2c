import type { ClaimSummary } from '../../../../shared/schemas/claim.ts'

/** What a claim is called: its number, or before its first submission the constant it is about. */
export function claimName(claim: Pick<ClaimSummary, 'number' | 'constant'>): string {
  return claim.number ?? `draft for ${claim.constant}`
}

export const KIND_WORDS: Record<ClaimSummary['kind'], string> = {
  enclosure: 'Enclosure from a run',
  stated: 'Value from elsewhere',
  order: 'Order between two constants',
}
