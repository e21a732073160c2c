import { createHash } from 'node:crypto'
import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import type { EstimateDoubt } from '../../shared/schemas/estimate.ts'
import type { AgainRow, DoubtRow, RestingRow } from '../queries/estimate-doubt.ts'

type Fate = EstimateDoubt['claims'][number]['fate']

/** What a doubt does to a claim that rests on the estimate: who is in force falls. */
export function fateOf({ state, by_doubt: byDoubt }: Pick<RestingRow, 'state' | 'by_doubt'>): Fate {
  if (state === 'signed' || state === 'superseded') return 'falls'
  if (state === 'suspended') return byDoubt ? 'fallen' : 'suspended'
  return 'waits'
}

/** Digest of a list of claims as it stands: who decides on the list says which one they have read. */
export const digestOfClaims = (claims: readonly Pick<RestingRow, 'id' | 'version' | 'state'>[]): string =>
  createHash('sha256').update(claims.map(({ id, version, state }) => `${id} ${version} ${state}`).sort().join('\n')).digest('hex')

export const numberOfClaim = ({ number, ordinal }: { number: number; ordinal: number }): string => claimNumberText(number, ordinal)

/** What rests on an estimate in a group, and what there is to compute again. */
export function presentEstimateDoubt(estimate: Estimate, doubt: DoubtRow | undefined, claims: readonly RestingRow[], again: readonly AgainRow[]): EstimateDoubt {
  return {
    estimate: estimate.id,
    doubt: doubt ? { id: doubt.id, by: { id: doubt.marked_by, name: doubt.marker_name }, at: doubt.marked_at.toISOString(), reason: doubt.reason } : null,
    digest: digestOfClaims(claims),
    claims: claims.map((row) => ({
      id: row.id,
      number: numberOfClaim(row),
      kind: row.kind,
      text: row.text,
      state: row.state,
      author: { id: row.author_id, name: row.author_name },
      through: row.through.map(numberOfClaim),
      fate: fateOf(row),
    })),
    again: again.map((row) => ({
      constant: constantNumberText(row.number),
      definition: { canonical: row.definition, latex: row.latex, text: row.text, aliases: row.aliases },
      // A cut-off ties the run to partial sums; as many digits can come from any method.
      goal: 'cutoff' in row.goal ? { digits: Math.max(1, row.digits ?? 1) } : row.goal,
      other: row.other_ordinal === null ? null : { claimNumber: claimNumberText(row.number, row.other_ordinal), digits: row.other_digits ?? 0 },
      run: row.run_id === null || row.run_state === null ? null : { id: row.run_id, state: row.run_state },
    })),
  }
}
