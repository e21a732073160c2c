import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

export const claimSuspended = ({ number, constant, path, by, reason, touched }: MailData['claim-suspended']): MailContent => ({
  subject: `Claim ${number} is suspended`,
  paragraphs: [
    `${by} has suspended claim ${number}, about ${constant}, with the reason below. Until that is cleared up, nothing should be built on it.`,
    ...(touched.length > 0 ? [`It touches what rests on it: ${touched.join(', ')}.`] : []),
  ],
  quote: reason,
  action: { label: 'See what is in doubt', to: path },
})
