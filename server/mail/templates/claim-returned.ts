import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const claimReturned = ({ number, constant, path, by, reason }: MailData['claim-returned']): MailContent => ({
  subject: `Claim ${number} is returned to you`,
  paragraphs: [`${by} returns your claim ${number}, about ${constant}, with this reason:`],
  quote: reason,
  action: { label: 'Revise and submit again', to: path },
})
