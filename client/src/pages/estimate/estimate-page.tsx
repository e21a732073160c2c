import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router-dom'
import { Part, fetched } from '../../components/ui/fetched.tsx'
import { DoubtWork } from '../../features/estimates/components/doubt-work.tsx'
import { doubtQuery, estimateQuery, useDoubt, useRunAgain } from '../../features/estimates/queries.ts'
import { EstimateView } from './estimate-view.tsx'

export function EstimatePage() {
  const { id = '' } = useParams()
  const estimate = useQuery(estimateQuery(id))
  return <EstimateView estimate={fetched(estimate)} forLead={estimate.data?.abilities.doubt && <ForLead key={id} id={id} />} />
}

/** What a lead sees and does about the estimate. */
function ForLead({ id }: { id: string }) {
  const doubt = useQuery(doubtQuery(id))
  const { mark, lift } = useDoubt(id)
  const runAgain = useRunAgain(id)
  return (
    <Part of={fetched(doubt)} what="what rests on the estimate">
      {(data) => <DoubtWork doubt={data} onMark={(reason) => mark({ reason, digest: data.digest })} onLift={lift} onRunAgain={runAgain} />}
    </Part>
  )
}
