import { useQuery } from '@tanstack/react-query'
import { useNavigate, useSearchParams } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { fetched } from '../../components/ui/fetched.tsx'
import { estimateFiltersOf } from '../../features/estimates/estimate-filters.ts'
import { estimatesQuery } from '../../features/estimates/queries.ts'
import { EstimatesView } from './estimates-view.tsx'

export function EstimatesPage() {
  const [search] = useSearchParams()
  const navigate = useNavigate()
  const estimates = useQuery(estimatesQuery())
  return <EstimatesView estimates={fetched(estimates)} filters={estimateFiltersOf(search)} onFilter={(filters) => void navigate(paths.estimates({ ...filters }))} />
}
