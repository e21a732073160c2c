import type { MailData, MailTemplate } from './catalogue.ts'
import { renderContent, type MailContent, type RenderedMail } from './layout.ts'
import { answerGiven } from './templates/answer-given.ts'
import { claimResubmitted } from './templates/claim-resubmitted.ts'
import { claimReturned } from './templates/claim-returned.ts'
import { claimSigned } from './templates/claim-signed.ts'
import { claimSubmitted } from './templates/claim-submitted.ts'
import { claimSuspended } from './templates/claim-suspended.ts'
import { claimWithdrawn } from './templates/claim-withdrawn.ts'
import { estimateInDoubt } from './templates/estimate-in-doubt.ts'
import { invitation } from './templates/invitation.ts'
import { objectionRaised } from './templates/objection-raised.ts'
import { passwordReset } from './templates/password-reset.ts'
import { refereeAssigned } from './templates/referee-assigned.ts'
import { refereeDeclined } from './templates/referee-declined.ts'
import { reminder } from './templates/reminder.ts'
import { signRequest } from './templates/sign-request.ts'

const templates: { [T in MailTemplate]: (data: MailData[T]) => MailContent } = {
  invitation,
  'password-reset': passwordReset,
  'claim-submitted': claimSubmitted,
  'referee-assigned': refereeAssigned,
  'referee-declined': refereeDeclined,
  'objection-raised': objectionRaised,
  'answer-given': answerGiven,
  'claim-resubmitted': claimResubmitted,
  'sign-request': signRequest,
  'claim-signed': claimSigned,
  'claim-returned': claimReturned,
  'claim-suspended': claimSuspended,
  'claim-withdrawn': claimWithdrawn,
  'estimate-in-doubt': estimateInDoubt,
  reminder,
}

/** Subject, text and HTML of a mail. */
export function renderMail<T extends MailTemplate>(template: T, data: MailData[T]): RenderedMail {
  return renderContent(templates[template](data))
}
