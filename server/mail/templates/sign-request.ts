import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const signRequest = ({ number, constant, path, author, confirmations }: MailData['sign-request']): MailContent => ({
  subject: `Please sign claim ${number}`,
  paragraphs: [
    `Claim ${number} by ${author}, about ${constant}, is endorsed: ${confirmations === 1 ? 'one referee has' : `${confirmations} referees have`} confirmed it and no objection is open.`,
    'Your signature enters it in the register. It cannot be edited afterwards.',
  ],
  action: { label: 'Read and sign', to: path },
})
