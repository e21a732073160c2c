import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import { estimateById } from '../../shared/engine/estimates/library.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { digitsOf, intersection, type Interval } from '../../shared/intersection.ts'
import type { ClaimSummary } from '../../shared/schemas/claim.ts'
import type { Constant, ConstantSummary } from '../../shared/schemas/constant.ts'
import type { ConstantRow } from '../queries/constant.ts'
import type { ConflictRow, ConstantRunRow, SignedRow, StatementRow, UseRow } from '../queries/constant-detail.ts'
import { citeConstant } from './constant-cite.ts'
import { bestOf } from './constant-value.ts'

/** A row of the register. A definition that is very long (a list of many members) comes with the constant itself only. */
export const presentConstantSummary = (row: ConstantRow): ConstantSummary => ({
  number: constantNumberText(row.number),
  definition: { canonical: row.definition, latex: row.latex, text: row.text, aliases: row.aliases },
  best: bestOf(row),
  state: row.state,
  inConflict: row.in_conflict,
  group: { id: row.group_id, name: row.group_name },
  changedAt: row.changed_at.toISOString(),
})

/** The best enclosure after each signature. Enclosures without a common point narrow nothing: the later one is left out. */
function narrowing(number: number, rows: readonly SignedRow[]): Constant['narrowing'] {
  let best: Interval | null = null
  return rows.flatMap((row) => {
    const next: Interval | null = intersection(best ? [best, row] : [row])
    if (!next) return []
    best = { lo: next.lo, hi: next.hi }
    return [{ at: row.signed_at.toISOString(), ...best, digits: digitsOf(best).truncated, claim: claimNumberText(number, row.ordinal), author: row.author }]
  })
}

export interface ConstantParts {
  statement: StatementRow
  convergence: string
  firstMembers: string[]
  claims: ClaimSummary[]
  signed: SignedRow[]
  conflicts: ConflictRow[]
  orders: UseRow[]
  estimates: string[]
  runs: ConstantRunRow[]
}

export const presentConstant = (row: ConstantRow, parts: ConstantParts): Constant => ({
  ...presentConstantSummary(row),
  definition: { canonical: parts.statement.definition as Definition, latex: row.latex, text: row.text, aliases: row.aliases },
  convergence: parts.convergence,
  firstMembers: parts.firstMembers,
  claims: parts.claims,
  narrowing: narrowing(row.number, parts.signed),
  conflicts: parts.conflicts.map(({ first, second, opened_at: opened, closed_at: closed }) => ({
    claims: [claimNumberText(row.number, first), claimNumberText(row.number, second)],
    openedAt: opened.toISOString(),
    closedAt: closed?.toISOString() ?? null,
  })),
  usedBy: parts.orders.map(({ number, ordinal, lesser, greater }) => ({
    claimNumber: claimNumberText(number, ordinal),
    text: `${constantNumberText(lesser)} < ${constantNumberText(greater)}`,
  })),
  restsOn: parts.estimates.map((id) => {
    const estimate = estimateById(id)
    return { estimate: id, title: estimate?.title ?? id, conditional: estimate?.conditional ?? false }
  }),
  cite: citeConstant(row),
  statedBy: parts.statement.stated_by,
  statedAt: parts.statement.stated_at.toISOString(),
  runs: parts.runs.map(({ id, method, arithmetic, state, created_at: created }) => ({ id, method, arithmetic, state, createdAt: created.toISOString() })),
})
