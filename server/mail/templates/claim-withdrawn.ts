import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const claimWithdrawn = ({ number, constant, path, by, reason }: MailData['claim-withdrawn']): MailContent => ({
  subject: `Claim ${number} is withdrawn`,
  paragraphs: [`${by} has withdrawn claim ${number}, about ${constant}, with this reason:`],
  quote: reason,
  action: { label: 'Open the claim', to: path },
})
