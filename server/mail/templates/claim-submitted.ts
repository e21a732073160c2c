import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const claimSubmitted = ({ number, constant, path, author }: MailData['claim-submitted']): MailContent => ({
  subject: `Claim ${number} waits for a referee`,
  paragraphs: [`${author} has submitted claim ${number}, about ${constant}.`, 'Please assign a referee, or return it with a reason.'],
  action: { label: 'Open the claim', to: path },
})
