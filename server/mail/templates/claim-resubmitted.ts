import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const claimResubmitted = ({ number, constant, path, author, remark }: MailData['claim-resubmitted']): MailContent => ({
  subject: `Claim ${number} is back in review`,
  paragraphs: [
    `${author} has put claim ${number}, about ${constant}, back into review.`,
    'Please see what has changed and say whether it stands. A verdict that you gave before counts only for what you read then.',
  ],
  quote: remark,
  action: { label: 'Read the claim', to: path },
})
