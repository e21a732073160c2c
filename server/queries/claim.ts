import type { z } from 'zod'
import { parseClaimNumber, parseConstantNumber } from '../../shared/constant-number.ts'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import { hasRight } from '../../shared/permissions.ts'
import type { ClaimState, ClaimSummary, claimQuery } from '../../shared/schemas/claim.ts'
import type { Json } from '../audit/canonical.ts'
import { select, selectByKey, selectOne, type Bind } from '../db.ts'
import type { Reader } from './audience.ts'
import { readCursor, writeCursor } from './cursor.ts'

/** A claim as lists show it. */
export interface ClaimRow {
  id: string
  kind: ClaimSummary['kind']
  number: number
  ordinal: number | null
  other_number: number | null
  definition: unknown
  latex: string
  text: string
  aliases: string[]
  lo: string | null
  hi: string | null
  digits_truncated: number | null
  digits_rounded: number | null
  state: ClaimState
  in_conflict: boolean
  repeated_here: boolean
  author_id: string
  author_name: string
  group_id: string
  group_name: string
  since: Date
  signed_at: Date | null
  at: string
}

const COLUMNS = `cl.id, cl.kind, c.number, cl.ordinal, o.number AS other_number, CASE WHEN pg_column_size(c.definition) < 4000 THEN c.definition END AS definition,
  c.latex, c.text, c.aliases, cl.lo, cl.hi, cl.digits_truncated, cl.digits_rounded, cl.state, cl.repeated_here, cl.author_id, m.name AS author_name,
  cl.group_id, g.name AS group_name, cl.since, cl.signed_at, cl.since::text AS at,
  EXISTS (SELECT 1 FROM conflicts x WHERE (x.claim_id = cl.id OR x.signed_claim_id = cl.id) AND x.closed_at IS NULL) AS in_conflict`
const FROM = `FROM claims cl JOIN constants c ON c.id = cl.constant_id LEFT JOIN constants o ON o.id = cl.other_constant_id
  JOIN members m ON m.id = cl.author_id JOIN groups g ON g.id = cl.group_id`

/** Claims that were signed by groups that publish: open to everybody. */
const PUBLISHED = 'cl.signed_at IS NOT NULL AND cl.group_id = ANY (ARRAY(SELECT id FROM groups WHERE public))'

/** The ways in which claims are open to a reader, as `viewOf` of policies/claim.ts says of one. One claim can be open in several. */
function waysOpen(reader: Reader): { ways: string[]; bind: Bind } {
  if (!reader) return { ways: [PUBLISHED], bind: {} }
  const group = hasRight(reader.roles, 'group-work.read') ? 'cl.group_id = $group' : 'cl.group_id = $group AND cl.signed_at IS NOT NULL'
  const assigned = `cl.id IN (SELECT claim_id FROM assignments WHERE referee_id = $me AND state <> 'declined')`
  return { ways: [PUBLISHED, group, 'cl.author_id = $me', assigned], bind: { me: reader.id, group: reader.groupId } }
}

/** Claims open to the reader, those that changed their state last first. */
export async function listClaims(reader: Reader, { cursor, limit, ...query }: z.output<typeof claimQuery>): Promise<{ rows: ClaimRow[]; next: string | null }> {
  if (query.mine && !reader) return { rows: [], next: null }
  const mark = { list: 'claims', reader: reader?.id ?? null, ...query }
  const { ways, bind } = waysOpen(reader)
  const where: string[] = []
  if (query.state) {
    where.push('cl.state = $state')
    bind.state = query.state
  }
  if (query.constant) {
    where.push('(cl.constant_id = $constant OR cl.other_constant_id = $constant)')
    bind.constant = await constantIdOf(query.constant)
  }
  if (cursor !== undefined) {
    const [at, id] = readCursor(mark, cursor)
    where.push('(cl.since, cl.id) < ($at::timestamptz, $id::uuid)')
    Object.assign(bind, { at, id })
  }
  // Each way has an index in the order of the list; so no more of each is read than the page can hold.
  const pages = (query.mine ? ['cl.author_id = $me'] : ways).map((way) => `(SELECT cl.id, cl.since FROM claims cl WHERE ${[way, ...where].join(' AND ')} ORDER BY cl.since DESC, cl.id DESC LIMIT $limit)`)
  const rows = await select<ClaimRow>(
    `SELECT ${COLUMNS} ${FROM} WHERE cl.id IN (SELECT id FROM (${pages.join(' UNION ')}) open ORDER BY since DESC, id DESC LIMIT $limit) ORDER BY cl.since DESC, cl.id DESC`,
    { ...bind, limit: limit + 1 },
  )
  const page = rows.slice(0, limit)
  const last = page.at(-1)
  return { rows: page, next: rows.length > limit && last ? writeCursor(mark, [last.at, last.id]) : null }
}

/** The id of a constant by its number, or null. */
async function constantIdOf(text: string): Promise<string | null> {
  const row = await selectOne<{ id: string }>('SELECT id FROM constants WHERE number = $number', { number: parseConstantNumber(text) ?? 0 })
  return row?.id ?? null
}

/** Claims of a constant that are open to the reader, orders that it is part of among them, by number. */
export async function claimsOfConstant(reader: Reader, constantId: string): Promise<ClaimRow[]> {
  const { ways, bind } = waysOpen(reader)
  return selectByKey<ClaimRow>(
    `SELECT ${COLUMNS} ${FROM} WHERE (${ways.join(' OR ')}) AND (cl.constant_id = $constantId OR cl.other_constant_id = $constantId) ORDER BY c.number, cl.ordinal NULLS LAST, cl.created_at`,
    { ...bind, constantId },
  )
}

/** Claims by id, whoever may read them. */
export async function claimRows(ids: readonly string[]): Promise<ClaimRow[]> {
  return select<ClaimRow>(`SELECT ${COLUMNS} ${FROM} WHERE cl.id = ANY ($ids::uuid[])`, { ids })
}

/** The id of a claim that is named by its id or by its number in an address (MST-0042-1); undefined where the number is not given. */
export async function claimIdOf(reference: string): Promise<string | undefined> {
  const numbered = parseClaimNumber(reference)
  if (!numbered) return reference
  const [row] = await selectByKey<{ id: string }>('SELECT cl.id FROM claims cl JOIN constants c ON c.id = cl.constant_id WHERE c.number = $number AND cl.ordinal = $ordinal', { ...numbered })
  return row?.id
}

export interface ClaimDetailRow extends ClaimRow {
  group_public: boolean
  version: number
  remark: string
  source: string | null
  basis: { [key: string]: Json }
  full_definition: unknown
  run_id: string | null
  method: ClaimRunRow['method'] | null
  arithmetic: ClaimRunRow['arithmetic'] | null
  outcome: Outcome | null
  digest: string
  certificate_digest: string
  key_id: string | null
  superseder_ordinal: number | null
  superseded_ordinal: number | null
  signer_name: string | null
}
type ClaimRunRow = Pick<Outcome, 'method' | 'arithmetic'>

/** One claim, by its id or its number in an address, with everything that stands in its own row, whoever may read it: the policy decides on the row. */
export async function findClaim(reference: string): Promise<ClaimDetailRow | undefined> {
  const numbered = parseClaimNumber(reference)
  const [row] = await selectByKey<ClaimDetailRow>(
    `SELECT ${COLUMNS}, c.definition AS full_definition, g.public AS group_public, cl.version, cl.remark, cl.source, cl.basis, cl.run_id, r.method, r.arithmetic, r.outcome, cl.digest, cl.certificate_digest,
       CASE WHEN cl.signed_at IS NOT NULL THEN cl.certificate::jsonb->'signature'->>'keyId' END AS key_id,
       n.ordinal AS superseder_ordinal, (SELECT max(w.ordinal) FROM claims w WHERE w.superseded_by = cl.id AND w.state = 'superseded') AS superseded_ordinal, s.name AS signer_name
     ${FROM} LEFT JOIN runs r ON r.id = cl.run_id LEFT JOIN claims n ON n.id = cl.superseded_by AND cl.state = 'superseded' LEFT JOIN members s ON s.id = cl.signed_by WHERE ${numbered ? 'c.number = $number AND cl.ordinal = $ordinal' : 'cl.id = $id'}`,
    numbered ? { ...numbered } : { id: reference },
  )
  return row
}
