import { SECRET_MAILS } from '../mail/catalogue.ts'

/** Send again: what was sent, came back or was given up. A mail with a one-time link is made anew where it came from instead. */
export const mayResend = ({ state, template }: { state: string; template: string }): boolean =>
  ['sent', 'bounced', 'failed'].includes(state) && !(SECRET_MAILS as readonly string[]).includes(template)
