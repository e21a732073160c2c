import { z } from 'zod'
import { digest, id, instant, pageOf, pageQuery, personRef } from './common.ts'

/** GET /group: the reader's group and its rules. */
export const group = z.object({
  id,
  name: z.string(),
  /** Confirmations by referees that a claim needs before it is endorsed. */
  confirmationsNeeded: z.number().int(),
  /** Whether a computed enclosure needs a recheck by other arithmetic or another method. */
  recheckNeeded: z.boolean(),
  /** Days after which who is to act is reminded by mail. */
  reminderDays: z.number().int(),
  /** Whether signed claims can be read without an account. */
  public: z.boolean(),
  abilities: z.object({ setRules: z.boolean(), manageMembers: z.boolean(), readAudit: z.boolean(), manageOutbox: z.boolean(), leave: z.boolean() }),
})
export type Group = z.infer<typeof group>

/** PATCH /group */
export const groupPatch = z.object({
  confirmationsNeeded: z.number('write a whole number').int('write a whole number').min(1, 'at least one').max(9, 'at most 9').optional(),
  recheckNeeded: z.boolean().optional(),
  reminderDays: z.number('write a whole number').int('write a whole number').min(1, 'at least one day').max(365, 'at most a year').optional(),
  public: z.boolean().optional(),
})

/** GET /audit */
export const auditQuery = pageQuery.extend({
  /** Start of the act's name: "claim" finds "claim.sign". */
  act: z.string().max(100).optional(),
  actor: id.optional(),
  subjectKind: z.string().max(50).optional(),
  subjectId: z.string().max(100).optional(),
  from: instant.optional(),
  to: instant.optional(),
  text: z.string().trim().max(200).optional(),
})
export const auditEntry = z.object({
  seq: z.number().int(),
  at: instant,
  /** Null: the installation itself. */
  actor: personRef.nullable(),
  act: z.string(),
  subject: z.object({ kind: z.string(), id: z.string(), label: z.string() }),
  reason: z.string().nullable(),
  digest: z.string().nullable(),
  detail: z.record(z.string(), z.unknown()),
  hash: digest,
  previousHash: digest,
})
export type AuditEntry = z.infer<typeof auditEntry>
export const auditPage = pageOf(auditEntry)
/** GET /audit/export */
export const auditExportQuery = auditQuery.omit({ cursor: true, limit: true }).extend({ format: z.enum(['jsonl', 'csv']).default('jsonl') })
/** GET /audit/check: the whole chain of the installation is recomputed. */
export const auditCheck = z.object({
  entries: z.number().int(),
  /** Hash of the last entry; written down elsewhere, it also shows whether entries were cut off the end. */
  head: z.string(),
  broken: z.object({ seq: z.number().int(), reason: z.string() }).nullable(),
})
export type AuditCheck = z.infer<typeof auditCheck>

/** GET /outbox: the fate of the group's mails. */
export const outboxQuery = pageQuery.extend({ state: z.enum(['waiting', 'sending', 'sent', 'bounced', 'failed']).optional() })
export const outboxItem = z.object({
  id,
  recipient: z.object({ name: z.string(), email: z.string() }),
  template: z.string(),
  subject: z.string(),
  state: z.enum(['waiting', 'sending', 'sent', 'bounced', 'failed']),
  attempts: z.number().int(),
  createdAt: instant,
  sentAt: instant.nullable(),
  nextAttemptAt: instant.nullable(),
  /** What the mail server said last, where it did not take the mail. */
  lastError: z.string().nullable(),
  abilities: z.object({ resend: z.boolean() }),
})
export type OutboxItem = z.infer<typeof outboxItem>
export const outboxPage = pageOf(outboxItem)

/** GET /keys: public keys of the installation, for whoever verifies a certificate's signature. */
export const publicKey = z.object({
  id: z.string(),
  algorithm: z.literal('Ed25519'),
  /** SubjectPublicKeyInfo in PEM. */
  pem: z.string(),
  createdAt: instant,
  /** Since when new signatures use another key; null for the one in use. What it signed stays verifiable. */
  retiredAt: instant.nullable(),
})
export type PublicKey = z.infer<typeof publicKey>
export const publicKeyList = z.object({ items: z.array(publicKey) })
