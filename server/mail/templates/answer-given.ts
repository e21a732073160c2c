import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const answerGiven = ({ number, constant, path, author, text }: MailData['answer-given']): MailContent => ({
  subject: `Answer to your objection to claim ${number}`,
  paragraphs: [`${author} answers your objection to claim ${number}, about ${constant}. Please say whether that settles it.`],
  quote: text,
  action: { label: 'Settle or uphold', to: path },
})
