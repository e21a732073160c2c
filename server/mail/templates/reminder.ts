import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

const days = (count: number): string => (count === 1 ? 'for a day' : `for ${count} days`)

export const reminder = ({ name, items }: MailData['reminder']): MailContent => ({
  subject: items.length === 1 ? `Claim ${items[0]!.number} waits for you` : `${items.length} claims wait for you`,
  paragraphs: [`${name}, this waits for you on Merestone:`],
  list: items.map(({ number, what, days: count }) => `${number}: ${what} (waiting ${days(count)})`),
  action: items.length === 1 ? { label: 'Open the claim', to: items[0]!.path } : { label: 'Open your desk', to: '/desk' },
})
