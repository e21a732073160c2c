import type { Standing } from '../../shared/claim-life.ts'
import { hasRight } from '../../shared/permissions.ts'
import type { Claim } from '../../shared/schemas/claim.ts'
import { notOpen, viewOf, type View } from '../policies/claim.ts'
import { presentClaim } from '../presenters/claim.ts'
import type { Reader } from './audience.ts'
import { claimIdOf, findClaim, type ClaimDetailRow } from './claim.ts'
import { historyOf } from './claim-history.ts'
import { assignmentsOf, conflictsOfClaim, evidenceOf, objectionsOf, possibleRefereesOf, rechecksOf, verdictDraftOf } from './claim-parts.ts'
import { factsOf, standingOf } from './claim-review.ts'

/** A claim with how the reader stands to it. */
export interface ReadClaim {
  row: ClaimDetailRow
  standing: Standing | undefined
  view: View
}

/** A claim by id or number; refuses whoever may not read it, in the same words as where there is none. */
export async function readClaim(reader: Reader, reference: string): Promise<ReadClaim> {
  const id = await claimIdOf(reference)
  const row = id === undefined ? undefined : await findClaim(id)
  if (!row) throw notOpen(reader !== undefined)
  const standing = reader && (await standingOf(reader, { id: row.id, kind: row.kind, groupId: row.group_id, authorId: row.author_id }))
  const view = viewOf({ signedAt: row.signed_at, groupPublic: row.group_public }, standing)
  if (view === 'none') throw notOpen(reader !== undefined)
  return { row, standing, view }
}

/** Everything that the page of a claim shows to this reader; of drafts and reviews only what they may read. */
export async function claimDetail(reader: Reader, reference: string): Promise<Claim> {
  const { row, standing, view } = await readClaim(reader, reference)
  const inside = view === 'work'
  const leads = standing !== undefined && standing.sameGroup && hasRight(standing.roles, 'claims.decide')
  const [facts, evidence, assignments, objections, rechecks, conflicts, history, possible, draftVerdict] = await Promise.all([
    factsOf({ id: row.id, kind: row.kind, groupId: row.group_id, authorId: row.author_id }, reader?.id ?? null),
    evidenceOf(row.id),
    inside ? assignmentsOf(row.id) : [],
    inside ? objectionsOf(row.id) : [],
    rechecksOf(row.id),
    conflictsOfClaim(row.id),
    historyOf(row.id),
    leads ? possibleRefereesOf(row.id) : [],
    reader ? verdictDraftOf(row.id, reader.id) : null,
  ])
  return presentClaim(row, { view, reader, standing, facts, evidence, assignments, objections, rechecks, conflicts, history, possible, draftVerdict })
}
