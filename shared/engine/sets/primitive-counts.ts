import { SMALL_LIMIT, factorSmall } from './primitive-factor.ts'

/** How many members have how many prime factors. */
export interface FactorCounts {
  /** byFactors[k] members have k prime factors, counted with multiplicity. */
  byFactors: number[]
  /** byDistinct[k] members have k distinct ones. */
  byDistinct: number[]
  /** Members that are squarefree. */
  squarefree: number
  /** Members too large to be factored here. */
  notFactored: number
}

/** Above SMALL_LIMIT members are factored by trial division up to this, which decides what is then left below its square. */
const TRIAL_LIMIT = 100_000n
/** Divisions after which no further large member is tried. */
const MOST_DIVISIONS = 50_000_000

/** *Claim*: exact for the members counted. `members`: integers >= 2 as decimal strings. */
export function factorCounts(members: readonly string[]): FactorCounts {
  const counts: FactorCounts = { byFactors: [], byDistinct: [], squarefree: 0, notFactored: 0 }
  let divisions = 0
  const large = (n: bigint): bigint[] | null => (divisions > MOST_DIVISIONS ? null : factorLarge(n, (spent) => (divisions += spent)))
  for (const member of members) {
    const factors = member.length <= 10 && Number(member) < SMALL_LIMIT ? factorSmall(Number(member)) : large(BigInt(member))
    if (!factors) {
      counts.notFactored++
      continue
    }
    const distinct = new Set<number | bigint>(factors).size
    counts.byFactors[factors.length] = (counts.byFactors[factors.length] ?? 0) + 1
    counts.byDistinct[distinct] = (counts.byDistinct[distinct] ?? 0) + 1
    if (distinct === factors.length) counts.squarefree++
  }
  counts.byFactors = Array.from(counts.byFactors, (count) => count ?? 0)
  counts.byDistinct = Array.from(counts.byDistinct, (count) => count ?? 0)
  return counts
}

/** The prime factors where trial division finds all of them; null where it does not. */
function factorLarge(n: bigint, spend: (divisions: number) => void): bigint[] | null {
  const factors: bigint[] = []
  let rest = n
  let d = 2n
  for (; d <= TRIAL_LIMIT && d * d <= rest; d += d === 2n ? 1n : 2n) {
    while (rest % d === 0n) {
      factors.push(d)
      rest /= d
    }
  }
  spend(Number(d) / 2)
  if (rest === 1n) return factors
  return rest < TRIAL_LIMIT * TRIAL_LIMIT ? [...factors, rest] : null
}
