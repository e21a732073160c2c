import { createHash } from 'node:crypto'
import { canonicalJson, type Json } from './canonical.ts'

/** What an entry of the audit trail says, in the form that its hash covers. */
export interface AuditContent {
  seq: number
  /** ISO 8601 with milliseconds. */
  at: string
  groupId: string | null
  actorId: string | null
  actorName: string
  act: string
  subjectKind: string
  subjectId: string
  subjectLabel: string
  reason: string | null
  digest: string | null
  detail: { [key: string]: Json }
}

/** Stands before the first entry. */
export const GENESIS = '0'.repeat(64)

/** Hash of an entry: SHA-256 of the hash before it, a line feed, and the canonical JSON of its content. */
export function entryHash(previous: string, content: AuditContent): string {
  return createHash('sha256').update(`${previous}\n${canonicalJson(content)}`).digest('hex')
}
