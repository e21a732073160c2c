import { paths } from '../../../app/paths.ts'
import { TextLink } from '../../../components/ui/link.tsx'

/** Estimates by id, each a link to its page. */
export function EstimateLinks({ ids }: { ids: readonly string[] }) {
  return ids.map((id, index) => (
    <span key={id}>
      {index > 0 && ', '}
      <TextLink to={paths.estimate(id)}>{id}</TextLink>
    </span>
  ))
}
