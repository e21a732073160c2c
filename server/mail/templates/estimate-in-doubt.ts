import type { MailData } from '../catalogue.ts'
import type { MailContent } from '../layout.ts'

type Data = MailData['estimate-in-doubt']

const TOUCHED: Record<Data['items'][number]['touched'], string> = {
  suspended: 'your claim is suspended',
  waits: 'your claim can be neither endorsed nor signed while the doubt stands',
  reviewed: 'you referee it; it can be neither endorsed nor signed while the doubt stands',
  refereed: 'which you refereed, is suspended',
  'rests-on-it': 'your order rests on an enclosure that is suspended',
}

export const estimateInDoubt = ({ by, group, estimate, title, reason, items }: Data): MailContent => ({
  subject: `An estimate is in doubt: ${title}`,
  paragraphs: [`${by} of ${group} has marked the estimate “${title}” (${estimate}) as in doubt, with the reason below. It touches ${items.length === 1 ? 'a claim' : `${items.length} claims`} of yours or in your hands:`],
  list: items.map(({ number, constant, touched }) => `${number}, about ${constant}: ${TOUCHED[touched]}`),
  quote: reason,
  action: { label: 'See the estimate', to: `/estimates/${encodeURIComponent(estimate)}` },
  closing: [`Nothing should be built on what is suspended. Runs that ${group} starts from now on do without the estimate, and a claim on such a run can take the place of one that has fallen.`],
})
