import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const refereeDeclined = ({ number, constant, path, referee, reason }: MailData['referee-declined']): MailContent => ({
  subject: `${referee} declines to referee claim ${number}`,
  paragraphs: [`${referee} does not referee claim ${number}, about ${constant}, and gives this reason:`],
  quote: reason,
  action: { label: 'Assign another referee', to: path },
})
