import type { Role } from '../../../../shared/permissions.ts'
import type { MailPreferences } from '../../../../shared/schemas/member.ts'

/** Mails that tell and do not ask, which a person may switch off. */
export const OPTIONAL_MAILS: Record<keyof MailPreferences, string> = {
  'claim-signed': 'A claim that you wrote or refereed was signed',
  'claim-suspended': 'A claim that you wrote or refereed was suspended, with the reason and what it touches',
  'claim-withdrawn': 'A claim that you wrote or refereed was withdrawn',
}

/** Mails that ask somebody to act, by the role that is asked. */
const ASKING_MAILS: [role: Role, mails: string[]][] = [
  ['researcher', ['A referee objects to your claim', 'Your claim was returned to you', 'An estimate that your claims rest on is in doubt']],
  ['referee', ['You are asked to referee a claim', 'An author has answered your objection', 'An estimate that a claim in your hands rests on is in doubt']],
  ['lead', ['A claim waits for referees', 'A referee has declined', 'A claim is endorsed and waits for your signature']],
]

/** The mails that always go out to somebody with these roles. */
export function askingMails(roles: readonly Role[]): string[] {
  return [...ASKING_MAILS.flatMap(([role, mails]) => (roles.includes(role) ? mails : [])), 'A reminder of what has waited for you longer than your group allows', 'A link to set a new password, when it is asked for']
}
