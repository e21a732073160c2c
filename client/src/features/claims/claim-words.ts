import type { ClaimSummary } from '../../../../shared/schemas/claim.ts'

/** What a claim is called: its number, or before its first submission the constant it is about. */
export function claimName(claim: Pick<ClaimSummary, 'number' | 'constant'>): string {
  return claim.number ?? `draft for ${claim.constant}`
}
