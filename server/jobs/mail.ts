import { env } from '../env.ts'
import { log } from '../log.ts'
import { deliverDue } from '../mail/deliver.ts'
import { openTransport } from '../mail/transport.ts'
import { periodically } from './periodic.ts'

const EVERY_MS = 1_000

/** Sends the mails of the outbox until `shutdown`. Without a mail server they wait there. */
export async function sendMails(shutdown: AbortSignal): Promise<void> {
  if (env.SMTP_URL === undefined) {
    log.warn('SMTP_URL is not set: mails wait in the outbox')
    return
  }
  const transport = openTransport(env.SMTP_URL)
  await periodically('sending mail', EVERY_MS, () => deliverDue(transport, shutdown), shutdown)
  transport.close()
}
