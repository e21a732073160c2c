import { randomUUID } from 'node:crypto'
import { change, inTransaction } from '../db.ts'
import { log } from '../log.ts'
import { SECRET_MAILS } from './catalogue.ts'
import type { MailTransport } from './transport.ts'

/** How long a worker may hold a mail; longer than every time limit of the transport together. */
const LEASE_SECONDS = 180
/** Pauses between attempts: one minute, two, four … up to six hours; about two days in all. */
const MOST_ATTEMPTS = 16

interface Held {
  id: string
  attempts: number
  lease: string
  member_id: string | null
  recipient_name: string
  recipient_email: string
  subject: string
  text: string
  html: string
}

/**
 * Takes the mail that is due longest, for this worker alone: two that ask at once get different rows, and a row is not given out
 * again before its lease has lapsed.
 */
async function take(): Promise<Held | undefined> {
  const [held] = await change<Held>(
    `UPDATE outbox SET state = 'sending', attempts = attempts + 1, lease_token = $lease, lease_until = now() + make_interval(secs => $seconds)
     WHERE id = (
       SELECT id FROM outbox
       WHERE (state = 'waiting' AND next_attempt_at <= now()) OR (state = 'sending' AND lease_until < now())
       ORDER BY next_attempt_at FOR UPDATE SKIP LOCKED LIMIT 1
     )
     RETURNING id, attempts, lease_token AS lease, member_id, recipient_name, recipient_email, subject, text, html`,
    { lease: randomUUID(), seconds: LEASE_SECONDS },
  )
  return held
}

/** Where a mail holds a one-time link, its text is wiped with its last attempt: nobody but the recipient is to have it. */
const WIPE = `text = CASE WHEN template = ANY($secret) THEN NULL ELSE text END, html = CASE WHEN template = ANY($secret) THEN NULL ELSE html END`

async function markSent({ id, lease, member_id: memberId }: Held): Promise<void> {
  await change(`UPDATE outbox SET state = 'sent', sent_at = now(), lease_token = NULL, lease_until = NULL, last_error = NULL, ${WIPE} WHERE id = $id AND lease_token = $lease`, {
    id,
    lease,
    secret: [...SECRET_MAILS],
  })
  await change('UPDATE members SET mail_bounced_at = NULL WHERE id = $memberId AND mail_bounced_at IS NOT NULL', { memberId })
}

/** An answer of 5xx to the recipient's address: it will not be otherwise next time. */
function isBounce(error: unknown): boolean {
  const { responseCode, command } = error as { responseCode?: number; command?: string }
  return typeof responseCode === 'number' && responseCode >= 500 && responseCode !== 535 && (command === 'RCPT TO' || command === 'DATA')
}

async function markFailed(held: Held, error: unknown): Promise<void> {
  const bounced = isBounce(error)
  const last = bounced || held.attempts >= MOST_ATTEMPTS
  const waitSeconds = Math.min(60 * 2 ** (held.attempts - 1), 6 * 3600)
  await inTransaction(async (transaction) => {
    await change(
      `UPDATE outbox SET state = $state, last_error = $message, lease_token = NULL, lease_until = NULL,
         next_attempt_at = now() + make_interval(secs => $waitSeconds) ${last ? `, ${WIPE}` : ''}
       WHERE id = $id AND lease_token = $lease`,
      {
        id: held.id,
        lease: held.lease,
        state: bounced ? 'bounced' : last ? 'failed' : 'waiting',
        message: (error instanceof Error ? error.message : String(error)).slice(0, 500),
        waitSeconds,
        ...(last && { secret: [...SECRET_MAILS] }),
      },
      transaction,
    )
    if (bounced) await change('UPDATE members SET mail_bounced_at = coalesce(mail_bounced_at, now()) WHERE id = $memberId', { memberId: held.member_id }, transaction)
  })
  log.warn({ mail: held.id, attempts: held.attempts, bounced, error: String(error) }, 'mail not taken')
}

/** Sends every mail that is due and answers how many were sent. */
export async function deliverDue(transport: MailTransport, shutdown?: AbortSignal): Promise<number> {
  let sent = 0
  for (let held = await take(); held !== undefined; held = shutdown?.aborted ? undefined : await take()) {
    const { id, recipient_name: name, recipient_email: address, subject, text, html } = held
    try {
      await transport.send({ id, to: { name, address }, subject, text, html })
    } catch (error) {
      await markFailed(held, error)
      continue
    }
    await markSent(held)
    sent += 1
  }
  return sent
}
