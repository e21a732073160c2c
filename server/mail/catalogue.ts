/** What each mail needs to be written. Ids and names only, no secrets but the two one-time links. */
export interface MailData {
  invitation: { inviter: string; group: string; roles: string[]; link: string; expires: string }
  'password-reset': { name: string; link: string; expires: string }
  /** To the leads: a claim waits for referees. */
  'claim-submitted': ClaimMail & { author: string }
  'referee-assigned': ClaimMail & { lead: string; note: string }
  'referee-declined': ClaimMail & { referee: string; reason: string }
  'objection-raised': ClaimMail & { referee: string; text: string }
  'answer-given': ClaimMail & { author: string; text: string }
  /** To the referees at work: a returned claim is theirs again. */
  'claim-resubmitted': ClaimMail & { author: string; remark: string }
  /** To the leads: endorsed, please sign. */
  'sign-request': ClaimMail & { author: string; confirmations: number }
  'claim-signed': ClaimMail & { lead: string }
  'claim-returned': ClaimMail & { by: string; reason: string }
  /** `touched`: numbers of what rests on it. */
  'claim-suspended': ClaimMail & { by: string; reason: string; touched: string[] }
  /** To everybody whose claims or reviews an estimate in doubt touches: one mail with all of them. */
  'estimate-in-doubt': { by: string; group: string; estimate: string; title: string; reason: string; items: { number: string; constant: string; touched: 'suspended' | 'waits' | 'reviewed' | 'refereed' | 'rests-on-it' }[] }
  'claim-withdrawn': ClaimMail & { by: string; reason: string }
  /** What waits for this person, and for how many days. */
  reminder: { name: string; items: { number: string; what: string; days: number; path: string }[] }
}

export type MailTemplate = keyof MailData

/** What every mail about a claim says of it. `path` is the claim's page within the product, e.g. "/claims/MST-0042-1". */
export interface ClaimMail {
  /** MST-0042/1 */
  number: string
  /** The constant in words. */
  constant: string
  path: string
}

/** Mails that tell and do not ask: a person may switch these off. All others ask for an act and always go out. */
export const OPTIONAL_MAILS = ['claim-signed', 'claim-suspended', 'claim-withdrawn'] as const satisfies readonly MailTemplate[]

/** Mails with a one-time link in them: their text is wiped once they are sent, and leads never see it. */
export const SECRET_MAILS = ['invitation', 'password-reset'] as const satisfies readonly MailTemplate[]
