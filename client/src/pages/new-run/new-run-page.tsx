import { useQuery } from '@tanstack/react-query'
import { useNavigate, useSearchParams } from 'react-router-dom'
import type { Definition } from '../../../../shared/engine/sets/definition.ts'
import { paths } from '../../app/paths.ts'
import { Loading } from '../../components/ui/feedback.tsx'
import { constantQuery } from '../../features/constants/queries.ts'
import { prefillFrom } from '../../features/runs/prefill.ts'
import { planQuery, useStartRun } from '../../features/runs/queries.ts'
import { BLANK_RUN } from '../../features/runs/run-form.ts'
import { useNewRun } from '../../features/runs/use-new-run.ts'
import { useSession } from '../../features/session/queries.ts'
import { NewRunView } from './new-run-view.tsx'

/** A new run, blank or for the constant that the address names. */
export function NewRunPage() {
  const [search] = useSearchParams()
  const number = search.get('constant')
  const constant = useQuery({ ...constantQuery(number ?? ''), enabled: number !== null })
  if (number !== null && constant.isPending) return <Loading what={`Reading ${number}`} />
  return <Filled key={number} initial={constant.data ? prefillFrom(constant.data.definition.canonical as Definition) : BLANK_RUN} />
}

function Filled({ initial }: { initial: typeof BLANK_RUN }) {
  const { may } = useSession()
  const navigate = useNavigate()
  const state = useNewRun(initial)
  const plan = useQuery(planQuery(state.settled))
  const start = useStartRun()
  const begin = () => {
    const input = state.read()
    if (input) start.mutate({ ...input, ...(state.chosen ?? { method: 'auto' }) }, { onSuccess: (run) => void navigate(paths.run(run.id)) })
  }
  return (
    <NewRunView
      form={state.form}
      errors={state.errorsWith(start.error ?? (plan.isPlaceholderData ? null : plan.error))}
      plan={state.settled ? plan.data : undefined}
      planning={plan.isFetching || state.settling}
      planError={plan.error}
      chosen={state.chosen ?? plan.data?.forecasts.find((forecast) => forecast.recommended) ?? null}
      onChoose={state.choose}
      onStart={begin}
      starting={start.isPending}
      startError={start.error}
      mayStart={may('research')}
    />
  )
}
