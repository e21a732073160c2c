import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const objectionRaised = ({ number, constant, path, referee, text }: MailData['objection-raised']): MailContent => ({
  subject: `Objection to claim ${number}`,
  paragraphs: [`${referee} objects to your claim ${number}, about ${constant}. The claim is returned to you; please answer.`],
  quote: text,
  action: { label: 'Answer the objection', to: path },
})
