import type { OutboxItem } from '../../shared/schemas/group.ts'
import { mayResend } from '../policies/outbox.ts'
import type { OutboxRow } from '../queries/outbox.ts'

export const presentOutboxItem = (row: OutboxRow): OutboxItem => ({
  id: row.id,
  recipient: { name: row.recipient_name, email: row.recipient_email },
  template: row.template,
  subject: row.subject,
  state: row.state,
  attempts: row.attempts,
  createdAt: row.created_at.toISOString(),
  sentAt: row.sent_at?.toISOString() ?? null,
  nextAttemptAt: row.state === 'waiting' ? row.next_attempt_at.toISOString() : null,
  lastError: row.last_error,
  abilities: { resend: mayResend(row) },
})
