import type { OutboxItem } from '../../../../shared/schemas/group.ts'

/** Fates of a mail in words. */
export const MAIL_STATES: Record<OutboxItem['state'], string> = {
  waiting: 'waiting',
  sending: 'being sent',
  sent: 'sent',
  bounced: 'came back',
  failed: 'given up',
}
