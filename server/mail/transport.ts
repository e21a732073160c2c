import nodemailer from 'nodemailer'
import { env } from '../env.ts'

/** A mail as it goes to the mail server. */
export interface Envelope {
  id: string
  to: { name: string; address: string }
  subject: string
  text: string
  html: string
}

export interface MailTransport {
  /** Resolves when the mail server has taken the mail over. */
  send(envelope: Envelope): Promise<void>
  close(): void
}

/** The same transport for a real mail server and for the local catcher: SMTP, by the address in SMTP_URL. */
export function openTransport(url: string): MailTransport {
  const transporter = nodemailer.createTransport({
    url,
    pool: true,
    maxConnections: 2,
    connectionTimeout: 15_000,
    greetingTimeout: 15_000,
    socketTimeout: 60_000,
    // The catcher on loopback speaks no TLS; any other server that offers it is held to it.
    ignoreTLS: ['127.0.0.1', 'localhost'].includes(new URL(url).hostname),
  })
  const domain = /@([^>\s]+)/.exec(env.MAIL_FROM)?.[1] ?? 'localhost'
  return {
    async send({ id, to, subject, text, html }) {
      await transporter.sendMail({
        from: env.MAIL_FROM,
        to,
        subject,
        text,
        html,
        // The same for every attempt, so that a mail that went out twice after a crash is known as one.
        messageId: `<${id}@${domain}>`,
        headers: { 'Auto-Submitted': 'auto-generated' },
      })
    },
    close: () => transporter.close(),
  }
}
