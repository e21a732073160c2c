import { createHash } from 'node:crypto'
import { refreshBest } from '../../server/commands/constant-best.ts'
import { stateConstant } from '../../server/commands/constant.ts'
import { change, inTransaction, selectOne } from '../../server/db.ts'
import { readDefinition } from '../../server/engine/definition.ts'
import type { Constant } from '../../server/models/constant.ts'
import { definitionInput, type DefinitionInput } from '../../shared/schemas/definition.ts'
import { digitsOf } from '../../shared/intersection.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import type { TestMember } from './people.ts'

/** The sum of 1/(n log n) over a set, unless a weight is given. */
export const series = (set: Record<string, unknown>, weight: Record<string, string> = {}): DefinitionInput => ({ type: 'series', set, weight }) as DefinitionInput

/** States a constant as a member would. */
export async function makeConstant(member: TestMember, definition: DefinitionInput): Promise<Constant> {
  const read = readDefinition(definitionInput.parse(definition))
  return inTransaction(async (transaction) => (await stateConstant(transaction, member, read)).constant)
}

const ENTERED = new Set<ClaimState>(['signed', 'suspended'])

/** A claim of a constant in some state, as the register has it after the people's part is done, told to the register. */
export async function makeClaim(
  author: TestMember,
  constant: Constant,
  { lo, hi, state = 'signed', kind = 'enclosure', runId = null, otherConstantId = null }: { lo?: string; hi?: string; state?: ClaimState; kind?: string; runId?: string | null; otherConstantId?: string | null },
): Promise<{ id: string; ordinal: number }> {
  const digest = createHash('sha256').update(`${constant.id}${lo}${hi}${Math.random()}`).digest('hex')
  const digits = lo !== undefined && hi !== undefined ? digitsOf({ lo, hi }) : null
  return inTransaction(async (transaction) => {
    const last = await selectOne<{ ordinal: number }>('SELECT coalesce(max(ordinal), 0) AS ordinal FROM claims WHERE constant_id = $id', { id: constant.id }, transaction)
    const ordinal = (last?.ordinal ?? 0) + 1
    const [row] = await change<{ id: string }>(
      `INSERT INTO claims (kind, constant_id, other_constant_id, ordinal, group_id, author_id, state, lo, hi, digits_truncated, digits_rounded, run_id, digest, certificate, certificate_digest, repeated_here, signed_by, signed_at)
       VALUES ($kind, $constantId, $otherConstantId, $ordinal, $groupId, $authorId, $state, $lo, $hi, $truncated, $rounded, $runId, $digest, '{}', $digest, true, $signedBy, $signedAt) RETURNING id`,
      {
        kind, constantId: constant.id, otherConstantId, ordinal: state === 'draft' ? null : ordinal, groupId: author.groupId, authorId: author.id, state, lo: lo ?? null, hi: hi ?? null,
        truncated: digits?.truncated ?? null, rounded: digits?.rounded ?? null, runId, digest, signedBy: ENTERED.has(state) ? author.id : null, signedAt: ENTERED.has(state) ? new Date() : null,
      },
      transaction,
    )
    await refreshBest(transaction, constant.id)
    return { id: row!.id, ordinal }
  })
}
