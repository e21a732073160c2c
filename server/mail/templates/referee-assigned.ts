import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const refereeAssigned = ({ number, constant, path, lead, note }: MailData['referee-assigned']): MailContent => ({
  subject: `Please referee claim ${number}`,
  paragraphs: [`${lead} asks you to referee claim ${number}, about ${constant}.`, 'Please accept, or decline with a reason so that somebody else can be asked.'],
  ...(note !== '' && { quote: note }),
  action: { label: 'Open the claim', to: path },
})
