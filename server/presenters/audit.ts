import type { AuditEntry } from '../../shared/schemas/group.ts'
import type { AuditRow } from '../queries/audit.ts'

export const presentAuditEntry = (row: AuditRow): AuditEntry => ({
  seq: Number(row.seq),
  at: row.at.toISOString(),
  actor: row.actor_id === null ? null : { id: row.actor_id, name: row.actor_name },
  act: row.act,
  subject: { kind: row.subject_kind, id: row.subject_id, label: row.subject_label },
  reason: row.reason,
  digest: row.digest,
  detail: row.detail,
  hash: row.hash,
  previousHash: row.previous_hash,
})

const COLUMNS = ['seq', 'at', 'actor', 'act', 'subject_kind', 'subject_id', 'subject', 'reason', 'digest', 'detail', 'previous_hash', 'hash']

/** A value for CSV (RFC 4180). A leading = + - @ is made text, so that a spreadsheet does not take it for a formula. */
function cell(value: string | number | null): string {
  const text = value === null ? '' : String(value)
  const safe = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

export const auditCsvHead = (): string => `${COLUMNS.join(',')}\r\n`

export const auditCsvLine = (entry: AuditEntry): string =>
  [
    entry.seq, entry.at, entry.actor?.name ?? 'Merestone', entry.act, entry.subject.kind, entry.subject.id, entry.subject.label,
    entry.reason, entry.digest, JSON.stringify(entry.detail), entry.previousHash, entry.hash,
  ].map(cell).join(',') + '\r\n'
