import type { Transaction } from 'sequelize'
import { change, selectOne } from '../db.ts'
import type { Json } from './canonical.ts'
import { entryHash, GENESIS, type AuditContent } from './chain.ts'

/** One thing that happened. */
export interface AuditRecord {
  /** What was done: "claim.sign", "member.roles", "group.rules", … */
  act: string
  /** The member who did it; null: the installation itself (a worker, a command). */
  actorId: string | null
  /** The group whose trail it belongs to; null: the installation. */
  groupId: string | null
  subject: { kind: 'claim' | 'constant' | 'run' | 'member' | 'group' | 'invitation' | 'session' | 'access-token' | 'estimate' | 'key' | 'mail' | 'import'; id: string; label?: string }
  reason?: string
  /** Digest of the claim or certificate that the act was about. */
  digest?: string
  /** More that a reader of the trail needs, such as `{ from: 'draft', to: 'submitted' }`. No secrets: leads can read it. */
  detail?: { [key: string]: Json }
}

/** Key of the advisory lock that orders the writers of the trail. Any constant does, as long as nothing else uses it. */
const TRAIL_LOCK = 4_207_001

/**
 * Adds an entry to the audit trail within the caller's transaction. Writers queue from here until they commit, so that each
 * entry is linked to the one before it and none can be lost between: call it late in a transaction, after the rows are locked.
 */
export async function recordAudit(transaction: Transaction, record: AuditRecord): Promise<void> {
  await selectOne('SELECT pg_advisory_xact_lock($lock)', { lock: TRAIL_LOCK }, transaction)
  const last = await selectOne<{ seq: string; hash: string }>('SELECT seq, hash FROM audit_entries ORDER BY seq DESC LIMIT 1', {}, transaction)
  const actor = record.actorId === null ? undefined : await selectOne<{ name: string }>('SELECT name FROM members WHERE id = $id', { id: record.actorId }, transaction)
  const content: AuditContent = {
    seq: Number(last?.seq ?? 0) + 1,
    at: new Date().toISOString(),
    groupId: record.groupId,
    actorId: record.actorId,
    actorName: actor?.name ?? 'Merestone',
    act: record.act,
    subjectKind: record.subject.kind,
    subjectId: record.subject.id,
    subjectLabel: record.subject.label ?? '',
    reason: record.reason ?? null,
    digest: record.digest ?? null,
    detail: record.detail ?? {},
  }
  await change(
    `INSERT INTO audit_entries (seq, at, group_id, actor_id, actor_name, act, subject_kind, subject_id, subject_label, reason, digest, detail, previous_hash, hash)
     VALUES ($seq, $at, $groupId, $actorId, $actorName, $act, $subjectKind, $subjectId, $subjectLabel, $reason, $digest, $detail::jsonb, $previous, $hash)`,
    { ...content, detail: JSON.stringify(content.detail), previous: last?.hash ?? GENESIS, hash: entryHash(last?.hash ?? GENESIS, content) },
    transaction,
  )
}
