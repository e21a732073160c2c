import type { Standing } from '../../shared/claim-life.ts'
import { hasRight } from '../../shared/permissions.ts'
import type { Claim } from '../../shared/schemas/claim.ts'
import { notOpen, viewOf, type View } from '../policies/claim.ts'
import { presentClaim } from '../presenters/claim.ts'
import type { Reader } from './audience.ts'
import { claimIdOf, findClaim, type ClaimDetailRow } from './claim.ts'
import { historyOf } from './claim-history.ts'
import { assignmentsOf, conflictsOfClaim, evidenceOf, objectionsOf, possibleRefereesOf, rechecksOf, verdictDraftOf } from './claim-parts.ts'
import { doubtsOfClaim } from './estimate-doubt.ts'
import { factsOf, standingOf } from './claim-review.ts'

/** A claim with how the reader stands to it. */
export interface ReadClaim {
  row: ClaimDetailRow
  standing: Standing | undefined
  view: View
}

/** The id of a claim that a member names to act on it; whether it is open to them is judged with the act. */
export async function claimIdFor(reference: string): Promise<string> {
  const id = await claimIdOf(reference)
  if (id === undefined) throw notOpen(true)
  return id
}

/** A claim by id or number; undefined where there is none that this reader may read. */
async function openClaim(reader: Reader, reference: string): Promise<ReadClaim | undefined> {
  const row = await findClaim(reference)
  if (!row) return undefined
  const standing = reader && (await standingOf(reader, { id: row.id, kind: row.kind, groupId: row.group_id, authorId: row.author_id }))
  const view = viewOf({ signedAt: row.signed_at, groupPublic: row.group_public }, standing)
  return view === 'none' ? undefined : { row, standing, view }
}

/** A claim by id or number; refuses whoever may not read it, in the same words as where there is none. */
export async function readClaim(reader: Reader, reference: string): Promise<ReadClaim> {
  const read = await openClaim(reader, reference)
  if (!read) throw notOpen(reader !== undefined)
  return read
}

/** Everything that the page of a claim shows to this reader. */
export async function claimDetail(reader: Reader, reference: string): Promise<Claim> {
  return detailOf(reader, await readClaim(reader, reference))
}

/** The same, or undefined where the reader has no view of the claim, as who has given a review back. */
export async function claimDetailIfOpen(reader: Reader, reference: string): Promise<Claim | undefined> {
  const read = await openClaim(reader, reference)
  return read && detailOf(reader, read)
}

/** Of drafts and reviews only what this reader may read. */
async function detailOf(reader: Reader, { row, standing, view }: ReadClaim): Promise<Claim> {
  const inside = view === 'work'
  const leads = standing !== undefined && standing.sameGroup && hasRight(standing.roles, 'claims.decide')
  const [facts, evidence, assignments, objections, rechecks, conflicts, doubts, history, possible, draftVerdict] = await Promise.all([
    factsOf({ id: row.id, kind: row.kind, groupId: row.group_id, authorId: row.author_id }, reader?.id ?? null),
    evidenceOf(row.id),
    inside ? assignmentsOf(row.id) : [],
    inside ? objectionsOf(row.id) : [],
    rechecksOf(row.id),
    conflictsOfClaim(row.id),
    doubtsOfClaim(reader, row.id),
    historyOf(row.id),
    leads ? possibleRefereesOf(row.id) : [],
    reader ? verdictDraftOf(row.id, reader.id) : null,
  ])
  return presentClaim(row, { view, reader, standing, facts, evidence, assignments, objections, rechecks, conflicts, doubts, history, possible, draftVerdict })
}
