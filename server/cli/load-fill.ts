import pg from 'pg'
import { constantNumberText } from '../../shared/constant-number.ts'
import { ESTIMATES } from '../../shared/engine/estimates/library.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'
import { entryHash, GENESIS, type AuditContent } from '../audit/chain.ts'
import { bestOf, entriesOf } from '../commands/constant-best.ts'
import { columnsOf } from '../commands/constant.ts'
import { change } from '../db.ts'
import type { ReadDefinition } from '../engine/definition.ts'
import { claimRows, DAY, someUuid, someValue, type ClaimRows, type Happening, type Row } from './load-claims.ts'
import { definitions, pick, type Roll } from './load-definitions.ts'
import type { LoadGroup } from './load-people.ts'

/** Tables in an order in which each row finds those that it points to. */
const TABLES = ['constants', 'runs', 'claims', 'rechecks', 'assignments', 'objections', 'objection_messages', 'evidence', 'conflicts', 'register_entries', 'audit_entries', 'outbox'] as const
type Batch = Record<(typeof TABLES)[number], Row[]>

const emptyBatch = (): Batch => Object.fromEntries(TABLES.map((table) => [table, []])) as unknown as Batch

/** Constants in one batch, and batches that are written at the same time. */
const BATCH = 500
const WRITERS = 2
const FIRST_DAY = Date.UTC(2021, 0, 1)
/** All constants are stated within this time, one after the other. */
const SPAN = 1_600 * DAY
/** How many claims constants have, over and over: three on average. */
const CLAIMS = [1, 2, 0, 3, 8, 1, 4, 2, 6, 3]
/** States of claims on their way and of those that fell, of a hundred claims: all others are signed or superseded. */
const ON_THE_WAY: readonly ClaimState[] = ['draft', 'submitted', 'in-review', 'returned', 'endorsed', 'withdrawn', 'withdrawn', 'suspended']

export interface Filled {
  constants: number
  claims: number
}

/** Fills an empty database with constants and, three times as many, claims; the same for the same seed but for the ids of people. */
export async function fill(roll: Roll, count: number, groups: readonly LoadGroup[], progress: (constants: number) => void = () => undefined): Promise<Filled> {
  const source = definitions(roll)
  const trail = { seq: 0, hash: GENESIS }
  let claims = 0
  const writing: Promise<void>[] = []
  for (let number = 1; number <= count; ) {
    const batch = emptyBatch()
    const happenings: Happening[] = []
    for (const last = Math.min(count, number + BATCH - 1); number <= last; number += 1) addConstant(roll, { number, at: FIRST_DAY + Math.floor((SPAN * number) / count), read: source.next().value, groups, batch, happenings })
    claims += batch.claims.length
    happenings.sort((a, b) => a.at - b.at)
    for (const happening of happenings) {
      batch.audit_entries.push(auditRow(trail, happening))
      if (happening.told) batch.outbox.push(mailRow(roll, happening))
    }
    // One batch for each core is written while the next is made.
    if (writing.length >= WRITERS) await writing.shift()
    writing.push(write(batch))
    progress(number - 1)
  }
  await Promise.all(writing)
  return { constants: count, claims }
}

interface ConstantPlan {
  number: number
  at: number
  read: ReadDefinition
  groups: readonly LoadGroup[]
  batch: Batch
  happenings: Happening[]
}

function addConstant(roll: Roll, { number, at, read, groups, batch, happenings }: ConstantPlan): void {
  const home = pick(roll, groups)
  const author = pick(roll, home.researchers)
  const constant = { id: someUuid(roll), number, read }
  const claims = someClaims(roll, constant, at, home, groups)
  const conflict = addConflict(roll, claims, batch)
  const standings = claims.map(({ claim, group }) => ({
    group_id: group.id, public: group.public, state: claim.state as ClaimState, lo: claim.lo as string, hi: claim.hi as string, signed: claim.signed_at !== null, since: new Date(claim.since as string), in_conflict: conflict?.includes(claim.id) ?? false,
  }))
  const best = bestOf(standings)
  const { setKind, k, exclude, power, logPower, definition, definitionKey, latex, text, aliases, words } = columnsOf(number, read)
  const filters = { number, set_kind: setKind, k, exclude, power, log_power: logPower }
  batch.constants.push({
    id: constant.id, ...filters, definition, definition_key: definitionKey, latex, text, aliases, words, group_id: home.id, stated_by: author.id, stated_at: new Date(at).toISOString(), best_lo: best.lo, best_hi: best.hi, best_digits: best.truncated,
  })
  const changed = standings.reduce((latest, { since }) => (since > latest ? since : latest), new Date(at)).toISOString()
  for (const { audiences, entry } of entriesOf(standings, groups.map(({ id }) => id))) {
    if (entry === null) continue
    for (const audience of audiences) {
      batch.register_entries.push({
        constant_id: constant.id, audience, ...filters, group_id: entry.groupId ?? home.id, state: entry.state, entered_state: entry.enteredState, in_conflict: entry.inConflict, best_lo: entry.lo, best_hi: entry.hi,
        digits_truncated: entry.truncated, digits_rounded: entry.rounded, changed_at: changed,
      })
    }
  }
  happenings.push({ at, group: home, actor: author, act: 'constant.state', subject: { kind: 'constant', id: constant.id, label: constantNumberText(number) }, digest: read.key, detail: {} })
  for (const rows of claims) {
    batch.claims.push(rows.claim)
    if (rows.run) batch.runs.push(rows.run)
    batch.rechecks.push(...rows.rechecks)
    batch.assignments.push(...rows.assignments)
    batch.objections.push(...rows.objections)
    batch.objection_messages.push(...rows.messages)
    batch.evidence.push(...rows.evidence)
    happenings.push(...rows.happenings)
  }
}

/** Claims of one constant, each narrower than the one before; the last that is signed supersedes the earlier ones that hold it. */
function someClaims(roll: Roll, constant: { id: string; number: number; read: ReadDefinition }, at: number, home: LoadGroup, groups: readonly LoadGroup[]): ClaimRows[] {
  const value = someValue(roll)
  const count = CLAIMS[constant.number % CLAIMS.length]!
  const first = 2 + roll(12)
  const rows: ClaimRows[] = []
  let ordinal = 0
  for (let index = 0; index < count; index += 1) {
    const group = roll(10) < 7 ? home : pick(roll, groups)
    const state = roll(25) === 0 ? pick(roll, ON_THE_WAY) : 'signed'
    if (state !== 'draft') ordinal += 1
    const digits = Math.min(300, first + index * (2 + roll(40)))
    rows.push(claimRows(roll, { constant, value, digits, ordinal: state === 'draft' ? null : ordinal, state, group, at: at + index * 20 * DAY + roll(20 * DAY) }, ESTIMATES))
  }
  const narrowest = rows.findLast(({ claim }) => claim.state === 'signed')?.claim
  for (const { claim } of rows) {
    if (narrowest === undefined || claim === narrowest || claim.state !== 'signed' || roll(3) === 0) continue
    claim.state = 'superseded'
    claim.superseded_by = narrowest.id
  }
  return rows
}

/** Once in a hundred constants two claims contradict each other; half of these conflicts are settled. */
function addConflict(roll: Roll, claims: readonly ClaimRows[], batch: Batch): unknown[] | undefined {
  const signed = claims.find(({ claim }) => claim.state === 'signed')?.claim
  const other = claims.findLast(({ claim }) => claim.ordinal !== null && claim !== signed)?.claim
  if (!signed || !other || roll(60) !== 0) return undefined
  const closed = roll(2) === 0
  batch.conflicts.push({ id: someUuid(roll), claim_id: other.id, signed_claim_id: signed.id, opened_at: other.since, closed_at: closed ? other.since : null })
  return closed ? undefined : [signed.id, other.id]
}

function auditRow(trail: { seq: number; hash: string }, { at, group, actor, act, subject, digest, detail }: Happening): Row {
  const content: AuditContent = {
    seq: trail.seq + 1, at: new Date(at).toISOString(), groupId: group.id, actorId: actor.id, actorName: actor.name, act, subjectKind: subject.kind, subjectId: subject.id, subjectLabel: subject.label, reason: null, digest, detail,
  }
  const previous = trail.hash
  Object.assign(trail, { seq: content.seq, hash: entryHash(previous, content) })
  return {
    seq: content.seq, at: content.at, group_id: group.id, actor_id: actor.id, actor_name: actor.name, act, subject_kind: subject.kind, subject_id: subject.id, subject_label: subject.label, reason: null, digest, detail, previous_hash: previous, hash: trail.hash,
  }
}

function mailRow(roll: Roll, { at, group, act, subject, told }: Happening): Row {
  const state = roll(50) === 0 ? pick(roll, ['bounced', 'failed'] as const) : 'sent'
  const time = new Date(at).toISOString()
  return {
    id: someUuid(roll), group_id: group.id, member_id: told!.id, recipient_name: told!.name, recipient_email: told!.email, template: act === 'claim.sign' ? 'claim-signed' : 'claim-submitted', subject: `${subject.label}: news`, text: null, html: null,
    state, attempts: 1, next_attempt_at: time, last_error: state === 'sent' ? null : '550 no such mailbox', created_at: time, sent_at: state === 'sent' ? time : null,
  }
}

async function write(batch: Batch): Promise<void> {
  for (const table of TABLES) {
    const rows = batch[table]
    if (rows.length === 0) continue
    const columns = Object.keys(rows[0]!).join(', ')
    const target = table === 'rechecks' ? 'runs' : table
    await change(`INSERT INTO ${target} (${columns}) SELECT ${columns} FROM json_populate_recordset(NULL::${target}, $rows)`, { rows: JSON.stringify(rows) })
  }
}

/**
 * Does the work without the indexes that are no constraint, and builds them again afterwards: a large fill is several times as quick.
 * Analyses everything at the end, so that the planner knows what it is to plan for.
 */
export async function withoutIndexes<T>(ownerUrl: string, work: () => Promise<T>): Promise<T> {
  const owner = new pg.Client({ connectionString: ownerUrl })
  await owner.connect()
  try {
    const { rows } = await owner.query<{ name: string; definition: string }>(
      `SELECT i.indexrelid::regclass::text AS name, pg_get_indexdef(i.indexrelid) AS definition FROM pg_index i JOIN pg_class t ON t.oid = i.indrelid
       WHERE t.relnamespace = 'public'::regnamespace AND NOT EXISTS (SELECT 1 FROM pg_constraint c WHERE c.conindid = i.indexrelid)`,
    )
    await owner.query(`DROP INDEX ${rows.map(({ name }) => name).join(', ')}`)
    const result = await work()
    for (const { definition } of rows) await owner.query(definition)
    await owner.query('VACUUM ANALYZE')
    return result
  } finally {
    await owner.end()
  }
}
