import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const claimSigned = ({ number, constant, path, lead }: MailData['claim-signed']): MailContent => ({
  subject: `Claim ${number} is signed`,
  paragraphs: [`${lead} has signed claim ${number}, about ${constant}. It is in the register under this number, which never changes.`],
  action: { label: 'Open the entry', to: path },
})
