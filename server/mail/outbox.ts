import type { Transaction } from 'sequelize'
import { change, selectOne } from '../db.ts'
import { OPTIONAL_MAILS, type MailData, type MailTemplate } from './catalogue.ts'
import { renderMail } from './render.ts'

/** A member by id, or somebody who has no account yet. */
export type Recipient = { memberId: string } | { email: string; name: string }

interface Options {
  /** Group whose leads see this mail's fate. */
  groupId: string | null
  /** A mail with a key that is in the outbox already is not written again. */
  dedupeKey?: string
}

/**
 * Writes a mail to the outbox in the transaction of the change it tells of: it goes out if and only if that is committed.
 * The worker sends it. Nothing is written for a member who has left or does not want this mail.
 */
export async function queueMail<T extends MailTemplate>(
  transaction: Transaction,
  template: T,
  recipient: Recipient,
  data: MailData[T],
  { groupId, dedupeKey }: Options,
): Promise<void> {
  const to = await addressOf(recipient, template, transaction)
  if (!to) return
  const mail = renderMail(template, data)
  await change(
    `INSERT INTO outbox (group_id, member_id, recipient_name, recipient_email, template, subject, text, html, dedupe_key)
     VALUES ($groupId, $memberId, $name, $email, $template, $subject, $text, $html, $dedupeKey)
     ON CONFLICT (dedupe_key) DO NOTHING`,
    { groupId, ...to, template, ...mail, dedupeKey: dedupeKey ?? null },
    transaction,
  )
}

async function addressOf(recipient: Recipient, template: MailTemplate, transaction: Transaction) {
  if (!('memberId' in recipient)) return { memberId: null, ...recipient }
  const member = await selectOne<{ email: string; name: string; mail_preferences: Record<string, boolean> }>(
    `SELECT email, name, mail_preferences FROM members WHERE id = $id AND state = 'active'`,
    { id: recipient.memberId },
    transaction,
  )
  const optional = (OPTIONAL_MAILS as readonly string[]).includes(template)
  if (!member || (optional && member.mail_preferences[template] === false)) return undefined
  return { memberId: recipient.memberId, name: member.name, email: member.email }
}
