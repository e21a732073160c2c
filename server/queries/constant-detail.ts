import { hasRight } from '../../shared/permissions.ts'
import type { Run } from '../../shared/schemas/run.ts'
import { selectByKey } from '../db.ts'
import { audienceOf, type Reader } from './audience.ts'

/** Claims on `cl` that were signed and that this reader may see; `g` is the claim's group. */
const OPEN_SIGNED = 'cl.signed_at IS NOT NULL AND (g.public OR g.id = $audience)'

export interface StatementRow {
  definition: unknown
  stated_at: Date
  stated_by: string
}

/** What was stated, and by whom, as far as that person's group is open to this reader. */
export async function statementOf(reader: Reader, constantId: string): Promise<StatementRow> {
  const [row] = await selectByKey<StatementRow>(
    `SELECT c.definition, c.stated_at, CASE WHEN g.public OR g.id = $audience THEN m.name ELSE 'a member of another group' END AS stated_by
     FROM constants c JOIN members m ON m.id = c.stated_by JOIN groups g ON g.id = c.group_id WHERE c.id = $id`,
    { id: constantId, audience: audienceOf(reader) },
  )
  if (!row) throw new Error(`the constant ${constantId} is not there`)
  return row
}

export interface SignedRow {
  ordinal: number
  signed_at: Date
  lo: string
  hi: string
  author: string
}

/** The enclosures of a constant that stand or were superseded, in the order in which they were signed. */
export async function signedEnclosures(reader: Reader, constantId: string): Promise<SignedRow[]> {
  return selectByKey<SignedRow>(
    `SELECT cl.ordinal, cl.signed_at, cl.lo, cl.hi, m.name AS author
     FROM claims cl JOIN groups g ON g.id = cl.group_id JOIN members m ON m.id = cl.author_id
     WHERE cl.constant_id = $id AND cl.state IN ('signed', 'superseded') AND cl.lo IS NOT NULL AND cl.other_constant_id IS NULL AND ${OPEN_SIGNED}
     ORDER BY cl.signed_at, cl.ordinal`,
    { id: constantId, audience: audienceOf(reader) },
  )
}

export interface ConflictRow {
  first: number
  second: number
  opened_at: Date
  closed_at: Date | null
}

/** Contradictions between claims of a constant that are both open to this reader, newest first. */
export async function conflictsOf(reader: Reader, constantId: string): Promise<ConflictRow[]> {
  const open = (claim: string, group: string): string => `(${group}.id = $audience OR (${group}.public AND ${claim}.signed_at IS NOT NULL))`
  return selectByKey<ConflictRow>(
    `SELECT a.ordinal AS first, b.ordinal AS second, x.opened_at, x.closed_at
     FROM conflicts x JOIN claims a ON a.id = x.claim_id JOIN claims b ON b.id = x.signed_claim_id JOIN groups ga ON ga.id = a.group_id JOIN groups gb ON gb.id = b.group_id
     WHERE a.constant_id = $id AND a.ordinal IS NOT NULL AND ${open('a', 'ga')} AND ${open('b', 'gb')}
     ORDER BY x.opened_at DESC`,
    { id: constantId, audience: audienceOf(reader) },
  )
}

export interface UseRow {
  number: number
  ordinal: number
  lesser: number
  greater: number
}

/** Signed orders that this constant is one side of. */
export async function ordersOf(reader: Reader, constantId: string): Promise<UseRow[]> {
  return selectByKey<UseRow>(
    `SELECT a.number, cl.ordinal, a.number AS lesser, b.number AS greater
     FROM claims cl JOIN groups g ON g.id = cl.group_id JOIN constants a ON a.id = cl.constant_id JOIN constants b ON b.id = cl.other_constant_id
     WHERE (cl.constant_id = $id OR cl.other_constant_id = $id) AND cl.kind = 'order' AND cl.state = 'signed' AND ${OPEN_SIGNED}
     ORDER BY a.number, cl.ordinal`,
    { id: constantId, audience: audienceOf(reader) },
  )
}

/** Ids of the estimates that the signed enclosures of a constant rest on. */
export async function estimatesUnder(reader: Reader, constantId: string): Promise<string[]> {
  const rows = await selectByKey<{ id: string }>(
    `SELECT DISTINCT unnest(r.estimates) AS id FROM claims cl JOIN groups g ON g.id = cl.group_id JOIN runs r ON r.id = cl.run_id
     WHERE cl.constant_id = $id AND cl.state = 'signed' AND ${OPEN_SIGNED} ORDER BY id`,
    { id: constantId, audience: audienceOf(reader) },
  )
  return rows.map(({ id }) => id)
}

export interface ConstantRunRow {
  id: string
  method: Run['method']
  arithmetic: Run['arithmetic']
  state: Run['state']
  created_at: Date
}

/** The newest runs of a constant in the reader's group; none for those who do not read the group's work. */
export async function runsOfConstant(reader: Reader, constantId: string): Promise<ConstantRunRow[]> {
  if (!reader || !hasRight(reader.roles, 'group-work.read')) return []
  return selectByKey<ConstantRunRow>(
    'SELECT id, method, arithmetic, state, created_at FROM runs WHERE constant_id = $id AND group_id = $group ORDER BY created_at DESC, id LIMIT 20',
    { id: constantId, group: reader.groupId },
  )
}
