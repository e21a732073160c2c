import type { MailData } from '../catalogue.ts'
import { mailDate, type MailContent } from '../layout.ts'

export const invitation = ({ inviter, group, roles, link, expires }: MailData['invitation']): MailContent => ({
  subject: `${inviter} invites you to ${group} on Merestone`,
  paragraphs: [
    `${inviter} invites you to join the group ${group} as ${roles.join(' and ')}.`,
    'Merestone keeps a register of certified numerical constants: members state a constant, referees check its digits, a lead signs.',
  ],
  action: { label: 'Accept and choose a password', to: link },
  closing: [`The link works once, until ${mailDate(expires)}. If you do not know what this is about, leave it unused.`],
})
