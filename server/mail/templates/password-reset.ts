import type { MailData } from '../catalogue.ts'
import { mailDate, type MailContent } from '../layout.ts'

export const passwordReset = ({ name, link, expires }: MailData['password-reset']): MailContent => ({
  subject: 'Set a new password for Merestone',
  paragraphs: [`${name}, somebody asked to set a new password for your account.`],
  action: { label: 'Choose a new password', to: link },
  closing: [`The link works once, until ${mailDate(expires)}. If it was not you who asked, nothing needs to be done: your password stays as it is.`],
})
