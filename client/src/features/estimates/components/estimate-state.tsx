import type { Estimate } from '../../../../../shared/schemas/estimate.ts'
import { Time } from '../../../components/ui/time.tsx'

/** Whether an estimate is in force, in a word. */
export function EstimateState({ estimate: { state, stateSince } }: { estimate: Pick<Estimate, 'state' | 'stateSince'> }) {
  return (
    <span className={state === 'in-doubt' ? 'font-semibold text-refused' : undefined}>
      {state === 'in-doubt' ? 'in doubt' : 'in force'}
      {stateSince && (
        <span className="font-normal text-soft">
          {' '}
          since <Time at={stateSince} />
        </span>
      )}
    </span>
  )
}
