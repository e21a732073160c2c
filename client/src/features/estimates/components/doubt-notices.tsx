import type { Estimate } from '../../../../../shared/schemas/estimate.ts'
import { Notice } from '../../../components/ui/notice.tsx'
import { Section } from '../../../components/ui/page.tsx'
import { Time } from '../../../components/ui/time.tsx'

/** Where an estimate is in doubt, since when and why. */
export function OpenDoubts({ doubts }: Pick<Estimate, 'doubts'>) {
  return doubts
    .filter(({ lifted }) => lifted === null)
    .map(({ group, own, at, reason }) => (
      <Notice key={group.id} tone="refused" title={<>In doubt at {group.name} since <Time at={at} />.</>} className="mt-5">
        <span className="whitespace-pre-wrap break-words italic">{reason}</span>
        <span className="mt-1 block text-[0.92rem]">
          {own
            ? 'Claims of your group that rest on it are suspended, and its new runs do without it.'
            : 'That group has suspended its claims that rest on it. Whoever builds on it should read the reason.'}
        </span>
      </Notice>
    ))
}

/** Doubts that were lifted, so that a reader can follow. */
export function LiftedDoubts({ doubts }: Pick<Estimate, 'doubts'>) {
  const lifted = doubts.filter((doubt) => doubt.lifted !== null)
  if (lifted.length === 0) return null
  return (
    <Section title="Doubts that were lifted">
      <ul className="grid max-w-prose gap-3">
        {lifted.map(({ group, at, reason, lifted: end }) => (
          <li key={`${group.id} ${at}`}>
            {group.name}, <Time at={at} /> to {end && <Time at={end.at} />}:{' '}
            <span className="whitespace-pre-wrap break-words italic">{reason}</span>
            <span className="block text-soft">
              Lifted: <span className="whitespace-pre-wrap break-words italic">{end?.reason}</span>
            </span>
          </li>
        ))}
      </ul>
    </Section>
  )
}
