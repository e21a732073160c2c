import type { z } from 'zod'
import type { AuditCheck, AuditEntry, auditExportQuery, auditQuery } from '../../shared/schemas/group.ts'
import type { Json } from '../audit/canonical.ts'
import { entryHash, GENESIS, type AuditContent } from '../audit/chain.ts'
import { select, selectOne, type Bind } from '../db.ts'
import { presentAuditEntry } from '../presenters/audit.ts'
import { readCursor, writeCursor } from './cursor.ts'

/** A row of `audit_entries`. */
export interface AuditRow {
  seq: string
  at: Date
  group_id: string | null
  actor_id: string | null
  actor_name: string
  act: string
  subject_kind: string
  subject_id: string
  subject_label: string
  reason: string | null
  digest: string | null
  detail: { [key: string]: Json }
  previous_hash: string
  hash: string
}

type Filters = Omit<z.output<typeof auditExportQuery>, 'format'>

/** Text for LIKE in which nothing is a wildcard. */
const literal = (text: string): string => text.replace(/[\\%_]/g, '\\$&')

/** Entries of the group that pass the filters, as a WHERE clause with its values. */
function where(groupId: string, filters: Filters): { clause: string; bind: Bind } {
  const clauses = ['group_id = $groupId']
  const bind: Bind = { groupId }
  const add = (clause: string, name: string, value: unknown) => {
    clauses.push(clause)
    bind[name] = value
  }
  if (filters.act !== undefined) add('act LIKE $act', 'act', `${literal(filters.act)}%`)
  if (filters.actor !== undefined) add('actor_id = $actor', 'actor', filters.actor)
  if (filters.subjectKind !== undefined) add('subject_kind = $subjectKind', 'subjectKind', filters.subjectKind)
  if (filters.subjectId !== undefined) add('subject_id = $subjectId', 'subjectId', filters.subjectId)
  if (filters.from !== undefined) add('at >= $from', 'from', filters.from)
  if (filters.to !== undefined) add('at < $to', 'to', filters.to)
  if (filters.text !== undefined && filters.text !== '') {
    add('(subject_label ILIKE $text OR actor_name ILIKE $text OR reason ILIKE $text OR digest LIKE $digest)', 'text', `%${literal(filters.text)}%`)
    bind.digest = `${literal(filters.text.toLowerCase())}%`
  }
  return { clause: clauses.join(' AND '), bind }
}

/** A page of the group's trail, newest first. */
export async function listAudit(groupId: string, query: z.output<typeof auditQuery>): Promise<{ items: AuditEntry[]; next: string | null }> {
  const { cursor, limit, ...filters } = query
  const { clause, bind } = where(groupId, filters)
  const mark = { list: 'audit', groupId, filters }
  const [at, seq] = cursor === undefined ? [] : readCursor(mark, cursor)
  // By time first: it is the order of the chain, unless the clock was put back, and a stretch of time is then read as it lies in the index.
  const rows = await select<AuditRow>(
    `SELECT * FROM audit_entries WHERE ${clause} ${cursor === undefined ? '' : 'AND (at, seq) < ($at::timestamptz, $seq::bigint)'} ORDER BY at DESC, seq DESC LIMIT $limit`,
    { ...bind, limit: limit + 1, ...(cursor !== undefined && { at, seq }) },
  )
  const page = rows.slice(0, limit)
  const last = page.at(-1)
  return { items: page.map(presentAuditEntry), next: rows.length > limit && last ? writeCursor(mark, [last.at.toISOString(), Number(last.seq)]) : null }
}

const BATCH = 1_000

/** Batches of rows in order, so that a long trail never stands in memory as a whole. */
async function* batches(clause: string, bind: Bind): AsyncGenerator<AuditRow[]> {
  for (let after = 0; ; ) {
    const rows = await select<AuditRow>(`SELECT * FROM audit_entries WHERE ${clause} AND seq > $after ORDER BY seq LIMIT ${BATCH}`, { ...bind, after })
    if (rows.length > 0) yield rows
    if (rows.length < BATCH) return
    after = Number(rows.at(-1)!.seq)
  }
}

/** All entries of the group that pass the filters, oldest first. */
export async function* exportAudit(groupId: string, filters: Filters): AsyncGenerator<AuditEntry[]> {
  const { clause, bind } = where(groupId, filters)
  for await (const rows of batches(clause, bind)) yield rows.map(presentAuditEntry)
}

const contentOf = (row: AuditRow): AuditContent => ({
  seq: Number(row.seq),
  at: row.at.toISOString(),
  groupId: row.group_id,
  actorId: row.actor_id,
  actorName: row.actor_name,
  act: row.act,
  subjectKind: row.subject_kind,
  subjectId: row.subject_id,
  subjectLabel: row.subject_label,
  reason: row.reason,
  digest: row.digest,
  detail: row.detail,
})

function faultOf(row: AuditRow, expectedSeq: number, previous: string): string | null {
  if (Number(row.seq) !== expectedSeq) return `entry ${expectedSeq} is missing`
  if (row.previous_hash !== previous) return 'it is not linked to the entry before it'
  if (row.hash !== entryHash(previous, contentOf(row))) return 'its content is not what its hash was made from'
  return null
}

/** Recomputes the whole chain of the installation and names the first entry that does not fit. */
export async function checkAudit(): Promise<AuditCheck> {
  let previous = GENESIS
  let entries = 0
  for await (const rows of batches('true', {})) {
    for (const row of rows) {
      const fault = faultOf(row, entries + 1, previous)
      if (fault !== null) return { entries, head: previous, broken: { seq: Number(row.seq), reason: fault } }
      previous = row.hash
      entries += 1
    }
  }
  return { entries, head: previous, broken: null }
}

/** Whether the database lets this role change the trail; true means that only the trigger guards it. */
export async function mayChangeAudit(): Promise<boolean> {
  const row = await selectOne<{ may: boolean }>(`SELECT has_table_privilege('audit_entries', 'UPDATE') OR has_table_privilege('audit_entries', 'DELETE') AS may`)
  return row?.may ?? true
}
