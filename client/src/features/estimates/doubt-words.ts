import type { EstimateDoubt } from '../../../../shared/schemas/estimate.ts'

export type RestingClaim = EstimateDoubt['claims'][number]
export type Fate = RestingClaim['fate']

/** How claims that share a fate are headed, before and after an estimate is marked, in the order in which they are shown. */
export const FATES: readonly [Fate, title: string, tells: string][] = [
  ['falls', 'In force: they fall', 'They are suspended together the moment the estimate is marked.'],
  ['fallen', 'Suspended by the doubt', 'Nothing should be built on them until the doubt is lifted or a claim without the estimate takes their place.'],
  ['waits', 'Before the register: they are held', 'They stay where they are and can be neither endorsed nor signed while the doubt is open.'],
  ['suspended', 'Suspended for another reason', 'They can’t be reinstated while the doubt is open.'],
]

export const ofFate = ({ claims }: EstimateDoubt, fate: Fate): RestingClaim[] => claims.filter((claim) => claim.fate === fate)

/** "1 claim", "3 claims". */
export const claimCount = (count: number): string => (count === 1 ? '1 claim' : `${count} claims`)

/** What will happen when an estimate is marked, in one sentence. */
export function markTells(doubt: EstimateDoubt): string {
  const [falls, waits] = [ofFate(doubt, 'falls').length, ofFate(doubt, 'waits').length]
  if (falls + waits === 0) return 'No claim of your group in force or in review rests on it. Marking it keeps new runs of your group from using it.'
  const parts = [
    ...(falls > 0 ? [`suspends ${claimCount(falls)} of your group`] : []),
    ...(waits > 0 ? [`holds back ${falls > 0 ? `${waits} more` : `${claimCount(waits)} of your group`} on the way to the register`] : []),
  ]
  return `Marking it ${parts.join(' and ')}; everybody concerned is told in one mail, and new runs of your group do without the estimate.`
}
