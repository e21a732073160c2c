import type { Definition } from '../../shared/engine/sets/definition.ts'
import type { Constant } from '../../shared/schemas/constant.ts'
import { convergenceText } from '../engine/definition.ts'
import { firstMembers } from '../engine/first-members.ts'
import { presentClaimSummary } from '../presenters/claim.ts'
import { presentConstant } from '../presenters/constant.ts'
import type { Reader } from './audience.ts'
import { claimsOfConstant } from './claim.ts'
import { findConstant } from './constant.ts'
import { conflictsOf, estimatesUnder, ordersOf, runsOfConstant, signedEnclosures, statementOf } from './constant-detail.ts'

/** Everything that the page of a constant shows to this reader; undefined where there is no such constant open to them. */
export async function constantDetail(reader: Reader, number: number): Promise<Constant | undefined> {
  const row = await findConstant(reader, number)
  if (!row) return undefined
  const [statement, claims, signed, conflicts, orders, estimates, runs] = await Promise.all([
    statementOf(reader, row.id),
    claimsOfConstant(reader, row.id),
    signedEnclosures(reader, row.id),
    conflictsOf(reader, row.id),
    ordersOf(reader, row.id),
    estimatesUnder(reader, row.id),
    runsOfConstant(reader, row.id),
  ])
  const definition = statement.definition as Definition
  return presentConstant(row, {
    statement,
    convergence: convergenceText(definition),
    firstMembers: firstMembers(definition, 12),
    claims: claims.map(presentClaimSummary),
    signed,
    conflicts,
    orders,
    estimates,
    runs,
  })
}
