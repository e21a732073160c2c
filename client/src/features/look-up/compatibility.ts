import type { LookUpItem } from './queries.ts'

/** How digits stand to a constant: "compatible to 12 digits", "ruled out at place 7". */
export function compatibilityWords({ compatibleTo, ruledOutAt }: Pick<LookUpItem, 'compatibleTo' | 'ruledOutAt'>): string {
  if (ruledOutAt === null) return `compatible to ${compatibleTo} ${compatibleTo === 1 ? 'digit' : 'digits'}`
  if (ruledOutAt >= 1) return `ruled out at place ${ruledOutAt}`
  return ruledOutAt === 0 ? 'ruled out at the units' : 'ruled out before the point'
}
