import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { paths } from '../../../app/paths.ts'
import { Printed } from '../../../components/formula/printed.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Time } from '../../../components/ui/time.tsx'

/** Estimates that the claim rests on and that somebody holds in doubt. */
export function ClaimDoubts({ doubts }: Pick<Claim, 'doubts'>) {
  return doubts.map(({ estimate, title, group, at, reason }) => (
    <Notice key={`${estimate} ${group.id}`} tone="refused" title="It rests on an estimate in doubt." className="mt-5">
      <TextLink to={paths.estimate(estimate)}><Printed text={title} /></TextLink>, in doubt at {group.name} since <Time at={at} />:{' '}
      <span className="whitespace-pre-wrap break-words italic">{reason}</span>
    </Notice>
  ))
}
